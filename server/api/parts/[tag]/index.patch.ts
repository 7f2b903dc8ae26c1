import { changedPartLot, lotParams } from '../../../../shared/schemas/part-lot'
import { changeLot } from '../../../services/part-lots'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'part.write', summary: 'Change a part lot', params: lotParams, body: changedPartLot }, ({ db, person, params, body }) => changeLot(db, person, { ...body, tag: params.tag }))
