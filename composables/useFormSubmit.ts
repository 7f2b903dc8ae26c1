import type { z } from 'zod'
import { toFieldErrors } from '#shared/schemas/field-errors'
import type { FieldError, Problem } from '#shared/types/problem'

/** The problem a refused request carries, or null when the server was not reached or said something else. */
export function problemOf(error: unknown): Problem | null {
  // `$fetch` throws a FetchError, `useFetch` gives a NuxtError: both carry what the server said.
  const data: unknown = error instanceof Error && 'data' in error ? error.data : null
  return isProblem(data) ? data : null
}

function isProblem(data: unknown): data is Problem {
  return typeof data === 'object' && data !== null && 'detail' in data && 'code' in data && 'status' in data
}

/**
 * One form's submission: checks the answers with the schema the server uses, sends them once however often the button
 * is pressed, and turns any refusal into messages beside the fields. What was typed is never touched.
 *
 * Each opened form has one idempotency key, so that a retry after a lost connection is not a second record.
 */
export function useFormSubmit<S extends z.ZodType, Result>(
  schema: S,
  send: (input: z.output<S>, headers: { 'idempotency-key': string }) => Promise<Result>,
) {
  const errors = ref<FieldError[]>([])
  const problem = ref<Problem | null>(null)
  const pending = ref(false)
  let key = newIdempotencyKey()

  const errorFor = (path: string) => errors.value.find(error => error.path === path)?.message

  /** The server's answer, or null when something is to be put right first. */
  async function submit(answers: unknown): Promise<Result | null> {
    if (pending.value) return null
    problem.value = null
    const parsed = schema.safeParse(answers)
    errors.value = parsed.success ? [] : toFieldErrors(parsed.error)
    if (!parsed.success) return null
    pending.value = true
    try {
      const result = await send(parsed.data, { 'idempotency-key': key })
      key = newIdempotencyKey()
      return result
    } catch (error) {
      problem.value = problemOf(error)
      // A refusal wrote nothing, so its key is spent; a lost connection may have written, so its key is kept.
      if (problem.value) key = newIdempotencyKey()
      errors.value = problem.value?.errors ?? [{
        path: '', message: problem.value?.detail ?? 'The shop’s server could not be reached. What you typed is still here: try again.',
      }]
      return null
    } finally {
      pending.value = false
    }
  }

  return { errors: readonly(errors) as Readonly<Ref<FieldError[]>>, problem: readonly(problem), pending: readonly(pending), errorFor, submit }
}
