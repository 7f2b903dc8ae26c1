import { setResponseHeaders } from 'h3'
import { photoFileParams } from '../../../../../../shared/schemas/photo'
import { publicationParams } from '../../../../../../shared/schemas/publication'
import { readPublicPhoto } from '../../../../../services/provenance'
import { useFileStore } from '../../../../../utils/file-store'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({
  may: 'anyone',
  summary: 'A photo of a public provenance sheet',
  params: photoFileParams.extend(publicationParams.shape),
  answers: 'image/*',
}, async ({ event, db, params: { token, id, size } }) => {
  const bytes = await readPublicPhoto(db, useFileStore(), { token, photoId: id, ...size })
  setResponseHeaders(event, {
    'content-type': `image/${size.format}`,
    // Kept for an hour only: the link may be taken back.
    'cache-control': 'private, max-age=3600',
    'x-content-type-options': 'nosniff',
  })
  return bytes
})
