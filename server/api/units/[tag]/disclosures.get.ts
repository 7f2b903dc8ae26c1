import { unitParams } from '../../../../shared/schemas/params'
import { describeForBuyer } from '../../../services/provenance'
import { getUnitRow } from '../../../services/unit-lock'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'stock.read', summary: 'What a buyer must be told of a unit, answered or not', params: unitParams,
}, async ({ db, params }) => describeForBuyer(db, (await getUnitRow(db, params.tag)).id))
