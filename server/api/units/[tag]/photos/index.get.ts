import { unitParams } from '../../../../../shared/schemas/params'
import { listPhotosOf } from '../../../../services/photos'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'The photos of a unit', params: unitParams }, ({ db, params }) => listPhotosOf(db, params.tag))
