import { idParams } from '../../../../shared/schemas/params'
import { revokeToken } from '../../../services/tokens'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'signed-in',
  summary: 'Revoke one of your own tokens',
  params: idParams,
  status: 204,
}, async ({ db, person, params }) => {
  await revokeToken(db, person, params.id)
  return null
})
