import { recallParams } from '../../../../../../shared/schemas/recall'
import { closeRecall } from '../../../../../services/recalls'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({ may: 'instrument.write', summary: 'End a recall once every sheet of it is decided', params: recallParams }, ({ db, person, params }) => closeRecall(db, person, params))
