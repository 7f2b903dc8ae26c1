import { instrumentParams } from '../../../../shared/schemas/instrument'
import { getInstrument } from '../../../services/instruments'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'One bench instrument',
  params: instrumentParams,
}, ({ db, params }) => getInstrument(db, params.tag))
