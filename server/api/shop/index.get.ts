import { getShop } from '../../services/shop'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'The shop’s settings',
}, ({ db, person }) => getShop(db, person))
