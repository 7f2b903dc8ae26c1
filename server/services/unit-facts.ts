import { and, desc, eq, isNull, max } from 'drizzle-orm'
import { keptWithItems, modifications, safetyChecks, triages, unitDisclosures } from '../../drizzle/schema'
import { DISCLOSURE_KEYS, DISCLOSURES } from '../../shared/domain/disclosures'
import { guardLinks } from '../../shared/domain/unit-moves'
import type { UnitFacts } from '../../shared/domain/unit-states'
import type { Database } from '../utils/db'
import { countPulled } from './pulled-lots'
import type { UnitRow } from './unit-lock'

/** What the person making a move says with it. */
export interface SaidWithMove { reason: string | null, ownerConsent: boolean, missingSaleDetails: readonly string[] }

/** For showing which moves are open before anything has been said: what the form will ask for is taken as answered. */
export const NOTHING_LEFT_UNSAID: SaidWithMove = { reason: 'asked for by the form', ownerConsent: true, missingSaleDetails: [] }

/** When work was last done on a unit, as logged; null if never. What an earlier hand did, or was left alone, is not work. */
export async function findLastWork(db: Database, unitId: string): Promise<Date | null> {
  const [row] = await db.select({ at: max(modifications.createdAt) }).from(modifications)
    .where(and(eq(modifications.unitId, unitId), eq(modifications.hand, 'done_by_us'), isNull(modifications.withdrawnAt)))
  return row?.at ?? null
}

/** When the unit passed its safety check: the newest check counts, so a later failure leaves it without a pass. */
async function findSafetyPass(db: Database, unitId: string): Promise<Date | null> {
  const [newest] = await db.select({ at: safetyChecks.createdAt, passed: safetyChecks.passed }).from(safetyChecks)
    .where(eq(safetyChecks.unitId, unitId)).orderBy(desc(safetyChecks.createdAt)).limit(1)
  return newest?.passed ? newest.at : null
}

/** Kept-with items that stop a dispatch: neither packed nor disclosed to the buyer as absent. */
async function listNotPacked(db: Database, unitId: string): Promise<string[]> {
  const items = await db.select().from(keptWithItems)
    .where(and(eq(keptWithItems.unitId, unitId), isNull(keptWithItems.removedAt), isNull(keptWithItems.packedAt)))
    .orderBy(keptWithItems.createdAt)
  return items.filter(item => item.whereabouts === 'with_unit' || item.absenceDisclosed === '').map(item => item.description)
}

/** Gathers, in one place, everything the guards of `decideMove` look at. */
export async function gatherUnitFacts(db: Database, unit: UnitRow, said: SaidWithMove): Promise<UnitFacts> {
  const [triage] = await db.select({ id: triages.id }).from(triages).where(eq(triages.unitId, unit.id)).limit(1)
  const answered = await db.select({ key: unitDisclosures.key }).from(unitDisclosures).where(eq(unitDisclosures.unitId, unit.id))
  const keys = new Set(answered.map(({ key }) => key))
  const lastWork = await findLastWork(db, unit.id)
  const safetyPass = await findSafetyPass(db, unit.id)
  return {
    hasTriage: triage !== undefined,
    hazardHold: unit.hazardHold !== null,
    lastWorkAt: lastWork?.toISOString() ?? null,
    lastSafetyPass: safetyPass?.toISOString() ?? null,
    notEnergisedDisclosure: unit.notEnergisedDisclosure !== null,
    missingDisclosures: DISCLOSURE_KEYS.filter(key => !keys.has(key)).map(key => DISCLOSURES[key].label),
    askingPriceMinor: unit.askingMinor,
    missingSaleDetails: said.missingSaleDetails,
    keptWithNotPacked: await listNotPacked(db, unit.id),
    pulledLots: await countPulled(db, unit.id),
    ownership: unit.ownership,
    ownerConsent: said.ownerConsent,
    reason: said.reason,
    links: guardLinks(unit.tag),
  }
}
