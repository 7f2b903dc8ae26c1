import { calibrationParams } from '../../../../../../shared/schemas/instrument'
import { readCertificate } from '../../../../../services/calibrations'
import { useFileStore } from '../../../../../utils/file-store'
import { defineRoute } from '../../../../../utils/route'
import { sendStoredPdf } from '../../../../../utils/send-pdf'

export default defineRoute({ may: 'stock.read', summary: 'A calibration certificate, to download', params: calibrationParams, answers: 'application/pdf' },
  async ({ event, db, params }) => sendStoredPdf(event, await readCertificate(db, useFileStore(), params)))
