import { asc, eq, inArray, sql } from 'drizzle-orm'
import { lotMovements, partLots, partTypes } from '../../drizzle/schema'
import { costOf } from '../../shared/domain/part-cost'
import type { MovementKind } from '../../shared/domain/part-lots'
import { LOT_STANDING_LABELS } from '../../shared/domain/part-lots'
import { formatQuantity, readQuantity } from '../../shared/domain/part-quantity'
import { partTitle } from '../../shared/domain/part-words'
import { formatTag } from '../../shared/domain/tag'
import type { Database } from '../utils/db'
import { conflict, invalid, notFound } from '../utils/errors'
import type { Actor } from './ledger'

/** A lot with what its parts are. */
export interface LotRow { lot: typeof partLots.$inferSelect, type: typeof partTypes.$inferSelect }

/** 404 for a P tag that no lot has. */
export const noSuchLot = (tag: string) => notFound(`No part lot has the tag ${formatTag(tag)}.`, 'no-such-lot')

/** The lot with this compact tag, or 404. */
export async function getLotRow(db: Database, tag: string): Promise<LotRow> {
  const [row] = await db.select({ lot: partLots, type: partTypes }).from(partLots).innerJoin(partTypes, eq(partTypes.id, partLots.typeId)).where(eq(partLots.tag, tag))
  if (!row) throw noSuchLot(tag)
  return row
}

/**
 * The same, locked until the transaction ends, so that two people never take the same last one. Lock order: units, then lots,
 * and lots among themselves by tag: nobody waits for somebody who waits for them.
 */
export async function lockLots(tx: Database, tags: readonly string[]): Promise<Map<string, LotRow>> {
  const wanted = [...new Set(tags)].sort()
  if (wanted.length > 0) await tx.select({ id: partLots.id }).from(partLots).where(inArray(partLots.tag, wanted)).orderBy(asc(partLots.tag)).for('update')
  const rows = new Map<string, LotRow>()
  for (const tag of wanted) rows.set(tag, await getLotRow(tx, tag))
  return rows
}

/** One lot, locked. */
export async function lockLot(tx: Database, tag: string): Promise<LotRow> {
  const row = (await lockLots(tx, [tag])).get(tag)
  if (!row) throw noSuchLot(tag)
  return row
}

/** A quantity as typed, in the lot's smallest unit; 422 at `field` in the reader's own words. */
export function quantityForField({ type }: Pick<LotRow, 'type'>, typed: string, field: string): number {
  const reading = readQuantity(typed, type.countedIn)
  if (!reading.ok) throw invalid([{ path: field, message: reading.sentence }])
  return reading.quantity
}

/** "3", "1.5 m": how many of a lot, as it is counted. */
export const inLotUnits = ({ type }: Pick<LotRow, 'type'>, quantity: number): string => formatQuantity(quantity, type.countedIn)

export interface Movement {
  kind: MovementKind
  /** Into the drawer above nought, out of it below. */
  quantity: number
  /** Of the same sign, minor units; null where the lot's cost is not known. */
  costMinor: number | null
  fittingId?: string
  reversesId?: number
  note?: string
}

/** Writes a movement of a locked lot and what is then in its drawer. The row handed in is brought up to date. */
export async function moveStock(tx: Database, actor: Actor, row: LotRow, movement: Movement): Promise<{ movementId: number }> {
  const { lot } = row
  const costMinor = lot.costMinor === null || movement.costMinor === null ? lot.costMinor : lot.costMinor + movement.costMinor
  const [written] = await tx.insert(lotMovements).values({ lotId: lot.id, personId: actor.id, ...movement }).returning({ id: lotMovements.id })
  const [moved] = await tx.update(partLots).set({ quantity: lot.quantity + movement.quantity, costMinor, version: sql`${partLots.version} + 1` }).where(eq(partLots.id, lot.id)).returning()
  if (!written || !moved) throw new Error('A movement of parts was not written')
  row.lot = moved
  return { movementId: written.id }
}

/** 409 unless the lot may be fitted. */
export function requireGood({ lot, type }: LotRow): void {
  if (lot.standing === 'good') return
  throw conflict('lot-not-good', `${partTitle(type)} (${formatTag(lot.tag)}) is ${LOT_STANDING_LABELS[lot.standing].toLowerCase()}: ${lot.standingBecause}. Take another lot, or release this one first.`)
}

/** 409 where the drawer holds fewer. */
export function requireEnough(row: LotRow, quantity: number): void {
  if (quantity <= row.lot.quantity) return
  const left = row.lot.quantity === 0 ? 'none is left' : `only ${inLotUnits(row, row.lot.quantity)} ${row.lot.quantity === 1 ? 'is' : 'are'} left`
  throw conflict('not-enough', `${partTitle(row.type)} (${formatTag(row.lot.tag)}): ${left}, and ${inLotUnits(row, quantity)} ${quantity === 1 ? 'is' : 'are'} wanted. Nothing was taken. Take fewer, another lot, or count the drawer.`)
}

/** Takes parts out of a locked lot with their share of its cost. 409 where it holds fewer. */
export async function takeStock(tx: Database, actor: Actor, row: LotRow, taken: { kind: MovementKind, quantity: number, fittingId?: string, note?: string }): Promise<{ movementId: number, costMinor: number | null }> {
  requireEnough(row, taken.quantity)
  const costMinor = costOf(row.lot, taken.quantity)
  const { movementId } = await moveStock(tx, actor, row, { ...taken, quantity: -taken.quantity, costMinor: costMinor === null ? null : 0 - costMinor })
  return { movementId, costMinor }
}

/** Takes a movement back: the same parts at the same cost, the other way. 409 when that was done before, or they are not there any more. */
export async function reverseMovement(tx: Database, actor: Actor, row: LotRow, movementId: number, note: string): Promise<void> {
  const [movement] = await tx.select().from(lotMovements).where(eq(lotMovements.id, movementId))
  if (!movement || movement.lotId !== row.lot.id) throw notFound('This lot has no such movement.', 'no-such-movement')
  const [earlier] = await tx.select({ id: lotMovements.id }).from(lotMovements).where(eq(lotMovements.reversesId, movementId))
  if (earlier || movement.reversesId !== null) throw conflict('already-undone', 'This has been taken back already.')
  if (movement.quantity > 0) requireEnough(row, movement.quantity)
  await moveStock(tx, actor, row, {
    kind: movement.kind, quantity: -movement.quantity, costMinor: movement.costMinor === null ? null : 0 - movement.costMinor, reversesId: movementId, note,
    ...movement.fittingId === null ? {} : { fittingId: movement.fittingId },
  })
}
