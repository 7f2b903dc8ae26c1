import { lt, sql } from 'drizzle-orm'
import { idempotencyKeys, sessions } from '../../drizzle/schema'
import type { Database } from '../utils/db'

/** Forgets what has served its time: answers kept for retries after three days, and sessions that have expired. */
export async function prune(db: Database): Promise<{ keys: number, sessions: number }> {
  const keys = await db.delete(idempotencyKeys).where(lt(idempotencyKeys.createdAt, sql`now() - interval '3 days'`))
  const ended = await db.delete(sessions).where(lt(sessions.expiresAt, sql`now()`))
  return { keys: keys.rowCount ?? 0, sessions: ended.rowCount ?? 0 }
}
