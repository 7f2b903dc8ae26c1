import { newInstrument } from '../../../shared/schemas/instrument'
import { addInstrument } from '../../services/instruments'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'instrument.write',
  summary: 'Enter a bench instrument',
  body: newInstrument,
  status: 201,
}, ({ db, person, body }) => addInstrument(db, person, body))
