import { listPartRecalls } from '../../services/part-recall-view'
import { defineRoute } from '../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'The recalls of parts, those open first' }, async ({ db, person }) => {
  const items = await listPartRecalls(db, person)
  return { items, nextCursor: null, total: items.length }
})
