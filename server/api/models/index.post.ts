import { newModel } from '../../../shared/schemas/model'
import { addModel } from '../../services/models'
import { defineRoute } from '../../utils/route'

export default defineRoute({ may: 'model.write', summary: 'Add a model with its bands and kit', body: newModel, status: 201 },
  ({ db, person, body }) => addModel(db, person, body))
