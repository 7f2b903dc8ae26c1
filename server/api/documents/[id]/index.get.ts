import { setResponseHeaders } from 'h3'
import { idParams } from '../../../../shared/schemas/params'
import { readDocument } from '../../../services/documents'
import { contentDisposition } from '../../../utils/content-disposition'
import { useFileStore } from '../../../utils/file-store'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'A document, to download',
  params: idParams,
  answers: 'application/pdf',
}, async ({ event, db, params }) => {
  const { name, bytes } = await readDocument(db, useFileStore(), params.id)
  setResponseHeaders(event, {
    'content-type': 'application/pdf',
    // A PDF can carry script: it is handed over as a file, and should a browser open it all the same, in a sandbox.
    'content-disposition': contentDisposition('attachment', name),
    'content-security-policy': 'default-src \'none\'; sandbox',
    'cache-control': 'private, max-age=31536000, immutable',
    'x-content-type-options': 'nosniff',
  })
  return bytes
})
