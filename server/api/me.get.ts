import { getMe } from '../services/me'
import { defineRoute } from '../utils/route'

export default defineRoute({
  may: 'anyone',
  summary: 'Who is signed in, and which shop this is',
}, ({ db, person }) => getMe(db, person))
