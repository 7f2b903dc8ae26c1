import { disclosureAnswers } from '../../../../shared/schemas/disclosure'
import { unitParams } from '../../../../shared/schemas/params'
import { answerDisclosures } from '../../../services/disclosures'
import { defineRoute } from '../../../utils/route'

export default defineRoute({
  may: 'disclosure.write', summary: 'Answer what a buyer must be told', params: unitParams, body: disclosureAnswers, status: 204,
}, async ({ db, person, params, body }) => answerDisclosures(db, person, params.tag, body))
