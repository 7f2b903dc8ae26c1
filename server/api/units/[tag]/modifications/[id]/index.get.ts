import { unitItemParams } from '../../../../../../shared/schemas/params'
import { getModification } from '../../../../../services/modifications'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({
  may: 'stock.read', summary: 'One entry of a unit’s work log', params: unitItemParams,
}, ({ db, params }) => getModification(db, params.tag, params.id))
