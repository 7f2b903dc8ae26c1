import { unitParams } from '../../../../shared/schemas/params'
import { traceQuery } from '../../../../shared/schemas/trace'
import { traceUnit } from '../../../services/trace'
import { defineRoute } from '../../../utils/route'
import { answerTrace } from '../../../utils/trace-answer'

export default defineRoute({
  may: 'stock.read', summary: 'Every part that went into a unit or came out of it; as PROV-O for `Accept: application/ld+json`', params: unitParams, query: traceQuery,
}, async ({ event, db, person, params, query }) => answerTrace(event, await traceUnit(db, person, { ...params, ...query })))
