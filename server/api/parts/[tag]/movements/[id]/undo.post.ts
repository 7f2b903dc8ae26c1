import { movementParams, undoneMovement } from '../../../../../../shared/schemas/part-lot'
import { undoMovement } from '../../../../../services/lot-changes'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({ may: 'part.write', summary: 'Take back that parts were sold, scrapped or lost', params: movementParams, body: undoneMovement }, ({ db, person, params, body }) => undoMovement(db, person, { ...body, ...params }))
