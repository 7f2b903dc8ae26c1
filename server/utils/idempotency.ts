import { and, eq } from 'drizzle-orm'
import { idempotencyKeys } from '../../drizzle/schema'
import { badRequest, conflict } from './errors'
import type { Database } from './db'
import { useDb } from './db'

export interface Answer { status: number, body: unknown }

/**
 * Runs a write once per key. Key, write and remembered answer share one transaction, so a retry either waits for the
 * first and gets its answer, or finds that nothing of it happened.
 */
export async function once(
  { personId, key, fingerprint }: { personId: string, key: string, fingerprint: string },
  write: (db: Database) => Promise<Answer>,
): Promise<Answer> {
  if (!/^[\w-]{8,100}$/.test(key)) throw badRequest('bad-idempotency-key', 'The Idempotency-Key header must be 8 to 100 letters, digits or dashes.')
  return useDb().transaction(async (tx) => {
    const claimed = await tx.insert(idempotencyKeys).values({ personId, key, fingerprint }).onConflictDoNothing().returning()
    const mine = and(eq(idempotencyKeys.personId, personId), eq(idempotencyKeys.key, key))
    if (claimed.length === 0) {
      const [earlier] = await tx.select().from(idempotencyKeys).where(mine)
      if (!earlier || earlier.status === null || earlier.fingerprint !== fingerprint) {
        throw conflict('idempotency-key-used', 'This key was already used for another request.')
      }
      return { status: earlier.status, body: earlier.answer }
    }
    const answer = await write(tx)
    await tx.update(idempotencyKeys).set({ status: answer.status, answer: answer.body ?? null }).where(mine)
    return answer
  })
}
