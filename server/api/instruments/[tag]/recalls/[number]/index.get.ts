import { recallParams } from '../../../../../../shared/schemas/recall'
import { viewRecall } from '../../../../../services/recalls'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'A recall with every sheet on its list', params: recallParams }, ({ db, params }) => viewRecall(db, params))
