import { getRequestURL, setResponseHeader } from 'h3'
import { labelQuery } from '../../shared/schemas/labels'
import { makeLabelPdf } from '../services/labels'
import { readBaseUrl } from '../utils/config'
import { contentDisposition } from '../utils/content-disposition'
import { labelBase } from '../utils/label-codes'
import { defineRoute } from '../utils/route'

export default defineRoute({
  may: 'label.print', summary: 'Sheets of labels as a PDF', query: labelQuery, answers: 'application/pdf',
}, async ({ event, db, query }) => {
  const pdf = await makeLabelPdf(db, query, labelBase(readBaseUrl(event), getRequestURL(event).origin))
  setResponseHeader(event, 'content-type', 'application/pdf')
  setResponseHeader(event, 'content-disposition', contentDisposition('inline', 'labels.pdf'))
  return pdf
})
