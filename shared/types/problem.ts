import type { HealthCheck } from './health'

/** RFC 9457 problem details, as every refused request answers. */
export interface Problem {
  title: string
  status: number
  /** The sentence a person reads. */
  detail: string
  /** Stable, for scripts. */
  code: string
  /** For a form: one message per field, `path` as `bands.0.lowerHz`. */
  errors?: FieldError[]
  /** For a stale write: the row as it stands now. */
  current?: unknown
  /** For a refused move: every guard that refused. */
  refusals?: Refusal[]
  /** For a server that is not ready: what answers and what does not. */
  checks?: HealthCheck[]
}

export interface FieldError { path: string, message: string }

/** A guard that refused, in words, and what would satisfy it. */
export interface Refusal { guard: string, sentence: string, remedy: string, href?: string }
