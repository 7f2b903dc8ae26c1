import { holdRelease } from '../../../../../shared/schemas/moves'
import { unitParams } from '../../../../../shared/schemas/params'
import { releaseHold } from '../../../../services/moves'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'unit.move',
  summary: 'Release a hold: the unit is offered again',
  params: unitParams,
  body: holdRelease,
}, ({ db, person, params, body }) => releaseHold(db, person, { ...body, tag: params.tag }))
