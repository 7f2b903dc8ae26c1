import { firstRunInput } from '../../shared/schemas/sign-in'
import { openShop } from '../services/first-run'
import { openSession } from '../services/sessions'
import { rememberSession, signInTerms } from '../utils/browser-session'
import { defineRoute } from '../utils/route'

export default defineRoute({
  may: 'anyone',
  summary: 'Open an empty shop: its settings and its owner’s account, once',
  body: firstRunInput,
  status: 201,
}, async ({ event, db, sessionId, body }) => {
  const owner = await openShop(db, body)
  const { origin, terms } = signInTerms(event, sessionId)
  await rememberSession(event, await openSession(db, owner, origin, terms))
  return { id: owner.id }
})
