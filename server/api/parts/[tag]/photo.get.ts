import { setResponseHeaders } from 'h3'
import { lotParams, lotPhotoQuery } from '../../../../shared/schemas/part-lot'
import { readLotPhoto } from '../../../services/lot-photos'
import { useFileStore } from '../../../utils/file-store'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'stock.read', summary: 'The picture of a lot, as WebP', params: lotParams, query: lotPhotoQuery, answers: 'image/*',
}, async ({ event, db, params, query }) => {
  const bytes = await readLotPhoto(db, useFileStore(), { tag: params.tag, fileId: query.of })
  // The bytes under an address never change; only the person's own browser keeps them.
  setResponseHeaders(event, { 'content-type': 'image/webp', 'cache-control': 'private, max-age=31536000, immutable', 'x-content-type-options': 'nosniff' })
  return bytes
})
