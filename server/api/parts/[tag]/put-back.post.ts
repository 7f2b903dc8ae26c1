import { putBack } from '../../../../shared/schemas/break-up'
import { lotParams } from '../../../../shared/schemas/part-lot'
import { putLotBack } from '../../../services/donors'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'part.decide', summary: 'Put a pulled lot back into its donor', params: lotParams, body: putBack }, ({ db, person, params, body }) => putLotBack(db, person, { ...body, tag: params.tag }))
