import { unitParams } from '../../../../shared/schemas/params'
import { publishUnit } from '../../../services/publications'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'provenance.publish', summary: 'Publish the provenance sheet at its own link', params: unitParams, status: 201,
}, async ({ db, person, params }) => publishUnit(db, person, params.tag))
