import { and, asc, eq, inArray, isNull, sql } from 'drizzle-orm'
import { alias } from 'drizzle-orm/pg-core'
import { fittings, lotMovements, models, modifications, partLots, partTypes, units } from '../../drizzle/schema'
import { fittedInWords, lotTitle, partTitle } from '../../shared/domain/part-words'
import { may } from '../../shared/domain/roles'
import type { AddedFitting, UndoneFitting } from '../../shared/schemas/fitting'
import type { FittingView } from '../../shared/types/part'
import type { Person } from '../../shared/types/person'
import type { Database } from '../utils/db'
import { conflict, invalid, notFound } from '../utils/errors'
import { appendUnitLedger } from './ledger'
import type { LotRow } from './lot-stock'
import { inLotUnits, lockLots, requireEnough, reverseMovement, takeStock } from './lot-stock'
import type { LotReader } from './lot-view'
import type { FittingRow } from './fitting-parts'
import { fitParts } from './fitting-parts'
import { requireOpenLog } from './work-log-guard'
import type { UnitRow } from './unit-lock'
import { getUnitRow, lockUnit } from './unit-lock'

const oldLots = alias(partLots, 'old_lots')
const oldTypes = alias(partTypes, 'old_types')

const selectFittings = (db: Database) => db.select({
  fitting: fittings, doneOn: modifications.doneOn, unitTag: units.tag, maker: models.maker, designation: models.designation, lot: partLots, type: partTypes,
  oldTag: oldLots.tag, oldDescription: oldTypes.description, oldValue: oldTypes.value,
}).from(fittings)
  .innerJoin(modifications, eq(modifications.id, fittings.modificationId))
  .innerJoin(units, eq(units.id, fittings.unitId))
  .innerJoin(models, eq(models.id, units.modelId))
  .leftJoin(partLots, eq(partLots.id, fittings.lotId))
  .leftJoin(partTypes, eq(partTypes.id, partLots.typeId))
  .leftJoin(oldLots, eq(oldLots.id, fittings.oldLotId))
  .leftJoin(oldTypes, eq(oldTypes.id, oldLots.typeId))
type SelectedFitting = Awaited<ReturnType<typeof selectFittings>>[number]

function toView(row: SelectedFitting, { role }: LotReader): FittingView {
  const { fitting, lot, type } = row
  const seesCost = may(role, 'cost.read')
  return {
    id: fitting.id,
    modificationId: fitting.modificationId,
    unit: { tag: row.unitTag, title: `${row.maker} ${row.designation}` },
    lot: lot && type && { tag: lot.tag, title: partTitle(type) },
    lotStanding: lot?.standing ?? null,
    description: type ? partTitle(type) : fitting.description,
    quantity: fitting.quantity,
    countedIn: type?.countedIn ?? 'piece',
    circuitReference: fitting.circuitReference,
    replaced: fitting.replaced,
    disposition: fitting.disposition,
    oldPartLot: row.oldTag === null ? null : { tag: row.oldTag, title: partTitle({ description: row.oldDescription ?? '', value: row.oldValue ?? '' }) },
    costMinor: seesCost ? fitting.costMinor : null,
    currency: seesCost ? fitting.currency : null,
    fittedOn: row.doneOn ?? fitting.createdAt.toISOString().slice(0, 10),
    isRemoved: fitting.removedAt !== null,
    undoneBecause: fitting.undoneBecause,
  }
}

/** Every part that we placed in a unit (by its row's id), in the order it was fitted, with those taken out or undone since. */
export async function listFittings(db: Database, reader: LotReader, unitId: string): Promise<FittingView[]> {
  const rows = await selectFittings(db).where(eq(fittings.unitId, unitId)).orderBy(asc(fittings.createdAt), asc(fittings.id))
  return rows.map(row => toView(row, reader))
}

/** The same by the unit's tag; 404 if there is no such unit. */
export async function listFittingsOf(db: Database, reader: LotReader, tag: string): Promise<FittingView[]> {
  return listFittings(db, reader, (await getUnitRow(db, tag)).id)
}

/** The parts that stand fitted in a unit, in words that its buyer may read, by the entry of the work log. */
export async function mapFitted(db: Database, unitId: string): Promise<Map<string, string[]>> {
  const rows = await selectFittings(db).where(and(eq(fittings.unitId, unitId), isNull(fittings.undoneAt))).orderBy(asc(fittings.createdAt), asc(fittings.id))
  const donors = await mapDonorTags(db, rows.flatMap(({ lot }) => lot?.donorUnitId ?? []))
  const byEntry = new Map<string, string[]>()
  for (const { fitting, lot, type } of rows) {
    const words = fittedInWords(fitting, lot && type ? { ...lot, type, donorTag: lot.donorUnitId === null ? null : donors.get(lot.donorUnitId) ?? null } : null)
    byEntry.set(fitting.modificationId, [...byEntry.get(fitting.modificationId) ?? [], words])
  }
  return byEntry
}

async function mapDonorTags(db: Database, unitIds: string[]): Promise<Map<string, string>> {
  if (unitIds.length === 0) return new Map()
  const rows = await db.select({ id: units.id, tag: units.tag }).from(units).where(inArray(units.id, unitIds))
  return new Map(rows.map(({ id, tag }) => [id, tag]))
}

