import { lotParams, lotPlacing } from '../../../../shared/schemas/part-lot'
import { placeLot } from '../../../services/part-lots'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'part.write', summary: 'Put a lot in a place', params: lotParams, body: lotPlacing }, ({ db, person, params, body }) => placeLot(db, person, { ...body, tag: params.tag }))
