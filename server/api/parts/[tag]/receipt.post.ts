import { lotParams, correctedReceipt } from '../../../../shared/schemas/part-lot'
import { correctReceipt } from '../../../services/part-lots'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'part.write', summary: 'Correct how many of a lot came in and what they cost', params: lotParams, body: correctedReceipt }, ({ db, person, params, body }) => correctReceipt(db, person, { ...body, tag: params.tag }))
