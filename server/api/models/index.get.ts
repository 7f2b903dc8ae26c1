import { modelsQuery } from '../../../shared/schemas/model'
import { listModels } from '../../services/models'
import { defineRoute } from '../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'Models by name, typing errors forgiven', query: modelsQuery }, ({ db, query }) => listModels(db, query))
