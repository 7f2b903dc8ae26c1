import { keptWithParams, packedTick } from '../../../../shared/schemas/kept-with'
import { setPacked } from '../../../services/kept-with'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'unit.edit',
  summary: 'Tick a kept-with item off as packed, or take the tick back',
  params: keptWithParams,
  body: packedTick,
}, ({ db, person, params, body }) => setPacked(db, person, { ...body, tag: params.tag }))
