import { unitParams } from '../../../../../shared/schemas/params'
import { newTriage } from '../../../../../shared/schemas/triage'
import { recordTriage } from '../../../../services/triage'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'unit.triage',
  summary: 'Record a triage: the safety look before any power',
  params: unitParams,
  body: newTriage,
  status: 201,
}, ({ db, person, params, body }) => recordTriage(db, person, { ...body, tag: params.tag }))
