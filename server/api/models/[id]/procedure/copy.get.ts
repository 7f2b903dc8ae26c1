import { idParams } from '../../../../../shared/schemas/params'
import { procedureCopyQuery } from '../../../../../shared/schemas/procedure'
import { copyProcedure } from '../../../../services/procedures'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'model.write', summary: 'Another model’s procedure as a draft for this one; nothing is written', params: idParams, query: procedureCopyQuery },
  ({ db, params, query }) => copyProcedure(db, params.id, query.from))
