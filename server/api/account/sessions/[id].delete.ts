import { idParams } from '../../../../shared/schemas/params'
import { revokeSession } from '../../../services/sessions'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'signed-in',
  summary: 'End one of your own sessions',
  params: idParams,
  status: 204,
}, async ({ db, person, params }) => {
  await revokeSession(db, person, params.id)
  return null
})
