import { locationParams } from '../../../../shared/schemas/locations'
import { getLocation } from '../../../services/locations'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'A place and the kept-with items in it; its units are at /api/units?location=',
  params: locationParams,
}, ({ db, params }) => getLocation(db, params.tag))