/** Adds a part to an entry that is logged already. Refusals as for `fitParts`; 409 when the log is closed or the entry withdrawn. */
export async function addFitting(db: Database, actor: Person, { tag, modificationId, ...input }: AddedFitting & { tag: string }): Promise<FittingView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    const [entry] = await tx.select().from(modifications).where(and(eq(modifications.id, modificationId), eq(modifications.unitId, unit.id)))
    if (!entry) throw invalid([{ path: 'modificationId', message: 'Choose an entry of this unit’s work log' }])
    requireOpenLog(unit, { hand: 'done_by_us', ownerConsent: entry.ownerConsent })
    if (entry.withdrawnAt !== null) throw conflict('withdrawn', 'This entry has been withdrawn. Log a new one instead.')
    if (entry.hand !== 'done_by_us') throw conflict('not-our-work', 'Only work of ours takes parts out of our drawers. Log what was fitted as a new entry.')
    const [id] = await fitParts(tx, actor, unit, modificationId, [input], (_index, field) => field)
    const [row] = await selectFittings(tx).where(eq(fittings.id, id ?? ''))
    if (!row) throw new Error('A fitting was not written')
    return toView(row, actor)
  })
}

/** Undoes one fitting: it never was. The parts go back into their drawer at their cost, and what it replaced stands again. */
export async function undoFitting(db: Database, actor: Person, { tag, id, why }: UndoneFitting & { tag: string, id: string }): Promise<FittingView[]> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    requireOpenLog(unit, { hand: 'found_like_this', ownerConsent: '' })
    const [fitting] = await tx.select().from(fittings).where(and(eq(fittings.id, id), eq(fittings.unitId, unit.id)))
    if (!fitting) throw notFound('This unit has no such fitting.', 'no-such-fitting')
    if (fitting.undoneAt !== null) throw conflict('already-undone', 'This fitting has been undone already.')
    await undoFittings(tx, actor, unit, [fitting], why)
    return listFittings(tx, actor, unit.id)
  })
}

/** Undoes every standing fitting of an entry that is withdrawn, in its transaction. */
export async function undoFittingsOf(tx: Database, actor: Person, unit: UnitRow, modificationId: string, why: string): Promise<void> {
  const rows = await tx.select().from(fittings).where(and(eq(fittings.modificationId, modificationId), isNull(fittings.undoneAt))).orderBy(asc(fittings.createdAt))
  await undoFittings(tx, actor, unit, rows, why)
}

async function undoFittings(tx: Database, actor: Person, unit: UnitRow, rows: readonly FittingRow[], why: string): Promise<void> {
  if (rows.length === 0) return
  const ids = rows.flatMap(({ lotId, oldLotId }) => [lotId, oldLotId]).filter(id => id !== null)
  const tags = ids.length === 0 ? [] : await tx.select({ tag: partLots.tag }).from(partLots).where(inArray(partLots.id, ids))
  const lots = [...(await lockLots(tx, tags.map(({ tag }) => tag))).values()]
  for (const fitting of rows) await undoOne(tx, actor, unit, fitting, lots, why)
}

async function undoOne(tx: Database, actor: Person, unit: UnitRow, fitting: FittingRow, lots: readonly LotRow[], why: string): Promise<void> {
  if (fitting.removedAt !== null) throw conflict('taken-out-since', `The part${at(fitting)} has been taken out again since. Undo that first.`)
  const lot = lots.find(({ lot: { id } }) => id === fitting.lotId)
  const oldLot = lots.find(({ lot: { id } }) => id === fitting.oldLotId)
  if (oldLot) await putOldPartBack(tx, actor, oldLot, why)
  if (lot) await reverseMovement(tx, actor, lot, await movementOf(tx, fitting.id), why)
  if (fitting.replacesFittingId !== null) await tx.update(fittings).set({ removedAt: null }).where(eq(fittings.id, fitting.replacesFittingId))
  await tx.update(fittings).set({ undoneAt: new Date(), undoneBecause: why }).where(eq(fittings.id, fitting.id))
  await appendUnitLedger(tx, actor, unit.id, 'fitting_undone', {
    fittingId: fitting.id, lot: lot?.lot.tag ?? null, description: lot ? partTitle(lot.type) : fitting.description,
    quantity: lot ? inLotUnits(lot, fitting.quantity) : String(fitting.quantity), circuitReference: fitting.circuitReference, why,
  })
}

const at = ({ circuitReference }: FittingRow) => circuitReference === '' ? '' : ` at ${circuitReference}`

async function movementOf(tx: Database, fittingId: string): Promise<number> {
  const [movement] = await tx.select({ id: lotMovements.id }).from(lotMovements)
    .where(and(eq(lotMovements.fittingId, fittingId), eq(lotMovements.kind, 'fitted'), isNull(lotMovements.reversesId)))
  if (!movement) throw new Error('A fitting took nothing out of its lot, which cannot be')
  return movement.id
}

/** The old part goes back where it was, so that it may not have been used meanwhile. */
async function putOldPartBack(tx: Database, actor: Person, row: LotRow, why: string): Promise<void> {
  const [moved] = await tx.select({ received: sql<number>`coalesce(sum(${lotMovements.quantity}) filter (where ${lotMovements.kind} = 'received'), 0)::int` }).from(lotMovements).where(eq(lotMovements.lotId, row.lot.id))
  if (row.lot.quantity < (moved?.received ?? 0)) {
    throw conflict('old-part-used', `The old part went back to stock as ${lotTitle(row.type, row.lot.tag)} and has been used since. Take that back first.`)
  }
  requireEnough(row, moved?.received ?? 0)
  await takeStock(tx, actor, row, { kind: 'put_back', quantity: row.lot.quantity, note: why })
}
