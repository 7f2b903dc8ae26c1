import { listReorder } from '../../services/reorder'
import { defineRoute } from '../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'Parts of which fewer good ones are there than their minimum' }, ({ db, person }) => listReorder(db, person))
