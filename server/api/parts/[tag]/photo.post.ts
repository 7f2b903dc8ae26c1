import { z } from 'zod'
import { MAX_PHOTO_BYTES } from '../../../../shared/domain/photo-sizes'
import { lotParams } from '../../../../shared/schemas/part-lot'
import { setLotPhoto } from '../../../services/lot-photos'
import { useFileStore } from '../../../utils/file-store'
import { defineRoute } from '../../../utils/route'
import { readUpload } from '../../../utils/upload'

export default defineRoute({
  may: 'part.write', summary: 'Give a lot its picture: `file`', params: lotParams, takes: 'multipart/form-data', status: 201,
}, async ({ event, db, person, params }) => {
  const { name, bytes } = await readUpload(event, z.object({}), MAX_PHOTO_BYTES)
  return setLotPhoto(db, useFileStore(), person, { tag: params.tag, name, bytes })
})
