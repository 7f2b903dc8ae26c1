import { unaffectingModification } from '../../../../../../shared/schemas/modification'
import { unitItemParams } from '../../../../../../shared/schemas/params'
import { markDoesNotAffect } from '../../../../../services/modifications'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({
  may: 'unit.test',
  summary: 'Say why an entry of a unit’s work log changed nothing that was measured: the sheets it had overtaken hold again',
  params: unitItemParams,
  body: unaffectingModification,
}, ({ db, person, params, body }) => markDoesNotAffect(db, person, { ...body, ...params }))
