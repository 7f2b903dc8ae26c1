import { changedInstrument, instrumentParams } from '../../../../shared/schemas/instrument'
import { changeInstrument } from '../../../services/instruments'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'instrument.write',
  summary: 'Change a bench instrument',
  params: instrumentParams,
  body: changedInstrument,
}, ({ db, person, params, body }) => changeInstrument(db, person, { ...body, tag: params.tag }))
