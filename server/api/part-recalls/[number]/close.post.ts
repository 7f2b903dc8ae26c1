import { partRecallParams } from '../../../../shared/schemas/part-recall'
import { closePartRecall } from '../../../services/part-recalls'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'part.decide', summary: 'End a recall of parts once every unit of it is decided', params: partRecallParams }, ({ db, person, params }) => closePartRecall(db, person, params))
