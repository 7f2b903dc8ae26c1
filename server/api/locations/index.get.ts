import { listLocations } from '../../services/locations'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'Rooms, bays, shelves and bins, read downwards',
}, async ({ db }) => ({ items: await listLocations(db), nextCursor: null }))
