import { instrumentParams } from '../../../../../shared/schemas/instrument'
import { newRecall } from '../../../../../shared/schemas/recall'
import { startRecall } from '../../../../services/recalls'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'instrument.write', summary: 'Recall what an instrument measured since it was last right', params: instrumentParams, body: newRecall, status: 201 },
  ({ db, person, params, body }) => startRecall(db, person, { ...body, tag: params.tag }))
