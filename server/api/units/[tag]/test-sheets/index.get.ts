import { unitParams } from '../../../../../shared/schemas/params'
import type { TestSheetSummary } from '../../../../../shared/types/bench'
import type { Page } from '../../../../../shared/types/page'
import { listTestSheetsOf } from '../../../../services/test-sheets'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'The test sheets of a unit, the newest first',
  params: unitParams,
}, async ({ db, params }): Promise<Page<TestSheetSummary>> => {
  const items = await listTestSheetsOf(db, params.tag)
  return { items, nextCursor: null, total: items.length }
})
