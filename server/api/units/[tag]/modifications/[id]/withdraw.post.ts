import { withdrawnModification } from '../../../../../../shared/schemas/modification'
import { unitItemParams } from '../../../../../../shared/schemas/params'
import { withdrawModification } from '../../../../../services/modifications'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({
  may: 'unit.log',
  summary: 'Withdraw an entry of a unit’s work log and say why',
  params: unitItemParams,
  body: withdrawnModification,
}, ({ db, person, params, body }) => withdrawModification(db, person, { ...body, ...params }))
