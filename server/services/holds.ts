import { and, eq, isNull, lt } from 'drizzle-orm'
import { holds, units } from '../../drizzle/schema'
import type { Database } from '../utils/db'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import { todayInShop } from './shop-day'
import { lockUnit } from './unit-lock'
import type { UnitRow } from './unit-lock'
import { writeState } from './unit-state-write'

export type HoldRow = typeof holds.$inferSelect

/** The hold that stands on a unit, if any. */
export async function findHold(db: Database, unitId: string): Promise<HoldRow | null> {
  const [hold] = await db.select().from(holds).where(and(eq(holds.unitId, unitId), isNull(holds.releasedAt)))
  return hold ?? null
}

/** Ends the standing hold of a locked unit, if there is one, whatever state the unit goes to. */
export async function endHold(tx: Database, actor: Actor | null, unitId: string, why: string): Promise<void> {
  const hold = await findHold(tx, unitId)
  if (!hold) return
  await tx.update(holds).set({ releasedAt: new Date() }).where(eq(holds.id, hold.id))
  await appendUnitLedger(tx, actor, unitId, 'hold_released', { heldFor: hold.heldFor, why })
}

/**
 * Releases every hold whose last day is past in the shop's time zone; the units are offered again. The product does it
 * itself, so the ledger names nobody. Safe to call from a job and from a page at once.
 *
 * @returns how many lapsed
 */
export async function releaseLapsedHolds(db: Database): Promise<number> {
  const today = await todayInShop(db)
  const lapsed = await db.select({ tag: units.tag }).from(holds).innerJoin(units, eq(units.id, holds.unitId))
    .where(and(isNull(holds.releasedAt), lt(holds.until, today)))
  let count = 0
  for (const { tag } of lapsed) {
    count += await db.transaction(tx => releaseIfLapsed(tx, tag, today))
  }
  return count
}

async function releaseIfLapsed(tx: Database, tag: string, today: string): Promise<number> {
  const unit: UnitRow = await lockUnit(tx, tag)
  const hold = await findHold(tx, unit.id)
  if (!hold || hold.until >= today) return 0
  const why = 'The hold lapsed'
  await endHold(tx, null, unit.id, why)
  if (unit.state === 'held') await writeState(tx, null, unit, 'offered', why)
  return 1
}
