import { unitNumberParams } from '../../../../../../shared/schemas/params'
import { makeCorrectionCardPdf } from '../../../../../services/test-report'
import { defineRoute } from '../../../../../utils/route'
import { sendPdf } from '../../../../../utils/send-pdf'

export default defineRoute({ may: 'stock.read', summary: 'The dial correction card of a signed sheet, as PDF', params: unitNumberParams, answers: 'application/pdf' }, async ({ event, db, params }) => {
  const { bytes, name } = await makeCorrectionCardPdf(db, params)
  return sendPdf(event, bytes, name)
})
