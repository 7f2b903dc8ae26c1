import { and, eq, inArray } from 'drizzle-orm'
import { fittings, partLots, partTypes } from '../../drizzle/schema'
import { costOf } from '../../shared/domain/part-cost'
import { readQuantity } from '../../shared/domain/part-quantity'
import { partTitle } from '../../shared/domain/part-words'
import { formatTag } from '../../shared/domain/tag'
import type { NewFitting } from '../../shared/schemas/fitting'
import type { Person } from '../../shared/types/person'
import type { Database } from '../utils/db'
import { invalid } from '../utils/errors'
import { appendUnitLedger } from './ledger'
import type { LotRow } from './lot-stock'
import { inLotUnits, lockLots, quantityForField, requireEnough, requireGood, takeStock } from './lot-stock'
import { insertLot } from './part-lots'
import { findOrAddPartType } from './part-types'
import { todayInShop } from './shop-day'
import { shopCurrency } from './shop-money'
import type { UnitRow } from './unit-lock'

export type FittingRow = typeof fittings.$inferSelect
/** The path of a field of the nth part in the form it was sent by. */
type PathOf = (index: number, field: string) => string

interface Replaced { fitting: FittingRow, lot: LotRow | null }

/**
 * Fits parts to a locked unit under an entry of its log, each out of its lot in the same transaction: the drawer falls, an old
 * part that goes back to stock becomes a lot with this unit as its donor. Answers with the fittings' ids, in order.
 *
 * 409 `not-enough` for more than a lot holds (two people taking the last one: the second is refused), `lot-not-good` for one
 * in quarantine or withdrawn; 422 at the field for an unknown lot, a quantity that can't be, or a part replaced that is not there.
 */
export async function fitParts(tx: Database, actor: Person, unit: UnitRow, modificationId: string, parts: readonly NewFitting[], pathOf: PathOf): Promise<string[]> {
  if (parts.length === 0) return []
  await requireKnownLots(tx, parts, pathOf)
  const lots = await lockLots(tx, parts.flatMap(({ lotTag }) => lotTag ?? []))
  const ids: string[] = []
  for (const [index, part] of parts.entries()) {
    const lot = part.lotTag === null ? null : lots.get(part.lotTag) ?? null
    ids.push(await fitOne(tx, actor, unit, modificationId, part, lot, field => pathOf(index, field)))
  }
  return ids
}

async function requireKnownLots(tx: Database, parts: readonly NewFitting[], pathOf: PathOf): Promise<void> {
  const tags = parts.flatMap(({ lotTag }) => lotTag ?? [])
  const known = tags.length === 0 ? [] : await tx.select({ tag: partLots.tag }).from(partLots).where(inArray(partLots.tag, tags))
  const unknown = parts.flatMap(({ lotTag }, index) => lotTag !== null && !known.some(({ tag }) => tag === lotTag)
    ? [{ path: pathOf(index, 'lotTag'), message: `No part lot has the tag ${formatTag(lotTag)}` }]
    : [])
  if (unknown.length > 0) throw invalid(unknown)
}

