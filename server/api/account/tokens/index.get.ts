import { listTokens } from '../../../services/tokens'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'signed-in',
  summary: 'Your personal access tokens that still work, without their secrets',
}, async ({ db, person }) => ({ items: await listTokens(db, person), nextCursor: null }))
