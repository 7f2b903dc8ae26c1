import { tagParams } from '../../../shared/schemas/labels'
import { getTagged } from '../../services/tagged-things'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'stock.read', summary: 'What a tag stands for, and its page', params: tagParams,
}, async ({ db, params }) => getTagged(db, params.tag))
