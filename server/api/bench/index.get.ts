import { getBenchQueue } from '../../services/bench-queue'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'What waits for the bench',
}, ({ db }) => getBenchQueue(db))
