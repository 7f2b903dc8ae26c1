import { asc, inArray } from 'drizzle-orm'
import { modifications } from '../../drizzle/schema'
import type { WorkFact } from '../../shared/domain/staleness'
import type { Database } from '../utils/db'

/** An entry as staleness asks, with the version under which it may be changed and the unit it belongs to. */
export interface WorkRecord extends WorkFact { unitId: string, version: number }

/** The work logs of some units (by their rows' ids), as far as staleness asks, in the order they were logged. */
export async function listWorkFacts(db: Database, unitIds: readonly string[]): Promise<WorkRecord[]> {
  if (unitIds.length === 0) return []
  const rows = await db.select({
    id: modifications.id, unitId: modifications.unitId, version: modifications.version, hand: modifications.hand, createdAt: modifications.createdAt,
    withdrawnAt: modifications.withdrawnAt, place: modifications.place, before: modifications.before, after: modifications.after,
    touches: modifications.touches, affectsNothingBecause: modifications.affectsNothingBecause,
  }).from(modifications).where(inArray(modifications.unitId, [...unitIds])).orderBy(asc(modifications.createdAt))
  return rows.map(({ createdAt, withdrawnAt, ...row }) => ({ ...row, loggedAt: createdAt.toISOString(), withdrawn: withdrawnAt !== null }))
}
