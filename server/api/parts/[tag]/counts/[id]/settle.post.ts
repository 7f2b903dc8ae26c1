import { countParams, settledCount } from '../../../../../../shared/schemas/part-lot'
import { settleCount } from '../../../../../services/lot-counts'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({ may: 'part.write', summary: 'Settle a counting difference', params: countParams, body: settledCount }, ({ db, person, params, body }) => settleCount(db, person, { ...body, ...params }))
