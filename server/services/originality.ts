import { and, asc, eq, inArray, isNull, sql } from 'drizzle-orm'
import { fittings, modifications, partLots, partTypes, units } from '../../drizzle/schema'
import { modificationHeading } from '../../shared/domain/modification-words'
import type { Originality } from '../../shared/domain/originality'
import { originalityOf } from '../../shared/domain/originality'
import { BODY_KINDS } from '../../shared/domain/part-lots'
import { partTitle } from '../../shared/domain/part-words'
import type { ExaminedInside } from '../../shared/schemas/originality'
import type { Person } from '../../shared/types/person'
import type { OriginalityView } from '../../shared/types/unit'
import type { Database } from '../utils/db'
import { invalid, stale } from '../utils/errors'
import { appendUnitLedger } from './ledger'
import { todayInShop } from './shop-day'
import type { UnitRow } from './unit-lock'
import { getUnitRow, lockUnit } from './unit-lock'

/** How original a unit is, from the entries of its work log that stand and the body parts it has of other pieces. */
export async function gradeOriginality(db: Database, unit: Pick<UnitRow, 'id' | 'examinedInsideOn'>): Promise<Originality> {
  const entries = await db.select().from(modifications).where(and(eq(modifications.unitId, unit.id), isNull(modifications.withdrawnAt))).orderBy(asc(modifications.createdAt), asc(modifications.id))
  const bodies = await db.select({ description: partTypes.description, value: partTypes.value }).from(fittings)
    .innerJoin(partLots, eq(partLots.id, fittings.lotId)).innerJoin(partTypes, eq(partTypes.id, partLots.typeId))
    .where(and(
      eq(fittings.unitId, unit.id), isNull(fittings.undoneAt), isNull(fittings.removedAt), inArray(partTypes.kind, [...BODY_KINDS]),
      sql`${partLots.donorUnitId} is not null and ${partLots.donorUnitId} <> ${unit.id}`,
    ))
  return originalityOf({
    entries: entries.map(entry => ({ ...entry, heading: modificationHeading(entry) })),
    bodyParts: bodies.map(body => partTitle(body)),
    examinedInsideOn: unit.examinedInsideOn,
  })
}

/** The same with what is noted of looking inside. */
export async function viewOriginality(db: Database, unit: UnitRow): Promise<OriginalityView> {
  return { ...await gradeOriginality(db, unit), examinedInsideOn: unit.examinedInsideOn, examinedInsideNote: unit.examinedInsideNote }
}

/** Notes that somebody looked inside, on which day and how far; no day takes the note back. 409 for a stale version, 422 for a day to come. */
export async function noteExaminedInside(db: Database, actor: Person, { tag, on, note, version }: ExaminedInside & { tag: string }): Promise<OriginalityView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    if (unit.version !== version) throw stale('unit', await viewOriginality(tx, unit))
    if (on !== null && on > await todayInShop(tx)) throw invalid([{ path: 'on', message: 'The day must be today or in the past' }])
    if (on !== unit.examinedInsideOn || note !== unit.examinedInsideNote) {
      await tx.update(units).set({ examinedInsideOn: on, examinedInsideNote: on === null ? '' : note, version: sql`${units.version} + 1` }).where(eq(units.id, unit.id))
      await appendUnitLedger(tx, actor, unit.id, 'examined_inside', { on, note: on === null ? '' : note })
    }
    return viewOriginality(tx, await getUnitRow(tx, tag))
  })
}
