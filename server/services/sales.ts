import { and, eq, isNull } from 'drizzle-orm'
import { parties, sales } from '../../drizzle/schema'
import type { SaleUndone, UnitSale } from '../../shared/schemas/moves'
import type { Person } from '../../shared/types/person'
import type { UnitView } from '../../shared/types/unit'
import type { Database } from '../utils/db'
import { conflict, invalid } from '../utils/errors'
import { violates } from '../utils/pg-errors'
import { endHold } from './holds'
import { unpackAll } from './kept-with'
import { appendUnitLedger } from './ledger'
import { lockForMove, requireOpenMove } from './moves'
import { buildProvenanceSheet } from './provenance'
import { todayInShop } from './shop-day'
import { writeState } from './unit-state-write'
import { getUnitView } from './unit-view'

/**
 * Records a sale, with the provenance sheet frozen as it stands. Refusals as for any move; one piece is sold once,
 * whatever two people do at the same time.
 */
export async function sellUnit(db: Database, actor: Person, { tag, version, ...input }: UnitSale & { tag: string }): Promise<UnitView> {
  return db.transaction(async (tx) => {
    const unit = await lockForMove(tx, actor, { tag, to: 'sold', version })
    if (input.soldOn > await todayInShop(tx)) throw invalid([{ path: 'soldOn', message: 'The day of the sale can’t be in the future' }])
    await requireOpenMove(tx, unit, 'sold', { reason: null, ownerConsent: false, missingSaleDetails: [] })
    await endHold(tx, actor, unit.id, 'Sold')
    await writeState(tx, actor, unit, 'sold', null)
    // Frozen after the move, so that the sheet says “sold” as the buyer's copy will.
    const frozenSheet = await buildProvenanceSheet(tx, unit.id)
    const buyerId = await insertBuyer(tx, input)
    try {
      await tx.insert(sales).values({
        unitId: unit.id, buyerId, priceMinor: input.priceMinor, currency: input.currency, soldOn: input.soldOn, frozenSheet, soldBy: actor.id,
      })
    } catch (error) {
      if (violates(error, 'sales_one_standing')) throw conflict('already-sold', 'This unit has already been sold. Open its page again to see to whom.')
      throw error
    }
    await appendUnitLedger(tx, actor, unit.id, 'sold', {
      buyer: input.buyerName, priceMinor: input.priceMinor, currency: input.currency, soldOn: input.soldOn,
    })
    return getUnitView(tx, actor, tag)
  })
}

async function insertBuyer(tx: Database, { buyerName, buyerContact }: Pick<UnitSale, 'buyerName' | 'buyerContact'>): Promise<string> {
  const [buyer] = await tx.insert(parties).values({ name: buyerName, contact: buyerContact }).returning({ id: parties.id })
  if (!buyer) throw new Error('The buyer was not written')
  return buyer.id
}

/** Undoes the standing sale: the piece came back (`returned`) or the sale fell through before it left (`offered`). What was packed is unpacked. */
export async function undoSale(db: Database, actor: Person, { tag, to, why, version }: SaleUndone & { tag: string }): Promise<UnitView> {
  return db.transaction(async (tx) => {
    const unit = await lockForMove(tx, actor, { tag, to, version })
    await requireOpenMove(tx, unit, to, { reason: why, ownerConsent: false, missingSaleDetails: [] })
    await tx.update(sales).set({ undoneAt: new Date() }).where(and(eq(sales.unitId, unit.id), isNull(sales.undoneAt)))
    await appendUnitLedger(tx, actor, unit.id, 'sale_undone', { why })
    await unpackAll(tx, actor, unit.id)
    await writeState(tx, actor, unit, to, null)
    return getUnitView(tx, actor, tag)
  })
}
