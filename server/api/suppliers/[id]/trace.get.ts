import { idParams } from '../../../../shared/schemas/params'
import { traceQuery } from '../../../../shared/schemas/trace'
import { traceSupplier } from '../../../services/trace'
import { defineRoute } from '../../../utils/route'
import { answerTrace } from '../../../utils/trace-answer'

export default defineRoute({
  may: 'parties.read', summary: 'Everything that somebody supplied and where it went; as PROV-O for `Accept: application/ld+json`', params: idParams, query: traceQuery,
}, async ({ event, db, person, params, query }) => answerTrace(event, await traceSupplier(db, person, { ...params, ...query })))
