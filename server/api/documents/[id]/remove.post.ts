import { idParams } from '../../../../shared/schemas/params'
import { removal } from '../../../../shared/schemas/photo'
import { removeDocument } from '../../../services/documents'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'unit.log',
  summary: 'Remove a document and say why',
  params: idParams,
  body: removal,
}, async ({ db, person, params, body }) => {
  await removeDocument(db, person, { id: params.id, why: body.why })
  return { removed: true }
})
