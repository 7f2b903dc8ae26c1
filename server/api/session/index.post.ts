import { signInInput } from '../../../shared/schemas/sign-in'
import { signIn } from '../../services/sessions'
import { rememberSession, signInTerms } from '../../utils/browser-session'
import { usePool } from '../../utils/db'
import { defineRoute } from '../../utils/route'
import { signInLimits } from '../../utils/sign-in-limits'

export default defineRoute({
  may: 'anyone',
  summary: 'Sign in with e-mail and password; answers with the session’s cookie',
  body: signInInput,
}, async ({ event, db, sessionId, body }) => {
  const { origin, terms } = signInTerms(event, sessionId)
  const { person, ...opened } = await signIn(db, signInLimits(usePool()), body, origin, terms)
  await rememberSession(event, opened)
  return { person }
})
