import { changedModel } from '../../../../shared/schemas/model'
import { idParams } from '../../../../shared/schemas/params'
import { changeModel } from '../../../services/models'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'model.write', summary: 'Change a model; what its units cover follows its bands', params: idParams, body: changedModel },
  ({ db, person, params, body }) => changeModel(db, person, { ...body, id: params.id }))
