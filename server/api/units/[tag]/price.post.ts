import { unitParams } from '../../../../shared/schemas/params'
import { askingPrice } from '../../../../shared/schemas/unit'
import { priceUnit } from '../../../services/units-edit'
import { defineRoute } from '../../../utils/route'

export default defineRoute({ may: 'unit.price', summary: 'Set the asking price, or take it off', params: unitParams, body: askingPrice },
  ({ db, person, params, body }) => priceUnit(db, person, { ...body, tag: params.tag }))
