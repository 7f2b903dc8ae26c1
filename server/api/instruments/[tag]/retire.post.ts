import { instrumentParams, retiredInstrument } from '../../../../shared/schemas/instrument'
import { retireInstrument } from '../../../services/instruments'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'instrument.write',
  summary: 'Take a bench instrument out of use',
  params: instrumentParams,
  body: retiredInstrument,
}, ({ db, person, params, body }) => retireInstrument(db, person, { ...body, tag: params.tag }))
