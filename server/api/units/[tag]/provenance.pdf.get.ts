import { unitParams } from '../../../../shared/schemas/params'
import { currentProvenanceSheet } from '../../../services/provenance'
import { makeProvenancePdf } from '../../../services/provenance-pdf'
import { getUnitRow } from '../../../services/unit-lock'
import { useFileStore } from '../../../utils/file-store'
import { defineRoute } from '../../../utils/route'
import { sendPdf } from '../../../utils/send-pdf'

export default defineRoute({
  may: 'stock.read', summary: 'The provenance sheet as PDF', params: unitParams, answers: 'application/pdf',
}, async ({ event, db, params }) => {
  const sheet = await currentProvenanceSheet(db, (await getUnitRow(db, params.tag)).id)
  return sendPdf(event, await makeProvenancePdf(db, useFileStore(), sheet, null), `provenance-${sheet.tag}.pdf`)
})
