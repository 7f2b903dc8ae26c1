import { newLocation } from '../../../shared/schemas/locations'
import { addLocation } from '../../services/locations'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'location.write',
  summary: 'Add a room, bay, shelf or bin',
  body: newLocation,
  status: 201,
}, ({ db, person, body }) => addLocation(db, person, body))
