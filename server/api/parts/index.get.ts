import { lotsQuery } from '../../../shared/schemas/part-lot'
import { listLots } from '../../services/part-lots'
import { defineRoute } from '../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'Part lots, the newest first', query: lotsQuery }, ({ db, person, query }) => listLots(db, person, query))
