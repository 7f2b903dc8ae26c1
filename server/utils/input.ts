import type { H3Event } from 'h3'
import { getHeader, getMethod, getQuery, getRouterParams, readRawBody } from 'h3'
import type { z } from 'zod'
import { toFieldErrors } from '../../shared/schemas/field-errors'
import { badRequest, invalid, notFound, tooLarge, wrongMediaType } from './errors'

/** No form of ours comes near this; a longer body is a mistake or an attack. */
export const MAX_JSON_BYTES = 1_000_000

/** The body as text, or 413/415 before it is read. */
async function readJsonText(event: H3Event): Promise<string> {
  const type = getHeader(event, 'content-type') ?? ''
  if (!/^application\/([\w.+-]+\+)?json\b/i.test(type)) throw wrongMediaType('Send the form as application/json.')
  const announced = Number(getHeader(event, 'content-length') ?? Number.NaN)
  if (announced > MAX_JSON_BYTES) throw tooLarge('That is more text than one form holds (1 MB). Shorten it and save again.')
  if (Number.isNaN(announced) && getHeader(event, 'transfer-encoding')) throw badRequest('length-needed', 'Send a Content-Length header with the form.')
  return await readRawBody(event, 'utf8') ?? ''
}

/** The validated body: 400 if it is not JSON, 422 with one message per field if it does not hold. */
export async function readInput<S extends z.ZodType>(event: H3Event, schema: S): Promise<z.output<S>> {
  const text = await readJsonText(event)
  let body: unknown
  try {
    body = JSON.parse(text)
  } catch {
    throw badRequest('not-json', 'The form arrived damaged (it is not JSON). Send it again.')
  }
  const parsed = schema.safeParse(body)
  if (!parsed.success) throw invalid(toFieldErrors(parsed.error))
  return parsed.data
}

/** The path's parameters. A malformed tag or id names nothing: 404, in the schema's words. */
export function readParams<S extends z.ZodType>(event: H3Event, schema: S): z.output<S> {
  const parsed = schema.safeParse(getRouterParams(event, { decode: true }))
  if (!parsed.success) throw notFound(parsed.error.issues[0]?.message ?? 'There is nothing at this address.')
  return parsed.data
}

/** The query, or 400 with one message per parameter. */
export function readQuery<S extends z.ZodType>(event: H3Event, schema: S): z.output<S> {
  const parsed = schema.safeParse(getQuery(event))
  if (parsed.success) return parsed.data
  const errors = toFieldErrors(parsed.error)
  const problem = badRequest('bad-query', errors[0]?.message ?? 'The address asks for something that is not understood.')
  if (problem.data) problem.data.errors = errors
  throw problem
}

export const isWrite = (event: H3Event) => !['GET', 'HEAD', 'OPTIONS'].includes(getMethod(event))
