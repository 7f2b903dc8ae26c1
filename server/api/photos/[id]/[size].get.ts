import { setResponseHeaders } from 'h3'
import { photoFileParams } from '../../../../shared/schemas/photo'
import { readPhoto } from '../../../services/photos'
import { contentDisposition } from '../../../utils/content-disposition'
import { useFileStore } from '../../../utils/file-store'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'A photo at one of its sizes: `320`, `800` or `1600`, as `.webp` or `.avif`',
  params: photoFileParams,
  answers: 'image/*',
}, async ({ event, db, params: { id, size } }) => {
  const bytes = await readPhoto(db, useFileStore(), id, size.width, size.format)
  setResponseHeaders(event, {
    'content-type': `image/${size.format}`,
    'content-disposition': contentDisposition('inline', `${id}.${size.format}`),
    // The bytes under an address never change; only the person's own browser keeps them.
    'cache-control': 'private, max-age=31536000, immutable',
    'x-content-type-options': 'nosniff',
  })
  return bytes
})
