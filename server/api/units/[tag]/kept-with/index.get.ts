import { unitParams } from '../../../../../shared/schemas/params'
import { listKeptWithOf } from '../../../../services/kept-with'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'What belongs to a unit and must leave with it',
  params: unitParams,
}, ({ db, params }) => listKeptWithOf(db, params.tag))
