import { listOpenFindings } from '../../services/lot-counts'
import { defineRoute } from '../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'Counting differences that nobody has settled' }, ({ db }) => listOpenFindings(db))
