import { idParams } from '../../../../../shared/schemas/params'
import { getCurrentProcedure } from '../../../../services/procedures'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'The newest version of a model’s procedure', params: idParams }, ({ db, params }) => getCurrentProcedure(db, params.id))
