import { lotParams, lotCount } from '../../../../../shared/schemas/part-lot'
import { countLot } from '../../../../services/lot-counts'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'part.write', summary: 'Note what was counted of a lot', params: lotParams, body: lotCount }, ({ db, person, params, body }) => countLot(db, person, { ...body, tag: params.tag }))
