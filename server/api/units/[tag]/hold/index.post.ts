import { unitHold } from '../../../../../shared/schemas/moves'
import { unitParams } from '../../../../../shared/schemas/params'
import { holdUnit } from '../../../../services/moves'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'unit.move',
  summary: 'Hold an offered unit for somebody until a day',
  params: unitParams,
  body: unitHold,
}, ({ db, person, params, body }) => holdUnit(db, person, { ...body, tag: params.tag }))
