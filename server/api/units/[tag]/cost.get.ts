import { unitParams } from '../../../../shared/schemas/params'
import { getUnitCost } from '../../../services/unit-cost'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'cost.read', summary: 'What a unit has really cost, with the margin before and after bench time', params: unitParams },
  ({ db, params }) => getUnitCost(db, params.tag))
