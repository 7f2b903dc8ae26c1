import type { z } from 'zod'
import { badRequest } from './errors'

/** A place in a list as an opaque word that survives a URL. */
export function writeCursor(place: unknown): string {
  return Buffer.from(JSON.stringify(place)).toString('base64url')
}

/** The place a cursor names, or 400 for one that this list did not give out. */
export function readCursor<S extends z.ZodType>(cursor: string, schema: S): z.output<S> {
  const refusal = badRequest('bad-cursor', 'That cursor is not one of ours: start again from the first page.')
  let place: unknown
  try {
    place = JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'))
  } catch {
    throw refusal
  }
  const parsed = schema.safeParse(place)
  if (!parsed.success) throw refusal
  return parsed.data
}