async function fitOne(
  tx: Database, actor: Person, unit: UnitRow, modificationId: string, part: NewFitting, lot: LotRow | null, pathTo: (field: string) => string,
): Promise<string> {
  const quantity = lot ? quantityForField(lot, part.quantity, pathTo('quantity')) : countForField(part.quantity, pathTo('quantity'))
  if (lot) {
    requireGood(lot)
    requireEnough(lot, quantity)
  }
  const replaced = part.replacesFittingId === null ? null : await replacedFor(tx, unit, part.replacesFittingId, pathTo('replacesFittingId'))
  const oldLot = part.disposition === 'returned_to_stock' ? await returnToStock(tx, actor, unit, part, replaced, quantity) : null
  const costMinor = lot ? costOf(lot.lot, quantity) : null
  const [row] = await tx.insert(fittings).values({
    modificationId, unitId: unit.id, lotId: lot?.lot.id ?? null, description: lot ? '' : part.description, quantity, circuitReference: part.circuitReference,
    replaced: part.replaced || (replaced?.lot ? partTitle(replaced.lot.type) : replaced?.fitting.description ?? ''), replacesFittingId: part.replacesFittingId,
    disposition: part.disposition, oldLotId: oldLot?.lot.id ?? null, costMinor, currency: costMinor === null ? null : lot?.lot.currency ?? null, fittedBy: actor.id,
  }).returning({ id: fittings.id })
  if (!row) throw new Error('A fitting was not written')
  if (lot) await takeStock(tx, actor, lot, { kind: 'fitted', quantity, fittingId: row.id })
  if (replaced) await tx.update(fittings).set({ removedAt: new Date() }).where(eq(fittings.id, replaced.fitting.id))
  await appendUnitLedger(tx, actor, unit.id, 'fitted', {
    fittingId: row.id, lot: lot?.lot.tag ?? null, description: lot ? partTitle(lot.type) : part.description,
    quantity: lot ? inLotUnits(lot, quantity) : String(quantity), circuitReference: part.circuitReference,
  })
  return row.id
}

/** How many of an unknown lot: pieces. */
function countForField(typed: string, field: string): number {
  const reading = readQuantity(typed, 'piece')
  if (!reading.ok) throw invalid([{ path: field, message: reading.sentence }])
  return reading.quantity
}

async function replacedFor(tx: Database, unit: UnitRow, id: string, field: string): Promise<Replaced> {
  const [row] = await tx.select({ fitting: fittings, lot: partLots, type: partTypes }).from(fittings)
    .leftJoin(partLots, eq(partLots.id, fittings.lotId)).leftJoin(partTypes, eq(partTypes.id, partLots.typeId))
    .where(and(eq(fittings.id, id), eq(fittings.unitId, unit.id)))
  if (!row || row.fitting.undoneAt !== null || row.fitting.removedAt !== null) throw invalid([{ path: field, message: 'That part is not in this unit any more: choose what was replaced again' }])
  return { fitting: row.fitting, lot: row.lot && row.type && { lot: row.lot, type: row.type } }
}

/** The old part becomes a lot with this unit as its donor, at no cost: what it cost stays with the unit it served in. */
async function returnToStock(tx: Database, actor: Person, unit: UnitRow, part: NewFitting, replaced: Replaced | null, fitted: number): Promise<LotRow> {
  const was = replaced?.lot ?? null
  const type = was?.type ?? await findOrAddPartType(tx, {
    kind: part.oldPartKind ?? 'other', description: part.replaced || replaced?.fitting.description || 'Old part', value: '', tolerance: '', rating: '', package: '', countedIn: 'piece',
  })
  const lot = await insertLot(tx, actor, type, {
    maker: was?.lot.maker ?? '', dateCode: was?.lot.dateCode ?? '', madeFrom: was?.lot.madeFrom ?? null, madeTo: was?.lot.madeTo ?? null,
    condition: 'pulled', note: part.circuitReference === '' ? '' : `Was at ${part.circuitReference}`, sourceKind: 'donor', donorUnitId: unit.id,
    fromFittingId: replaced?.fitting.id ?? null, acquiredOn: await todayInShop(tx),
    // A part of a lot that was withdrawn meanwhile comes back as doubtful as its fellows.
    standing: was?.lot.standing ?? 'good', standingBecause: was?.lot.standingBecause ?? '',
  }, { quantity: replaced?.fitting.quantity ?? fitted, cost: { minor: 0, currency: await shopCurrency(tx) } })
  await appendUnitLedger(tx, actor, unit.id, 'part_pulled', { lot: lot.lot.tag, description: partTitle(type), quantity: inLotUnits(lot, lot.lot.quantity) })
  return lot
}
