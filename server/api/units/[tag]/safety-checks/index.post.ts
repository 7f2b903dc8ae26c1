import { unitParams } from '../../../../../shared/schemas/params'
import { newSafetyCheck } from '../../../../../shared/schemas/safety-check'
import { recordSafetyCheck } from '../../../../services/safety-checks'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'unit.test',
  summary: 'Record an electrical safety check',
  params: unitParams,
  body: newSafetyCheck,
  status: 201,
}, ({ db, person, params, body }) => recordSafetyCheck(db, person, { ...body, tag: params.tag }))
