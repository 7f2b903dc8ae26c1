import { unitParams } from '../../../../../shared/schemas/params'
import { newTestSheet } from '../../../../../shared/schemas/test-sheet'
import { startTestSheet } from '../../../../services/test-sheets'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'unit.test',
  summary: 'Start a test sheet',
  params: unitParams,
  body: newTestSheet,
  status: 201,
}, ({ db, person, params, body }) => startTestSheet(db, person, { ...body, tag: params.tag }))
