import { labelsPrinted } from '../../../shared/schemas/labels'
import { noteLabelsPrinted } from '../../services/labels'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'label.print', summary: 'Note in each unit’s story that its label was printed', body: labelsPrinted,
}, async ({ db, person, body }) => noteLabelsPrinted(db, person, body))
