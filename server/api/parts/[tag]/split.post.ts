import { lotParams, lotSplit } from '../../../../shared/schemas/part-lot'
import { splitLot } from '../../../services/lot-changes'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'part.write', summary: 'Make some of a lot a lot of their own', params: lotParams, body: lotSplit }, ({ db, person, params, body }) => splitLot(db, person, { ...body, tag: params.tag }))
