import { unitNumberParams } from '../../../../../../shared/schemas/params'
import { getTestSheet } from '../../../../../services/test-sheets'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'One test sheet',
  params: unitNumberParams,
}, ({ db, params }) => getTestSheet(db, params))
