import { get } from '../context'
import type { BenchRows } from '../context'

/** A sheet of labels beside the bare drawing of as many QR codes, which also hold a URL with a tag. */
export const rows: BenchRows = async ({ app, bare, browser, tags }) => {
  const sheet = tags.slice(0, 24)
  return [{
    name: `GET /api/labels.pdf, ${sheet.length} labels`,
    against: 'bare pdfkit, as many QR codes',
    subject: () => get(`${app}/api/labels.pdf?tags=${sheet.join(',')}`, browser),
    baseline: () => get(`${bare}/labels?tags=${sheet.join(',')}`),
  }]
}
