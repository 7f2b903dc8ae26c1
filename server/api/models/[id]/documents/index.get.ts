import { idParams } from '../../../../../shared/schemas/params'
import { listDocumentsOf } from '../../../../services/documents'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'The papers of a model', params: idParams }, ({ db, params }) => listDocumentsOf(db, { modelId: params.id }))
