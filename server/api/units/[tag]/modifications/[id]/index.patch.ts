import { correctedModification } from '../../../../../../shared/schemas/modification'
import { unitItemParams } from '../../../../../../shared/schemas/params'
import { correctModification } from '../../../../../services/modifications'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({
  may: 'unit.log',
  summary: 'Correct an entry of a unit’s work log and say why; the correction is in the story',
  params: unitItemParams,
  body: correctedModification,
}, ({ db, person, params, body }) => correctModification(db, person, { ...body, ...params }))
