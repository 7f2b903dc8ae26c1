import { decidedPartRecallUnit, partRecallUnitParams } from '../../../../../../shared/schemas/part-recall'
import { decidePartRecallUnit } from '../../../../../services/part-recalls'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({ may: 'part.decide', summary: 'Say what was decided of one unit under a recall of parts', params: partRecallUnitParams, body: decidedPartRecallUnit },
  ({ db, person, params, body }) => decidePartRecallUnit(db, person, { ...params, ...body }))
