import { newKeptWith } from '../../../../../shared/schemas/kept-with'
import { unitParams } from '../../../../../shared/schemas/params'
import { addKeptWith } from '../../../../services/kept-with'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({
  may: 'unit.edit',
  summary: 'Note another item that belongs to a unit',
  params: unitParams,
  body: newKeptWith,
  status: 201,
}, ({ db, person, params, body }) => addKeptWith(db, person, { ...body, tag: params.tag }))
