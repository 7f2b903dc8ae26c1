import { lotParams, lotStandingChange } from '../../../../shared/schemas/part-lot'
import { changeStanding } from '../../../services/part-lots'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'part.decide', summary: 'Quarantine, withdraw or release a lot', params: lotParams, body: lotStandingChange }, ({ db, person, params, body }) => changeStanding(db, person, { ...body, tag: params.tag }))
