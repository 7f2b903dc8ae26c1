import { unitParams } from '../../../../shared/schemas/params'
import { getDonor } from '../../../services/pulled-lots'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'What was pulled from a unit', params: unitParams }, ({ db, person, params }) => getDonor(db, person, params.tag))
