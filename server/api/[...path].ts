import { notFound } from '../utils/errors'
import { defineRoute } from '../utils/route'

export default defineRoute({ may: 'anyone', summary: 'Any other address' }, async () => {
  throw notFound('The API has nothing at this address. Its addresses are listed at /api/openapi.json.')
})
