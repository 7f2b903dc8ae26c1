import { unitSale } from '../../../../../shared/schemas/moves'
import { unitParams } from '../../../../../shared/schemas/params'
import { sellUnit } from '../../../../services/sales'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'unit.sell',
  summary: 'Record the sale of a unit, with its provenance sheet frozen',
  params: unitParams,
  body: unitSale,
}, ({ db, person, params, body }) => sellUnit(db, person, { ...body, tag: params.tag }))
