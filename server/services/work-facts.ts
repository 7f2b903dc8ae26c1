import { asc, eq } from 'drizzle-orm'
import { modifications } from '../../drizzle/schema'
import type { WorkFact } from '../../shared/domain/staleness'
import type { Database } from '../utils/db'

/** A unit's work log, as far as staleness asks, in the order it was logged. */
export async function listWorkFacts(db: Database, unitId: string): Promise<WorkFact[]> {
  const rows = await db.select({
    id: modifications.id, hand: modifications.hand, createdAt: modifications.createdAt, withdrawnAt: modifications.withdrawnAt,
    place: modifications.place, before: modifications.before, after: modifications.after,
  }).from(modifications).where(eq(modifications.unitId, unitId)).orderBy(asc(modifications.createdAt))
  return rows.map(({ createdAt, withdrawnAt, ...row }) => ({ ...row, loggedAt: createdAt.toISOString(), withdrawn: withdrawnAt !== null }))
}
