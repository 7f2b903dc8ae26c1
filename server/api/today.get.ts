import { getToday } from '../services/today'
import { defineRoute } from '../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'What waits to be done in the shop, and what happened last' }, ({ db, person }) => getToday(db, person))
