import { publicationParams } from '../../../../shared/schemas/publication'
import { getPublicSheet } from '../../../services/provenance'
import { makeProvenancePdf } from '../../../services/provenance-pdf'
import { useFileStore } from '../../../utils/file-store'
import { publicLink } from '../../../utils/public-link'
import { defineRoute } from '../../../utils/route'
import { sendPdf } from '../../../utils/send-pdf'

export default defineRoute({
  may: 'anyone', summary: 'A public provenance sheet as PDF', params: publicationParams, answers: 'application/pdf',
}, async ({ event, db, params: { token } }) => {
  const sheet = await getPublicSheet(db, token)
  const link = publicLink(event, `/p/${token}`)
  return sendPdf(event, await makeProvenancePdf(db, useFileStore(), sheet, link), `provenance-${sheet.tag}.pdf`)
})
