import { keptWithParams } from '../../../../shared/schemas/kept-with'
import { getKeptWith } from '../../../services/kept-with'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'One kept-with item and the unit it belongs to',
  params: keptWithParams,
}, ({ db, params }) => getKeptWith(db, params.tag))
