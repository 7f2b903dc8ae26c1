import { examinedInside } from '../../../../shared/schemas/originality'
import { unitParams } from '../../../../shared/schemas/params'
import { noteExaminedInside } from '../../../services/originality'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'unit.log', summary: 'Note when somebody looked inside a unit, and how far', params: unitParams, body: examinedInside,
}, ({ db, person, params, body }) => noteExaminedInside(db, person, { ...body, tag: params.tag }))
