import { breakUp } from '../../../../shared/schemas/break-up'
import { unitParams } from '../../../../shared/schemas/params'
import { breakUnit } from '../../../services/donors'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'part.decide', summary: 'Break a unit for parts, or take more from a broken one', params: unitParams, body: breakUp,
}, ({ db, person, params, body }) => breakUnit(db, person, { ...body, tag: params.tag }))
