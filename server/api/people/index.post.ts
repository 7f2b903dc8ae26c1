import { newPerson } from '../../../shared/schemas/people'
import { addPerson } from '../../services/people'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'people.manage',
  summary: 'Add a person; answers once with the password they first sign in with',
  body: newPerson,
  status: 201,
  answersSecret: true,
}, ({ db, person, body }) => addPerson(db, person, body))
