import { unitParams } from '../../../../../shared/schemas/params'
import { getSafetyForm } from '../../../../services/safety-checks'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'The newest safety check of a unit, and the limits that the next starts from',
  params: unitParams,
}, ({ db, params }) => getSafetyForm(db, params.tag))
