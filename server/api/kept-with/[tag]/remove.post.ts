import { keptWithParams, removedKeptWith } from '../../../../shared/schemas/kept-with'
import { removeKeptWith } from '../../../services/kept-with'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'unit.edit',
  summary: 'Take an item off a unit’s list and say why',
  params: keptWithParams,
  body: removedKeptWith,
}, ({ db, person, params, body }) => removeKeptWith(db, person, { ...body, tag: params.tag }))
