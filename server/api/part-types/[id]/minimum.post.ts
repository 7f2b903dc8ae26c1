import { idParams } from '../../../../shared/schemas/params'
import { partMinimum } from '../../../../shared/schemas/part-type'
import { setMinimum } from '../../../services/reorder'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'part.write', summary: 'Set how many of a type should be there at least, or stop watching it', params: idParams, body: partMinimum },
  ({ db, person, params, body }) => setMinimum(db, person, { ...body, id: params.id }))
