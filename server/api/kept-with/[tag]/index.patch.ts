import { changedKeptWith, keptWithParams } from '../../../../shared/schemas/kept-with'
import { changeKeptWith } from '../../../services/kept-with'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'unit.edit',
  summary: 'Write a kept-with item as it should be now',
  params: keptWithParams,
  body: changedKeptWith,
}, ({ db, person, params, body }) => changeKeptWith(db, person, { ...body, tag: params.tag }))
