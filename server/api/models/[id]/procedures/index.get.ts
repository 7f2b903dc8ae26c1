import { pageQuery } from '../../../../../shared/schemas/common'
import { idParams } from '../../../../../shared/schemas/params'
import { listProcedureVersions } from '../../../../services/procedures'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'The versions of a model’s procedure, the newest first', params: idParams, query: pageQuery },
  ({ db, params, query }) => listProcedureVersions(db, params.id, query))
