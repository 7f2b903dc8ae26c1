import { unitParams } from '../../../../../shared/schemas/params'
import { listModificationsOf } from '../../../../services/modifications'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'The work log of a unit', params: unitParams }, ({ db, params }) => listModificationsOf(db, params.tag))
