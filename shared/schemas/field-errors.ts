import type { z } from 'zod'
import type { FieldError } from '../types/problem'

/** The first message for each field, in the order of the form. */
export function toFieldErrors(error: z.ZodError): FieldError[] {
  const seen = new Set<string>()
  const errors: FieldError[] = []
  for (const issue of error.issues) {
    const path = issue.path.join('.')
    if (seen.has(path)) continue
    seen.add(path)
    errors.push({ path, message: issue.message })
  }
  return errors
}
