import { lotParams } from '../../../../shared/schemas/part-lot'
import { getLotView } from '../../../services/lot-view'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'A part lot with all that moved in and out of its drawer', params: lotParams }, ({ db, person, params }) => getLotView(db, person, params.tag))
