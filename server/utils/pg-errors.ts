import { DrizzleQueryError } from 'drizzle-orm'

/** Whether a write was refused by this named constraint. Drizzle wraps the driver's error. */
export function violates(error: unknown, constraint: string): boolean {
  const cause = error instanceof DrizzleQueryError ? error.cause : error
  return cause instanceof Error && 'constraint' in cause && cause.constraint === constraint
}
