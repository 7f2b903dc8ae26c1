import { instrumentParams } from '../../../../../shared/schemas/instrument'
import { listRecalls } from '../../../../services/recalls'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'The recalls of an instrument, the newest first', params: instrumentParams }, async ({ db, params }) => {
  const items = await listRecalls(db, params.tag)
  return { items, nextCursor: null, total: items.length }
})
