import { notEnergised } from '../../../../shared/schemas/moves'
import { unitParams } from '../../../../shared/schemas/params'
import { discloseNotEnergised } from '../../../services/moves'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'disclosure.write',
  summary: 'Disclose a unit as untested, not to be energised; an empty text takes it back',
  params: unitParams,
  body: notEnergised,
}, ({ db, person, params, body }) => discloseNotEnergised(db, person, { ...body, tag: params.tag }))
