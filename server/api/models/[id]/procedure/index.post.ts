import { idParams } from '../../../../../shared/schemas/params'
import { savedProcedure } from '../../../../../shared/schemas/procedure'
import { saveProcedure } from '../../../../services/procedures'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'model.write', summary: 'Save a model’s procedure as its next version; old sheets keep theirs', params: idParams, body: savedProcedure, status: 201 },
  ({ db, person, params, body }) => saveProcedure(db, person, { ...body, modelId: params.id }))
