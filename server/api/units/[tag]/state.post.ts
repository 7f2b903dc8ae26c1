import { unitMove } from '../../../../shared/schemas/moves'
import { unitParams } from '../../../../shared/schemas/params'
import { moveUnit } from '../../../services/moves'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'unit.move',
  summary: 'Move a unit to another state, or say every guard that refuses',
  params: unitParams,
  body: unitMove,
}, ({ db, person, params, body }) => moveUnit(db, person, { ...body, tag: params.tag }))
