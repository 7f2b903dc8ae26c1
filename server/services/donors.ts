import { and, eq, isNull, sql } from 'drizzle-orm'
import { fittings, units } from '../../drizzle/schema'
import { shareCost } from '../../shared/domain/cost-sharing'
import { lotTitle, partTitle } from '../../shared/domain/part-words'
import { may } from '../../shared/domain/roles'
import type { BreakUp, PutBack } from '../../shared/schemas/break-up'
import type { DonorView, PartLotView } from '../../shared/types/part'
import type { Person } from '../../shared/types/person'
import type { Database } from '../utils/db'
import { conflict, invalid, stale } from '../utils/errors'
import { appendUnitLedger } from './ledger'
import type { LotRow } from './lot-stock'
import { getLotRow, inLotUnits, lockLot, quantityForField, takeStock } from './lot-stock'
import { getLotView } from './lot-view'
import { lockForMove, requireOpenMove } from './moves'
import { insertLot } from './part-lots'
import { findOrAddPartType } from './part-types'
import { placeForField } from './places'
import { costLeft, getDonor, listPulled } from './pulled-lots'
import { todayInShop } from './shop-day'
import { readAmount } from './shop-money'
import type { UnitRow } from './unit-lock'
import { getUnitRow, lockUnit } from './unit-lock'
import { writeState } from './unit-state-write'

/**
 * Breaks a unit for parts, or takes more from one that is broken already: each line becomes a lot with the unit as its donor and
 * a share of its cost; shares and what stays with the carcass add up to what it cost, to the minor unit. All or nothing.
 *
 * 403 and 409 as for the move to “broken for parts” (a sold unit, a consigned one without its owner's consent, no reason); 422 at
 * the field for quantities, amounts and places that can't be, or shares that come to more than is left.
 */
export async function breakUnit(db: Database, actor: Person, { tag, parts, carcassWorth, why, ownerConsent, version }: BreakUp & { tag: string }): Promise<DonorView> {
  return db.transaction(async (tx) => {
    const unit = await lockDonor(tx, actor, { tag, why, ownerConsent, version })
    const shares = await readShares(tx, actor, unit, { parts, carcassWorth })
    for (const [index, part] of parts.entries()) await pull(tx, actor, unit, part, shares[index] ?? null, `parts.${index}`)
    return getDonor(tx, actor, tag)
  })
}

async function lockDonor(tx: Database, actor: Person, { tag, why, ownerConsent, version }: Pick<BreakUp, 'why' | 'ownerConsent' | 'version'> & { tag: string }): Promise<UnitRow> {
  const { state } = await getUnitRow(tx, tag)
  if (state === 'parted') {
    const unit = await lockUnit(tx, tag)
    if (unit.version !== version) throw stale('unit', await getDonor(tx, actor, tag))
    await tx.update(units).set({ version: sql`${units.version} + 1` }).where(eq(units.id, unit.id))
    return unit
  }
  const unit = await lockForMove(tx, actor, { tag, to: 'parted', version })
  await requireOpenMove(tx, unit, 'parted', { reason: why, ownerConsent: ownerConsent !== '', missingSaleDetails: [] })
  await writeState(tx, actor, unit, 'parted', [why, ownerConsent && `Its owner agreed: ${ownerConsent}`].filter(Boolean).join('. '))
  return unit
}

type Share = { minor: number, currency: string } | null

/** Each part's share of what is left of the donor's cost; null for all where its cost is not known. */
async function readShares(tx: Database, actor: Person, unit: UnitRow, { parts, carcassWorth }: Pick<BreakUp, 'parts' | 'carcassWorth'>): Promise<Share[]> {
  const left = costLeft(unit, await listPulled(tx, unit.id))
  const { costCurrency } = unit
  if (left === null || costCurrency === null) return parts.map(() => null)
  const seesCost = may(actor.role, 'cost.read')
  const amount = async (typed: string, path: string) => seesCost ? (await readAmount(tx, typed, path))?.minor ?? null : null
  const read = []
  for (const [index, { worth, share }] of parts.entries()) {
    read.push({ worthMinor: await amount(worth, `parts.${index}.worth`) ?? 0, shareMinor: await amount(share, `parts.${index}.share`) })
  }
  const shared = shareCost(left, read, await amount(carcassWorth, 'carcassWorth') ?? 0)
  if (!shared.ok) throw invalid([{ path: `parts.${Math.max(0, read.findIndex(({ shareMinor }) => shareMinor !== null))}.share`, message: shared.sentence }])
  return shared.shares.map(minor => ({ minor, currency: costCurrency }))
}

