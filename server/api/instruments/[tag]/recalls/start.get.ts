import { instrumentParams } from '../../../../../shared/schemas/instrument'
import { getRecallStart } from '../../../../services/recalls'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'instrument.write', summary: 'What the form of a recall starts from', params: instrumentParams }, ({ db, params }) => getRecallStart(db, params.tag))
