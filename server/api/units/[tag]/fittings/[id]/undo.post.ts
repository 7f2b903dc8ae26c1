import { fittingParams, undoneFitting } from '../../../../../../shared/schemas/fitting'
import { undoFitting } from '../../../../../services/fittings'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({
  may: 'unit.log', summary: 'Undo the fitting of a part', params: fittingParams, body: undoneFitting,
}, ({ db, person, params, body }) => undoFitting(db, person, { ...body, ...params }))
