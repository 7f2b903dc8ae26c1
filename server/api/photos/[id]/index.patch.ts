import { idParams } from '../../../../shared/schemas/params'
import { changedPhoto } from '../../../../shared/schemas/photo'
import { changePhoto } from '../../../services/photos'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'unit.log',
  summary: 'Change what a photo is said to show, its order, or whether the buyer may see it',
  params: idParams,
  body: changedPhoto,
}, ({ db, person, params, body }) => changePhoto(db, person, { ...body, id: params.id }))
