import { listPeople } from '../../services/people'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'people.manage',
  summary: 'Everybody who signs in here, or once did',
}, async ({ db }) => ({ items: await listPeople(db), nextCursor: null }))
