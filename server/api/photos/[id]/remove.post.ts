import { idParams } from '../../../../shared/schemas/params'
import { removal } from '../../../../shared/schemas/photo'
import { removePhoto } from '../../../services/photos'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'unit.log',
  summary: 'Remove a photo and say why',
  params: idParams,
  body: removal,
}, async ({ db, person, params, body }) => {
  await removePhoto(db, person, { id: params.id, why: body.why })
  return { removed: true }
})
