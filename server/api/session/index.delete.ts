import { signOut } from '../../services/sessions'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'anyone',
  summary: 'Sign out: ends this browser’s session',
  status: 204,
}, async ({ event, db, sessionId }) => {
  await signOut(db, sessionId)
  await clearUserSession(event)
  return null
})
