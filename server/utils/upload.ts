import type { H3Event } from 'h3'
import { getHeader, readMultipartFormData } from 'h3'
import type { z } from 'zod'
import { toFieldErrors } from '../../shared/schemas/field-errors'
import { badRequest, invalid, tooLarge, wrongMediaType } from './errors'

/** Room for the other fields of the form and for the boundaries between them. */
const FORM_OVERHEAD_BYTES = 100_000

export interface Upload<Fields> {
  /** What the person called it; says nothing of what it is. */
  name: string
  bytes: Buffer
  fields: Fields
}

/**
 * One file (`file`) and the fields beside it, from a multipart form. Refused before it is read: 411 in words when its
 * length is not announced, 413 when it is longer than `maxBytes`. 422 when a field does not hold or no file came.
 */
export async function readUpload<S extends z.ZodType>(event: H3Event, schema: S, maxBytes: number): Promise<Upload<z.output<S>>> {
  if (!/^multipart\/form-data\b/i.test(getHeader(event, 'content-type') ?? '')) throw wrongMediaType('Send the file as multipart/form-data.')
  const announced = Number(getHeader(event, 'content-length') ?? Number.NaN)
  if (Number.isNaN(announced)) throw badRequest('length-needed', 'Send a Content-Length header with the file.')
  if (announced > maxBytes + FORM_OVERHEAD_BYTES) throw tooLarge(`The file is more than ${maxBytes / 1_000_000} MB. Send a smaller one.`)
  const parts = await readMultipartFormData(event) ?? []
  const file = parts.find(part => part.name === 'file' && part.filename !== undefined)
  const typed = parts.flatMap(part => part.name && part.filename === undefined ? [[part.name, part.data.toString('utf8')]] : [])
  const parsed = schema.safeParse(Object.fromEntries(typed))
  if (!parsed.success) throw invalid(toFieldErrors(parsed.error))
  if (!file || file.data.byteLength === 0) throw invalid([{ path: 'file', message: 'Choose a file to add' }])
  return { name: cleanName(file.filename ?? ''), bytes: file.data, fields: parsed.data }
}

/** A file name as one line without folders or control characters, never empty. */
function cleanName(name: string): string {
  const last = name.normalize('NFC').split(/[/\\]/).at(-1) ?? ''
  return last.replaceAll(/\p{Cc}/gu, '').trim().slice(-200) || 'unnamed'
}
