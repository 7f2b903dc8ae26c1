import { eq } from 'drizzle-orm'
import { lotMovements } from '../../drizzle/schema'
import { REMOVALS } from '../../shared/domain/part-lots'
import { lotTitle } from '../../shared/domain/part-words'
import type { LotRemoval, LotSplit, UndoneMovement } from '../../shared/schemas/part-lot'
import type { PartLotView } from '../../shared/types/part'
import type { Person } from '../../shared/types/person'
import type { Database } from '../utils/db'
import { conflict, notFound } from '../utils/errors'
import { appendLedger } from './ledger'
import { inLotUnits, lockLot, quantityForField, reverseMovement, takeStock } from './lot-stock'
import { getLotView } from './lot-view'
import { insertLot } from './part-lots'
import { placeForField } from './places'

/** Parts leave the drawer otherwise than into a unit: sold, scrapped, lost. 409 for more than there are. */
export async function removeFromLot(db: Database, actor: Person, { tag, how, quantity: typed, note }: LotRemoval & { tag: string }): Promise<PartLotView> {
  return db.transaction(async (tx) => {
    const row = await lockLot(tx, tag)
    const quantity = quantityForField(row, typed, 'quantity')
    await takeStock(tx, actor, row, { kind: how, quantity, note })
    await appendLedger(tx, actor, { kind: 'part_lot', id: row.lot.id }, 'lot_moved_out', { name: lotTitle(row.type, tag), how, quantity: inLotUnits(row, quantity), note })
    return getLotView(tx, actor, tag)
  })
}

/** Takes back that parts were sold, scrapped or lost. A fitting is undone from its unit's work log, a split not at all. */
export async function undoMovement(db: Database, actor: Person, { tag, id, why }: UndoneMovement & { tag: string, id: number }): Promise<PartLotView> {
  return db.transaction(async (tx) => {
    const row = await lockLot(tx, tag)
    const [movement] = await tx.select().from(lotMovements).where(eq(lotMovements.id, id))
    if (!movement || movement.lotId !== row.lot.id) throw notFound('This lot has no such movement.', 'no-such-movement')
    if (movement.kind === 'fitted') throw conflict('undo-in-work-log', 'A fitting is undone where it was logged: withdraw the entry, or the part, in the work log of its unit.')
    if (!REMOVALS.some(kind => kind === movement.kind)) throw conflict('not-undone-here', 'Only parts that were sold, scrapped or lost are taken back here.')
    await reverseMovement(tx, actor, row, id, why)
    await appendLedger(tx, actor, { kind: 'part_lot', id: row.lot.id }, 'lot_movement_undone', { name: lotTitle(row.type, tag), how: movement.kind, quantity: inLotUnits(row, Math.abs(movement.quantity)), why })
    return getLotView(tx, actor, tag)
  })
}

/** Some of a lot become a lot of their own, with their share of its cost and the lot as their source: a matched pair, the gassy ones. */
export async function splitLot(db: Database, actor: Person, { tag, quantity: typed, why, tested, standing, placeTag }: LotSplit & { tag: string }): Promise<PartLotView> {
  return db.transaction(async (tx) => {
    const row = await lockLot(tx, tag)
    const quantity = quantityForField(row, typed, 'quantity')
    const place = placeTag === null ? null : await placeForField(tx, placeTag, 'placeTag')
    const { costMinor } = await takeStock(tx, actor, row, { kind: 'split_off', quantity, note: why })
    const { lot } = row
    const child = await insertLot(tx, actor, row.type, {
      maker: lot.maker, dateCode: lot.dateCode, madeFrom: lot.madeFrom, madeTo: lot.madeTo, condition: lot.condition, tested: tested || lot.tested, note: why,
      sourceKind: 'split', parentLotId: lot.id, acquiredOn: lot.acquiredOn, standing, standingBecause: standing === 'good' ? '' : why, locationId: place?.id ?? lot.locationId,
    }, { quantity, cost: costMinor === null || lot.currency === null ? null : { minor: costMinor, currency: lot.currency } })
    await appendLedger(tx, actor, { kind: 'part_lot', id: lot.id }, 'lot_split', { name: lotTitle(row.type, tag), into: child.lot.tag, quantity: inLotUnits(row, quantity), why })
    return getLotView(tx, actor, child.lot.tag)
  })
}
