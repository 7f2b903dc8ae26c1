import { unitParams } from '../../../../../shared/schemas/params'
import { listTriagesOf } from '../../../../services/triage'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'stock.read', summary: 'The safety looks at a unit, the newest first', params: unitParams,
}, ({ db, params }) => listTriagesOf(db, params.tag))
