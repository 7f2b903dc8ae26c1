import { locationChange, locationParams } from '../../../../shared/schemas/locations'
import { changeLocation } from '../../../services/locations'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'location.write',
  summary: 'Rename, move, annotate or retire a place',
  params: locationParams,
  body: locationChange,
}, ({ db, person, params, body }) => changeLocation(db, person, params.tag, body))
