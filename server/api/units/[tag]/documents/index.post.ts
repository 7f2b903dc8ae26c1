import { MAX_DOCUMENT_BYTES } from '../../../../../shared/domain/photo-sizes'
import { newDocument } from '../../../../../shared/schemas/document'
import { unitParams } from '../../../../../shared/schemas/params'
import { addDocument } from '../../../../services/documents'
import { useFileStore } from '../../../../utils/file-store'
import { defineRoute } from '../../../../utils/route'
import { readUpload } from '../../../../utils/upload'

export default defineRoute({
  may: 'unit.log',
  summary: 'Add a PDF to a unit: `file`, and if wished `title` and `isPublic`',
  params: unitParams,
  takes: 'multipart/form-data',
  status: 201,
}, async ({ event, db, person, params }) => {
  const { name, bytes, fields } = await readUpload(event, newDocument, MAX_DOCUMENT_BYTES)
  return addDocument(db, useFileStore(), person, { ...fields, owner: { unitTag: params.tag }, name, bytes })
})
