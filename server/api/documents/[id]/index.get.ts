import { idParams } from '../../../../shared/schemas/params'
import { readDocument } from '../../../services/documents'
import { useFileStore } from '../../../utils/file-store'
import { defineRoute } from '../../../utils/route'
import { sendStoredPdf } from '../../../utils/send-pdf'

export default defineRoute({ may: 'stock.read', summary: 'A document, to download', params: idParams, answers: 'application/pdf' },
  async ({ event, db, params }) => sendStoredPdf(event, await readDocument(db, useFileStore(), params.id)))
