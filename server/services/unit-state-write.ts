import { eq, sql } from 'drizzle-orm'
import { units } from '../../drizzle/schema'
import type { UnitState } from '../../shared/domain/unit-state-names'
import type { Database } from '../utils/db'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import type { UnitRow } from './unit-lock'

/** Writes a decided move of a locked unit and its ledger entry. The caller has asked the domain whether it may be made. */
export async function writeState(
  tx: Database, actor: Actor | null, unit: UnitRow, to: UnitState, why: string | null, also: Partial<typeof units.$inferInsert> = {},
): Promise<void> {
  await tx.update(units).set({ ...also, state: to, version: sql`${units.version} + 1` }).where(eq(units.id, unit.id))
  await appendUnitLedger(tx, actor, unit.id, 'state_changed', { from: unit.state, to, ...why === null ? {} : { why } })
}
