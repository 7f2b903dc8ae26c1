import { saleUndone } from '../../../../../shared/schemas/moves'
import { unitParams } from '../../../../../shared/schemas/params'
import { undoSale } from '../../../../services/sales'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'unit.sell',
  summary: 'Undo a sale: the unit came back, or the sale fell through',
  params: unitParams,
  body: saleUndone,
}, ({ db, person, params, body }) => undoSale(db, person, { ...body, tag: params.tag }))
