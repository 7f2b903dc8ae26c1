import { unitParams } from '../../../../shared/schemas/params'
import { unitCeiling } from '../../../../shared/schemas/unit'
import { setCeiling } from '../../../services/unit-cost'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'cost.read', summary: 'Set the ceiling of bench time, or take it off', params: unitParams, body: unitCeiling },
  ({ db, person, params, body }) => setCeiling(db, person, { ...body, tag: params.tag }))
