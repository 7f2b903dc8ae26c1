import { desc, eq, sql } from 'drizzle-orm'
import { people, triages, units } from '../../drizzle/schema'
import type { NewTriage } from '../../shared/schemas/triage'
import type { TriageView } from '../../shared/types/bench'
import type { Database } from '../utils/db'
import { conflict, invalid } from '../utils/errors'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import type { UnitRow } from './unit-lock'
import { getUnitRow, lockUnit } from './unit-lock'

function toView({ triage, doneBy }: { triage: typeof triages.$inferSelect, doneBy: string }): TriageView {
  return {
    safetyClass: triage.safetyClass,
    lead: triage.lead,
    plug: triage.plug,
    fuse: triage.fuse,
    fuseRating: triage.fuseRating,
    voltageSetting: triage.voltageSetting,
    hazards: triage.hazards,
    note: triage.note,
    verdict: triage.verdict,
    doneBy,
    doneAt: triage.createdAt.toISOString(),
  }
}

const selectTriages = (db: Database, unitId: string) => db.select({ triage: triages, doneBy: people.name }).from(triages)
  .innerJoin(people, eq(people.id, triages.doneBy)).where(eq(triages.unitId, unitId)).orderBy(desc(triages.createdAt), desc(triages.id))

/** The newest triage of a unit (by its row's id), which is the one that counts; null before the first. */
export async function findTriage(db: Database, unitId: string): Promise<TriageView | null> {
  const [row] = await selectTriages(db, unitId).limit(1)
  return row ? toView(row) : null
}

/** Every triage of a unit, the newest first; 404 if there is no such unit. */
export async function listTriagesOf(db: Database, tag: string): Promise<TriageView[]> {
  const rows = await selectTriages(db, (await getUnitRow(db, tag)).id)
  return rows.map(toView)
}

/**
 * Records a safety look. The verdict "hazard hold" puts the unit on hold with its reason; any other verdict lifts a
 * standing hold, and must then say what was done about the hazard (422). 409 for a unit that is not in the shop.
 */
export async function recordTriage(
  db: Database, actor: Actor, { tag, holdBecause, liftedBecause, ...look }: NewTriage & { tag: string },
): Promise<TriageView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    if (unit.state === 'dispatched') throw conflict('record-closed', 'The unit has been dispatched: nobody here can look at it. Take it back first, if it has come back.')
    await tx.insert(triages).values({ ...look, unitId: unit.id, doneBy: actor.id })
    await appendUnitLedger(tx, actor, unit.id, 'triaged', {
      verdict: look.verdict, safetyClass: look.safetyClass, hazards: look.hazards, ...look.note && { note: look.note },
    })
    if (look.verdict === 'hazard_hold') await hold(tx, actor, unit, holdBecause)
    else if (unit.hazardHold !== null) await lift(tx, actor, unit, liftedBecause)
    const triage = await findTriage(tx, unit.id)
    if (!triage) throw new Error('The triage was not written')
    return triage
  })
}

async function hold(tx: Database, actor: Actor, unit: UnitRow, why: string): Promise<void> {
  if (unit.hazardHold === why) return
  await tx.update(units).set({ hazardHold: why, version: sql`${units.version} + 1` }).where(eq(units.id, unit.id))
  await appendUnitLedger(tx, actor, unit.id, 'hazard_held', { why })
}

async function lift(tx: Database, actor: Actor, unit: UnitRow, why: string): Promise<void> {
  if (why === '') throw invalid([{ path: 'liftedBecause', message: 'Enter what was done about the hazard: this look lifts the hold' }])
  await tx.update(units).set({ hazardHold: null, version: sql`${units.version} + 1` }).where(eq(units.id, unit.id))
  await appendUnitLedger(tx, actor, unit.id, 'hazard_lifted', { why })
}
