import { unitParams } from '../../../../shared/schemas/params'
import { makeReceiptPdf } from '../../../services/receipt'
import { defineRoute } from '../../../utils/route'
import { sendPdf } from '../../../utils/send-pdf'

export default defineRoute({
  may: 'unit.book-in', summary: 'The entry receipt, for whoever brought the piece', params: unitParams, answers: 'application/pdf',
}, async ({ event, db, person, params }) => sendPdf(event, await makeReceiptPdf(db, person, params.tag), `receipt-${params.tag}.pdf`))
