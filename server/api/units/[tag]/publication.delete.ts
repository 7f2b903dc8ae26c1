import { unitParams } from '../../../../shared/schemas/params'
import { revocation } from '../../../../shared/schemas/publication'
import { revokePublication } from '../../../services/publications'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'provenance.publish', summary: 'Take the public link back', params: unitParams, body: revocation, status: 204,
}, async ({ db, person, params, body }) => revokePublication(db, person, params.tag, body.why))
