import { newPartRecall } from '../../../shared/schemas/part-recall'
import { raisePartRecall } from '../../services/part-recalls'
import { defineRoute } from '../../utils/route'

export default defineRoute({ may: 'part.decide', summary: 'Recall parts that may be bad, with every unit that has one', body: newPartRecall, status: 201 }, ({ db, person, body }) => raisePartRecall(db, person, body))
