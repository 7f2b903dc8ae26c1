import { idParams } from '../../../../shared/schemas/params'
import { getModel } from '../../../services/models'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'A model with its bands and kit', params: idParams }, ({ db, params }) => getModel(db, params.id))