async function pull(tx: Database, actor: Person, unit: UnitRow, part: BreakUp['parts'][number], share: Share, path: string): Promise<void> {
  const type = await findOrAddPartType(tx, part.type)
  const quantity = quantityForField({ type }, part.quantity, `${path}.quantity`)
  const place = part.placeTag === null ? null : await placeForField(tx, part.placeTag, `${path}.placeTag`)
  if (part.fromFittingId !== null) await takeOut(tx, unit, part.fromFittingId, `${path}.fromFittingId`)
  const row = await insertLot(tx, actor, type, {
    maker: part.maker, dateCode: part.dateCode, condition: 'pulled', tested: part.tested, sourceKind: 'donor', donorUnitId: unit.id, fromFittingId: part.fromFittingId,
    acquiredOn: await todayInShop(tx), standing: part.standing, standingBecause: part.standing === 'good' ? '' : part.standingBecause, locationId: place?.id ?? null,
  }, { quantity, cost: share })
  await appendUnitLedger(tx, actor, unit.id, 'part_pulled', { lot: row.lot.tag, description: partTitle(type), quantity: inLotUnits(row, quantity) })
}

async function takeOut(tx: Database, unit: UnitRow, fittingId: string, field: string): Promise<void> {
  const [taken] = await tx.update(fittings).set({ removedAt: new Date() })
    .where(and(eq(fittings.id, fittingId), eq(fittings.unitId, unit.id), isNull(fittings.removedAt), isNull(fittings.undoneAt))).returning({ id: fittings.id })
  if (!taken) throw invalid([{ path: field, message: 'That part is not in this unit any more: choose the part again' }])
}

/**
 * Puts a pulled lot back into its donor: it was never pulled. Its share goes back to the donor's cost. 409 unless all of it is
 * still in the drawer, or when it did not come out of a unit that was broken.
 */
export async function putLotBack(db: Database, actor: Person, { tag, why, version }: PutBack & { tag: string }): Promise<PartLotView> {
  return db.transaction(async (tx) => {
    const { unit, row } = await lockWithDonor(tx, tag)
    if (row.lot.version !== version) throw stale('lot', await getLotView(tx, actor, tag))
    const pulled = (await listPulled(tx, unit.id)).find(lot => lot.tag === tag)
    if (!pulled || pulled.quantity === 0) throw conflict('not-pulled', 'This lot has been put back already.')
    if (row.lot.quantity < pulled.quantity) {
      throw conflict('lot-in-use', `Of ${lotTitle(row.type, tag)} ${inLotUnits(row, pulled.quantity - row.lot.quantity)} have been used since. Undo that first.`)
    }
    await refuseOldPart(tx, row)
    await takeStock(tx, actor, row, { kind: 'put_back', quantity: row.lot.quantity, note: why })
    if (row.lot.fromFittingId !== null) await tx.update(fittings).set({ removedAt: null }).where(eq(fittings.id, row.lot.fromFittingId))
    await appendUnitLedger(tx, actor, unit.id, 'part_put_back', { lot: tag, description: partTitle(row.type), quantity: inLotUnits(row, pulled.quantity), why })
    return getLotView(tx, actor, tag)
  })
}

/** Lock order: the unit, then the lot. */
async function lockWithDonor(tx: Database, tag: string): Promise<{ unit: UnitRow, row: LotRow }> {
  const { lot } = await getLotRow(tx, tag)
  const [donor] = lot.donorUnitId === null ? [] : await tx.select({ tag: units.tag }).from(units).where(eq(units.id, lot.donorUnitId))
  if (!donor) throw conflict('no-donor', 'This lot did not come out of a unit, so there is nothing to put it back into.')
  return { unit: await lockUnit(tx, donor.tag), row: await lockLot(tx, tag) }
}

async function refuseOldPart(tx: Database, { lot }: LotRow): Promise<void> {
  const [fitting] = await tx.select({ id: fittings.id }).from(fittings).where(and(eq(fittings.oldLotId, lot.id), isNull(fittings.undoneAt)))
  if (fitting) throw conflict('undo-in-work-log', 'This part came out when another took its place: undo that fitting in the work log of its unit.')
}
