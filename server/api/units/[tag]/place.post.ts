import { unitPlacing } from '../../../../shared/schemas/locations'
import { unitParams } from '../../../../shared/schemas/params'
import { putUnit } from '../../../services/placing'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'unit.move',
  summary: 'Put a unit in a place',
  params: unitParams,
  body: unitPlacing,
}, ({ db, person, params, body }) => putUnit(db, person, { ...body, tag: params.tag }))
