import { MAX_PHOTO_BYTES } from '../../../../../shared/domain/photo-sizes'
import { unitParams } from '../../../../../shared/schemas/params'
import { newPhoto } from '../../../../../shared/schemas/photo'
import { addPhoto } from '../../../../services/photos'
import { useFileStore } from '../../../../utils/file-store'
import { defineRoute } from '../../../../utils/route'
import { readUpload } from '../../../../utils/upload'

export default defineRoute({
  may: 'unit.log',
  summary: 'Add a photo to a unit: `file`, `subject`, and if wished `caption`, `modificationId` and `readingId`',
  params: unitParams,
  takes: 'multipart/form-data',
  status: 201,
}, async ({ event, db, person, params }) => {
  const { name, bytes, fields } = await readUpload(event, newPhoto, MAX_PHOTO_BYTES)
  return addPhoto(db, useFileStore(), person, { ...fields, tag: params.tag, name, bytes })
})
