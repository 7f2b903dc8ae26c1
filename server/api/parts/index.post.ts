import { newPartLot } from '../../../shared/schemas/part-lot'
import { enterLot } from '../../services/part-lots'
import { defineRoute } from '../../utils/route'

export default defineRoute({ may: 'part.write', summary: 'Enter a part lot', body: newPartLot, status: 201 }, ({ db, person, body }) => enterLot(db, person, body))
