import { partRecallParams } from '../../../../shared/schemas/part-recall'
import { getPartRecall } from '../../../services/part-recall-view'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'A recall of parts with the lots and units it reaches today', params: partRecallParams }, ({ db, person, params }) => getPartRecall(db, person, params.number))
