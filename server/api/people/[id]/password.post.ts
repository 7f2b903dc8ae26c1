import { idParams } from '../../../../shared/schemas/params'
import { resetPassword } from '../../../services/people'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'people.manage',
  summary: 'Give a person a new password, shown once; ends their sessions and tokens',
  params: idParams,
  answersSecret: true,
}, ({ db, person, params }) => resetPassword(db, person, params.id))
