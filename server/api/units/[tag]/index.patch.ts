import { unitParams } from '../../../../shared/schemas/params'
import { changedUnit } from '../../../../shared/schemas/unit'
import { editUnit } from '../../../services/units-edit'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'unit.edit', summary: 'Change a unit’s record; what is not sent stays', params: unitParams, body: changedUnit },
  ({ db, person, params, body }) => editUnit(db, person, { ...body, tag: params.tag }))
