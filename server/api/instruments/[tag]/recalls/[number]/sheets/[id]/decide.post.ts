import { decidedRecallSheet, recallSheetParams } from '../../../../../../../../shared/schemas/recall'
import { decideRecallSheet } from '../../../../../../../services/recalls'
import { defineRoute } from '../../../../../../../utils/route'

export default defineRoute({ may: 'instrument.write', summary: 'Say what follows for one sheet of a recall', params: recallSheetParams, body: decidedRecallSheet },
  ({ db, person, params, body }) => decideRecallSheet(db, person, { ...params, ...body }))
