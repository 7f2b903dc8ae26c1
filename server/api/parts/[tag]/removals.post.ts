import { lotParams, lotRemoval } from '../../../../shared/schemas/part-lot'
import { removeFromLot } from '../../../services/lot-changes'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'part.write', summary: 'Note parts of a lot as sold, scrapped or lost', params: lotParams, body: lotRemoval }, ({ db, person, params, body }) => removeFromLot(db, person, { ...body, tag: params.tag }))
