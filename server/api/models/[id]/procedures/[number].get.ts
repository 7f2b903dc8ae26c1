import { procedureVersionParams } from '../../../../../shared/schemas/procedure'
import { getProcedureVersion } from '../../../../services/procedures'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'One version of a model’s procedure, as it was', params: procedureVersionParams },
  ({ db, params }) => getProcedureVersion(db, params.id, params.number))
