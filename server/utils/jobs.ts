import { sql } from 'drizzle-orm'
import type { Database } from './db'

/** Work done after the answer, and what each kind is told. */
export interface JobPayloads {
  /** Make the AVIF sizes of a photo's file. */
  'make-avif': { fileId: string }
  /** Release the holds whose last day is past. */
  'release-lapsed-holds': Record<string, never>
  /** Forget remembered answers and sessions that are past their use. */
  'prune': Record<string, never>
}
export type JobName = keyof JobPayloads

/** Adds a job in the transaction that needs it: it runs if, and only if, the transaction commits. */
export async function addJob<N extends JobName>(tx: Database, name: N, payload: JobPayloads[N]): Promise<void> {
  await tx.execute(sql`select graphile_worker.add_job(${name}, payload => ${JSON.stringify(payload)}::json)`)
}
