import { unitNumberParams } from '../../../../../../shared/schemas/params'
import { reopenedTestSheet } from '../../../../../../shared/schemas/test-sheet'
import { reopenTestSheet } from '../../../../../services/test-sheets'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({
  may: 'unit.test',
  summary: 'Open a signed test sheet again, saying why',
  params: unitNumberParams,
  body: reopenedTestSheet,
}, ({ db, person, params, body }) => reopenTestSheet(db, person, { ...body, ...params }))
