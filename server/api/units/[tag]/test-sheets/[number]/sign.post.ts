import { unitNumberParams } from '../../../../../../shared/schemas/params'
import { signedTestSheet } from '../../../../../../shared/schemas/test-sheet'
import { signTestSheet } from '../../../../../services/test-sheets'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({
  may: 'unit.test',
  summary: 'Sign a test sheet: its readings stand',
  params: unitNumberParams,
  body: signedTestSheet,
}, ({ db, person, params, body }) => signTestSheet(db, person, { ...body, ...params }))
