import { shopChange } from '../../../shared/schemas/shop'
import { changeShop } from '../../services/shop'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'shop.manage',
  summary: 'Change the shop’s settings',
  body: shopChange,
}, ({ db, person, body }) => changeShop(db, person, body))
