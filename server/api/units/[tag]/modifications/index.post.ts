import { newModification } from '../../../../../shared/schemas/modification'
import { unitParams } from '../../../../../shared/schemas/params'
import { logModification } from '../../../../services/modifications'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'unit.log',
  summary: 'Log a modification of a unit',
  params: unitParams,
  body: newModification,
  status: 201,
}, ({ db, person, params, body }) => logModification(db, person, { ...body, tag: params.tag }))
