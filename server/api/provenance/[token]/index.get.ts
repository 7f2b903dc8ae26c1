import { publicationParams } from '../../../../shared/schemas/publication'
import { getPublicSheet } from '../../../services/provenance'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'anyone', summary: 'A public provenance sheet', params: publicationParams,
}, async ({ db, params }) => getPublicSheet(db, params.token))
