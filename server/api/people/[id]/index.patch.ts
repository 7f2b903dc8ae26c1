import { idParams } from '../../../../shared/schemas/params'
import { personChange } from '../../../../shared/schemas/people'
import { changePerson } from '../../../services/people'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'people.manage',
  summary: 'Change a person’s name, role or right to sign in',
  params: idParams,
  body: personChange,
}, ({ db, person, params, body }) => changePerson(db, person, params.id, body))
