import { unitParams } from '../../../../shared/schemas/params'
import { currentProvenanceSheet } from '../../../services/provenance'
import { getUnitRow } from '../../../services/unit-lock'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'stock.read', summary: 'The provenance sheet as a buyer would see it', params: unitParams,
}, async ({ db, params }) => currentProvenanceSheet(db, (await getUnitRow(db, params.tag)).id))
