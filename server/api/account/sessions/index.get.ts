import { listSessions } from '../../../services/sessions'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'signed-in',
  summary: 'Where you are signed in',
}, async ({ db, person, sessionId }) => ({ items: await listSessions(db, person, sessionId), nextCursor: null }))
