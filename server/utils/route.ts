import type { EventHandler, H3Event } from 'h3'
import { defineEventHandler, getHeader, getRequestURL, isError, setResponseHeader, setResponseStatus } from 'h3'
import { consola } from 'consola'
import type { z } from 'zod'
import type { Person } from '../../shared/types/person'
import type { Problem } from '../../shared/types/problem'
import type { Database } from './db'
import { useDb } from './db'
import type { May } from './guard'
import { requireMay } from './guard'
import { once } from './idempotency'
import { isWrite, readInput, readParams, readQuery } from './input'
import { sha256 } from './person'

/** What a route says of itself: who may, what it takes, what it answers with. Also the source of `/api/openapi.json`. */
export interface RouteDefinition<M extends May, P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType> {
  may: M
  summary: string
  params?: P
  query?: Q
  body?: B
  /** Success status; 200 if not said. */
  status?: number
  /** What the answer is when it is not JSON, or a multipart body when the route takes files. */
  answers?: 'application/pdf' | 'image/*' | 'text/csv' | 'application/json'
  takes?: 'multipart/form-data'
  /** The answer holds a secret shown once, so it is not kept for a retry. */
  answersSecret?: boolean
}

export interface RouteContext<M extends May, P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType> {
  event: H3Event
  db: Database
  /** Null only where anyone may come. */
  person: M extends 'anyone' ? Person | null : Person
  sessionId: string | null
  params: z.output<P>
  query: z.output<Q>
  body: z.output<B>
}

export type AnyRouteDefinition = RouteDefinition<May, z.ZodType, z.ZodType, z.ZodType>
export type Route<T> = EventHandler<Request, Promise<T>> & { definition: AnyRouteDefinition }

/** Who may → validated input → one call → typed answer; refusals leave as problem details. */
export function defineRoute<T, M extends May, P extends z.ZodType = z.ZodUndefined, Q extends z.ZodType = z.ZodUndefined, B extends z.ZodType = z.ZodUndefined>(
  definition: RouteDefinition<M, P, Q, B>,
  handle: (context: RouteContext<M, P, Q, B>) => Promise<T>,
) {
  const handler = defineEventHandler(async (event): Promise<T> => {
    try {
      return await answer(event, definition, handle)
    } catch (error) {
      // The problem's type differs from the answer's; callers see it as a thrown fetch error, never as a T.
      return refuse(event, error)
    }
  })
  return Object.assign(handler, { definition })
}

async function answer<T, M extends May, P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType>(
  event: H3Event, definition: RouteDefinition<M, P, Q, B>, handle: (context: RouteContext<M, P, Q, B>) => Promise<T>,
): Promise<T> {
  const proof = await requireMay(event, definition.may)
  setResponseHeader(event, 'cache-control', 'no-store')
  const common = {
    event,
    // Proved by the guard: it throws unless somebody is signed in or anyone may come.
    person: (proof?.person ?? null) as RouteContext<M, P, Q, B>['person'],
    sessionId: proof?.sessionId ?? null,
    params: (definition.params ? readParams(event, definition.params) : undefined) as z.output<P>,
    query: (definition.query ? readQuery(event, definition.query) : undefined) as z.output<Q>,
    body: (definition.body ? await readInput(event, definition.body) : undefined) as z.output<B>,
  }
  const status = definition.status ?? 200
  const key = getHeader(event, 'idempotency-key')
  if (key && proof && isWrite(event) && !definition.answersSecret && definition.takes !== 'multipart/form-data') {
    const fingerprint = sha256(`${event.method} ${getRequestURL(event).pathname} ${JSON.stringify(common.body ?? null)}`)
    const kept = await once({ personId: proof.person.id, key, fingerprint }, async db => ({ status, body: await handle({ ...common, db }) }))
    setResponseStatus(event, kept.status)
    return kept.body as T
  }
  const result = await handle({ ...common, db: useDb() })
  setResponseStatus(event, status)
  return result
}

/** Writes the problem out. What we did not mean to throw is logged and said in general words: no stack, no SQL. */
function refuse(event: H3Event, error: unknown): never {
  const problem: Problem = isError<Problem>(error) && error.data?.code
    ? error.data
    : isError(error) && error.statusCode < 500
      ? { title: error.statusMessage ?? 'Bad request', status: error.statusCode, detail: 'The request was not understood.', code: 'bad-request' }
      : unexpected(event, error)
  setResponseStatus(event, problem.status)
  setResponseHeader(event, 'content-type', 'application/problem+json; charset=utf-8')
  setResponseHeader(event, 'cache-control', 'no-store')
  // h3 sends a string as it stands; this keeps the answer's type out of the refusal's way.
  return JSON.stringify(problem) as never
}

function unexpected(event: H3Event, error: unknown): Problem {
  // Only the error's own message and stack: never the body, which may hold names or a password.
  consola.error(`${event.method} ${getRequestURL(event).pathname}`, error instanceof Error ? withoutParameters(error) : error)
  return { title: 'Something broke', status: 500, detail: 'Something broke on our side. Nothing was saved; what you typed is still here. Try again.', code: 'unexpected' }
}

/** A database error's message lists the parameters of the statement, which may be personal. */
function withoutParameters(error: Error): string {
  const cause = error.cause instanceof Error ? ` (${error.cause.message})` : ''
  return `${error.name}: ${error.message.split('\nparams:')[0]}${cause}\n${(error.stack ?? '').split('\n').filter(line => line.trimStart().startsWith('at ')).join('\n')}`
}
