import { pageQuery } from '../../../../shared/schemas/common'
import { instrumentParams } from '../../../../shared/schemas/instrument'
import { listSheetsMadeWith } from '../../../services/calibrations'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'stock.read', summary: 'The test sheets an instrument was used for, the newest first', params: instrumentParams, query: pageQuery },
  ({ db, params, query }) => listSheetsMadeWith(db, params.tag, query))
