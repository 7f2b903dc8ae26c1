import { passwordChange } from '../../../shared/schemas/people'
import { changePassword } from '../../services/people'
import { signInTerms } from '../../utils/browser-session'
import { usePool } from '../../utils/db'
import { defineRoute } from '../../utils/route'
import { signInLimits } from '../../utils/sign-in-limits'

export default defineRoute({
  may: 'signed-in',
  summary: 'Change your own password; ends your other sessions',
  body: passwordChange,
  status: 204,
  answersSecret: true,
}, async ({ event, db, person, sessionId, body }) => {
  const { origin } = signInTerms(event, sessionId)
  await changePassword(db, signInLimits(usePool()), person, sessionId, body, origin.address)
  return null
})
