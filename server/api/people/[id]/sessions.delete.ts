import { idParams } from '../../../../shared/schemas/params'
import { signOutEverywhere } from '../../../services/people'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'people.manage',
  summary: 'Sign a person out on every device',
  params: idParams,
}, ({ db, person, params }) => signOutEverywhere(db, person, params.id))
