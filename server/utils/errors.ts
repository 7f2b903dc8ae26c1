import { createError, type H3Error } from 'h3'
import type { FieldError, Problem, Refusal } from '../../shared/types/problem'

const TITLES: Record<number, string> = {
  400: 'Bad request', 401: 'Sign-in needed', 403: 'Not allowed', 404: 'Not found', 409: 'Conflict', 413: 'Too large',
  415: 'Wrong kind of file', 422: 'There is a problem', 429: 'Too many tries', 500: 'Something broke', 503: 'Not ready',
}

/** The problem travels in the error's `data`; the error handler writes it out as `application/problem+json`. */
function problem(status: number, code: string, detail: string, extra: Partial<Problem> = {}): H3Error<Problem> {
  const title = TITLES[status] ?? 'Problem'
  return createError<Problem>({
    statusCode: status, statusMessage: title, message: detail, data: { title, status, detail, code, ...extra },
  })
}

/** 400: the request itself is not understood. */
export const badRequest = (code: string, detail: string) => problem(400, code, detail)
/** 401: nobody is signed in. */
export const signInNeeded = (detail = 'Sign in to see this.', code = 'sign-in-needed') => problem(401, code, detail)
/** 403: signed in, but not for this. */
export const forbidden = (detail: string, code = 'not-allowed') => problem(403, code, detail)
/** 404, naming the thing: `notFound('No unit has the tag U 000041 N.')`. */
export const notFound = (detail: string, code = 'not-found') => problem(404, code, detail)
/** 409: a rule of the shop refuses. */
export const conflict = (code: string, detail: string, extra: { refusals?: Refusal[], current?: unknown } = {}) => problem(409, code, detail, extra)
/** 409: somebody else saved first. The form shows both. */
export const stale = (what: string, current: unknown) =>
  problem(409, 'stale', `Somebody else changed this ${what} while you had it open. Nothing of yours is lost: compare, then save again.`, { current })
export const tooLarge = (detail: string) => problem(413, 'too-large', detail)
export const wrongMediaType = (detail: string) => problem(415, 'wrong-media-type', detail)
/** 422: what was sent does not hold; one message per field. */
export const invalid = (errors: FieldError[]) =>
  problem(422, 'invalid', errors.length === 1 && errors[0] ? errors[0].message : `There are ${errors.length} things to put right.`, { errors })
export const tooMany = (detail: string) => problem(429, 'too-many', detail)
export const notReady = (detail: string, extra: Pick<Problem, 'checks'> = {}) => problem(503, 'not-ready', detail, extra)
