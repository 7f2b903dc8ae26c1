import { pageQuery } from '../../../../shared/schemas/common'
import { unitParams } from '../../../../shared/schemas/params'
import { listStory } from '../../../services/story'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'stock.read',
  summary: 'What happened to a unit, in plain words, newest first',
  params: unitParams,
  query: pageQuery,
}, ({ db, person, params, query }) => listStory(db, person, { ...query, tag: params.tag }))
