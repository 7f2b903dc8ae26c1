import { and, asc, eq, isNull, ne, sql } from 'drizzle-orm'
import { locationPaths, lotCounts, partLots, partTypes } from '../../drizzle/schema'
import type { CountSettlement } from '../../shared/domain/part-lots'
import { readQuantity } from '../../shared/domain/part-quantity'
import { lotTitle } from '../../shared/domain/part-words'
import type { LotCount, SettledCount } from '../../shared/schemas/part-lot'
import type { OpenFinding, PartLotView } from '../../shared/types/part'
import type { Person } from '../../shared/types/person'
import type { Database } from '../utils/db'
import { conflict, invalid, notFound } from '../utils/errors'
import { appendLedger } from './ledger'
import type { LotRow } from './lot-stock'
import { inLotUnits, lockLot, moveStock, takeStock } from './lot-stock'
import { getLotView } from './lot-view'

/** How many were counted; none at all is an answer too. 422 for what is no quantity. */
function countedForField(row: LotRow, typed: string): number {
  if (/^0(?:[.,]0*)?\s*[a-z]*$/i.test(typed.trim())) return 0
  const reading = readQuantity(typed, row.type.countedIn)
  if (!reading.ok) throw invalid([{ path: 'counted', message: reading.sentence }])
  return reading.quantity
}

/**
 * Notes what somebody counted beside what the book says. A difference is a finding that stands open until it is settled: the
 * book itself is never written over. An open finding of the lot is replaced by the newer count.
 */
export async function countLot(db: Database, actor: Person, { tag, counted: typed, note }: LotCount & { tag: string }): Promise<PartLotView> {
  return db.transaction(async (tx) => {
    const row = await lockLot(tx, tag)
    const counted = countedForField(row, typed)
    await tx.update(lotCounts).set({ settledAs: 'miscounted', settledNote: 'Counted again', settledBy: actor.id, settledAt: new Date() })
      .where(and(eq(lotCounts.lotId, row.lot.id), isNull(lotCounts.settledAt), ne(lotCounts.counted, lotCounts.book)))
    await tx.insert(lotCounts).values({ lotId: row.lot.id, counted, book: row.lot.quantity, note, countedBy: actor.id })
    await appendLedger(tx, actor, { kind: 'part_lot', id: row.lot.id }, 'lot_counted', {
      name: lotTitle(row.type, tag), counted: inLotUnits(row, counted), book: inLotUnits(row, row.lot.quantity), note,
    })
    return getLotView(tx, actor, tag)
  })
}

/** What each settlement does to the drawer: takes the missing ones out as that, takes the surplus in, or nothing. */
const SETTLES: Record<CountSettlement, 'nothing' | 'shortage' | 'surplus'> = {
  miscounted: 'nothing', fitted_since: 'nothing', lost: 'shortage', scrapped: 'shortage', sold: 'shortage', found: 'surplus',
}

/** Settles a counting difference with what it was. 409 where that was done, or the explanation is of the other direction. */
export async function settleCount(db: Database, actor: Person, { tag, id, how, note }: SettledCount & { tag: string, id: string }): Promise<PartLotView> {
  return db.transaction(async (tx) => {
    const row = await lockLot(tx, tag)
    const [count] = await tx.select().from(lotCounts).where(and(eq(lotCounts.id, id), eq(lotCounts.lotId, row.lot.id)))
    if (!count) throw notFound('This lot has no such count.', 'no-such-count')
    const difference = count.counted - count.book
    if (count.settledAt !== null || difference === 0) throw conflict('already-settled', 'There is nothing to settle about this count any more.')
    await moveDifference(tx, actor, row, difference, how, note)
    await tx.update(lotCounts).set({ settledAs: how, settledNote: note, settledBy: actor.id, settledAt: new Date() }).where(eq(lotCounts.id, id))
    await appendLedger(tx, actor, { kind: 'part_lot', id: row.lot.id }, 'lot_count_settled', { name: lotTitle(row.type, tag), difference: inLotUnits(row, difference), how, note })
    return getLotView(tx, actor, tag)
  })
}

async function moveDifference(tx: Database, actor: Person, row: LotRow, difference: number, how: CountSettlement, note: string): Promise<void> {
  const effect = SETTLES[how]
  if (effect === 'nothing') return
  if ((effect === 'surplus') !== (difference > 0)) {
    throw invalid([{ path: 'how', message: difference > 0 ? 'More were counted than the book says: choose “More were there”, or that it was counted wrongly' : 'Fewer were counted than the book says: choose what became of them' }])
  }
  // What turns up was paid for with the rest, so that it costs nothing more.
  if (effect === 'surplus') await moveStock(tx, actor, row, { kind: 'found', quantity: difference, costMinor: row.lot.costMinor === null ? null : 0, note })
  else if (how === 'lost' || how === 'scrapped' || how === 'sold') await takeStock(tx, actor, row, { kind: how, quantity: -difference, note })
}

/** Every counting difference that nobody has settled, the oldest first. */
export async function listOpenFindings(db: Database): Promise<OpenFinding[]> {
  const rows = await db.select({ count: lotCounts, tag: partLots.tag, type: partTypes, place: locationPaths.path }).from(lotCounts)
    .innerJoin(partLots, eq(partLots.id, lotCounts.lotId)).innerJoin(partTypes, eq(partTypes.id, partLots.typeId))
    .leftJoin(locationPaths, eq(locationPaths.id, partLots.locationId))
    .where(and(isNull(lotCounts.settledAt), sql`${lotCounts.counted} <> ${lotCounts.book}`)).orderBy(asc(lotCounts.at)).limit(200)
  return rows.map(({ count, tag, type, place }) => ({
    id: count.id, lot: { tag, title: lotTitle(type, tag) }, place, counted: count.counted, book: count.book, countedIn: type.countedIn, at: count.at.toISOString(),
  }))
}
