import { fileTypeFromBuffer } from 'file-type'
import { MAX_DOCUMENT_BYTES } from '../../shared/domain/photo-sizes'
import { invalid, tooLarge, wrongMediaType } from './errors'

const TAIL_BYTES = 4096

/**
 * Judges a document by its content: it must begin as a PDF, and end as one with a cross-reference table that lies inside
 * the file (ISO 32000-1, 7.5.5). Throws 413, 415, or 422 when it is a PDF that has lost its end.
 */
export async function inspectPdf(bytes: Uint8Array): Promise<void> {
  if (bytes.byteLength > MAX_DOCUMENT_BYTES) throw tooLarge(`The document is more than ${MAX_DOCUMENT_BYTES / 1_000_000} MB. Send a smaller one.`)
  const type = await fileTypeFromBuffer(bytes)
  if (type?.mime !== 'application/pdf') throw wrongMediaType('This is not a PDF, whatever its name says. Send the document as a PDF.')
  const tail = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength).subarray(-TAIL_BYTES).toString('latin1')
  const start = /startxref\s+(\d+)\s+%%EOF/.exec(tail)?.[1]
  if (start === undefined || Number(start) >= bytes.byteLength) {
    throw invalid([{ path: 'file', message: 'This PDF is damaged or only half arrived. Send it again.' }])
  }
}
