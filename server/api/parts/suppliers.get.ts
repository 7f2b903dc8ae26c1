import { listSuppliers } from '../../services/part-lots'
import { defineRoute } from '../../utils/route'

export default defineRoute({ may: 'parties.read', summary: 'Names of those who supplied part lots' }, ({ db }) => listSuppliers(db))
