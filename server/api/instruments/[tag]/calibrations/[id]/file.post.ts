import { z } from 'zod'
import { MAX_DOCUMENT_BYTES } from '../../../../../../shared/domain/photo-sizes'
import { calibrationParams } from '../../../../../../shared/schemas/instrument'
import { attachCertificate } from '../../../../../services/calibrations'
import { useFileStore } from '../../../../../utils/file-store'
import { defineRoute } from '../../../../../utils/route'
import { readUpload } from '../../../../../utils/upload'

export default defineRoute({
  may: 'instrument.write',
  summary: 'Keep the certificate itself as a PDF: `file`',
  params: calibrationParams,
  takes: 'multipart/form-data',
  status: 201,
}, async ({ event, db, person, params }) => {
  const { name, bytes } = await readUpload(event, z.object({}), MAX_DOCUMENT_BYTES)
  return attachCertificate(db, useFileStore(), person, { ...params, name, bytes })
})
