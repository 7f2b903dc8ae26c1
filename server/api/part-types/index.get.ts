import { partTypesQuery } from '../../../shared/schemas/part-type'
import { listPartTypes } from '../../services/reorder'
import { defineRoute } from '../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'Types of part by words, those with a minimum first', query: partTypesQuery }, ({ db, query }) => listPartTypes(db, query))
