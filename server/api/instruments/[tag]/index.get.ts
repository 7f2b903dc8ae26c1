import { instrumentParams } from '../../../../shared/schemas/instrument'
import { getInstrumentPage } from '../../../services/calibrations'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'A bench instrument with its specification and certificates', params: instrumentParams }, ({ db, params }) => getInstrumentPage(db, params.tag))
