import { newToken } from '../../../../shared/schemas/people'
import { makeTokenInSession } from '../../../services/tokens'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'signed-in',
  summary: 'Make a personal access token; its secret is in this answer only',
  body: newToken,
  status: 201,
  answersSecret: true,
}, ({ db, person, sessionId, body }) => makeTokenInSession(db, person, sessionId, body.name))
