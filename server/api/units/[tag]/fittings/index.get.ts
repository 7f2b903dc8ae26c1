import { unitParams } from '../../../../../shared/schemas/params'
import { listFittingsOf } from '../../../../services/fittings'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'The parts placed in a unit', params: unitParams }, ({ db, person, params }) => listFittingsOf(db, person, params.tag))
