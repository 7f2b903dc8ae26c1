import { MAX_DOCUMENT_BYTES } from '../../../../../shared/domain/photo-sizes'
import { newDocument } from '../../../../../shared/schemas/document'
import { idParams } from '../../../../../shared/schemas/params'
import { addDocument } from '../../../../services/documents'
import { useFileStore } from '../../../../utils/file-store'
import { defineRoute } from '../../../../utils/route'
import { readUpload } from '../../../../utils/upload'

export default defineRoute({
  may: 'model.write',
  summary: 'Add a PDF to a model: `file`, and if wished `title` and `isPublic`',
  params: idParams,
  takes: 'multipart/form-data',
  status: 201,
}, async ({ event, db, person, params }) => {
  const { name, bytes, fields } = await readUpload(event, newDocument, MAX_DOCUMENT_BYTES)
  return addDocument(db, useFileStore(), person, { ...fields, owner: { modelId: params.id }, name, bytes })
})
