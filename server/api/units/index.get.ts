import { unitsListQuery } from '../../../shared/schemas/units-list'
import { listUnits } from '../../services/units-list'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'Units by words, coverage, state and place, in pages',
  query: unitsListQuery,
}, ({ db, person, query }) => listUnits(db, person, query))
