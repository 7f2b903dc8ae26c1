import { unitParams } from '../../../../../shared/schemas/params'
import { listDocumentsOf } from '../../../../services/documents'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'The papers of a unit', params: unitParams }, ({ db, params }) => listDocumentsOf(db, { unitTag: params.tag }))
