import { lotParams } from '../../../../shared/schemas/part-lot'
import { traceQuery } from '../../../../shared/schemas/trace'
import { traceLot } from '../../../services/trace'
import { defineRoute } from '../../../utils/route'
import { answerTrace } from '../../../utils/trace-answer'

export default defineRoute({
  may: 'stock.read', summary: 'Every unit and lot that a lot came from and went to; as PROV-O for `Accept: application/ld+json`', params: lotParams, query: traceQuery,
}, async ({ event, db, person, params, query }) => answerTrace(event, await traceLot(db, person, { ...params, ...query })))
