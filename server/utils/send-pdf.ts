import type { H3Event } from 'h3'
import { setResponseHeaders } from 'h3'
import { contentDisposition } from './content-disposition'

/** Sends a PDF to be shown, under a name for saving it. */
export function sendPdf(event: H3Event, bytes: Buffer, name: string): Buffer {
  setResponseHeaders(event, {
    'content-type': 'application/pdf',
    'content-disposition': contentDisposition('inline', name),
    'x-content-type-options': 'nosniff',
  })
  return bytes
}
