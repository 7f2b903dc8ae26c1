import { instrumentQuery } from '../../../shared/schemas/instrument'
import { listInstruments } from '../../services/instruments'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'The shop’s own measuring instruments',
  query: instrumentQuery,
}, ({ db, query }) => listInstruments(db, query))
