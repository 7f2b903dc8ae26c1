import { addedFitting } from '../../../../../shared/schemas/fitting'
import { unitParams } from '../../../../../shared/schemas/params'
import { addFitting } from '../../../../services/fittings'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'unit.log', summary: 'Add a part to an entry of a unit’s work log', params: unitParams, body: addedFitting, status: 201,
}, ({ db, person, params, body }) => addFitting(db, person, { ...body, tag: params.tag }))
