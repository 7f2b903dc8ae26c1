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

/**
 * Hands over a PDF that somebody put in the store. A PDF can carry script: it is given as a file, and should a browser open
 * it all the same, in a sandbox.
 */
export function sendStoredPdf(event: H3Event, { name, bytes }: { name: string, bytes: Buffer }): Buffer {
  setResponseHeaders(event, {
    'content-type': 'application/pdf',
    'content-disposition': contentDisposition('attachment', name),
    'content-security-policy': 'default-src \'none\'; sandbox',
    'cache-control': 'private, max-age=31536000, immutable',
    'x-content-type-options': 'nosniff',
  })
  return bytes
}
