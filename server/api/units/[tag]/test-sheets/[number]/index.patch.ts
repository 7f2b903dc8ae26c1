import { unitNumberParams } from '../../../../../../shared/schemas/params'
import { savedTestSheet } from '../../../../../../shared/schemas/test-sheet'
import { saveTestSheet } from '../../../../../services/test-sheets'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({
  may: 'unit.test',
  summary: 'Save a part of an open test sheet',
  params: unitNumberParams,
  body: savedTestSheet,
}, ({ db, person, params, body }) => saveTestSheet(db, person, { ...body, ...params }))
