import { partRecallBasis } from '../../../shared/schemas/part-recall'
import { previewPartRecall } from '../../services/part-recall-view'
import { defineRoute } from '../../utils/route'

export default defineRoute({ may: 'part.decide', summary: 'Which lots and units a recall would reach, before it is raised', query: partRecallBasis }, ({ db, person, query }) => previewPartRecall(db, person, query))
