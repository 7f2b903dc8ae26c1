import { unitParams } from '../../../../shared/schemas/params'
import { getUnitView } from '../../../services/unit-view'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'Everything on the page of one unit',
  params: unitParams,
}, ({ db, person, params }) => getUnitView(db, person, params.tag))
