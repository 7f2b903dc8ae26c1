import { eq, sql } from 'drizzle-orm'
import { fittings, lotMovements, modifications, parties, partLots, sales, units } from '../../drizzle/schema'
import { findOrAddPartType } from '../../server/services/part-types'
import { buildProvenanceSheet } from '../../server/services/provenance'
import { takeTag } from '../../server/services/tags'
import type { Database } from '../../server/utils/db'
import type { PartTypeInput } from '../../shared/schemas/part-lot'
import type { Person } from '../../shared/types/person'

type LotRow = typeof partLots.$inferSelect
type FittingRow = typeof fittings.$inferSelect

function only<T>(rows: T[]): T {
  const [row] = rows
  if (row === undefined) throw new Error('The insert returned no row')
  return row
}

/** A party of this name. */
export const insertParty = async (db: Database, name: string, contact = ''): Promise<string> => only(await db.insert(parties).values({ name, contact }).returning()).id

/** A lot written straight into its tables, its movement with it: ten suppression capacitors that came on 1 February 2026, unless said otherwise. */
export async function insertPartLot(
  db: Database, actor: Person, values: Partial<typeof partLots.$inferInsert> = {}, type: Partial<PartTypeInput> = {},
): Promise<LotRow> {
  return db.transaction(async (tx) => {
    const { id: typeId } = await findOrAddPartType(tx, {
      kind: 'capacitor', description: 'Suppression capacitor', value: '0.1 µF', tolerance: '', rating: '', package: '', countedIn: 'piece', ...type,
    })
    const lot = only(await tx.insert(partLots).values({
      tag: await takeTag(tx, 'P'), typeId, maker: 'Dielmark', condition: 'new', sourceKind: 'old_stock', acquiredOn: '2026-02-01', quantity: 10, enteredBy: actor.id, ...values,
    }).returning())
    if (lot.quantity > 0) await tx.insert(lotMovements).values({ lotId: lot.id, kind: 'received', quantity: lot.quantity, personId: actor.id })
    return lot
  })
}

/** One of a lot fitted to a unit under an entry of its own, written straight into the tables. */
export async function insertFitting(
  db: Database, actor: Person, unitId: string, lotId: string | null, values: Partial<typeof fittings.$inferInsert> = {},
): Promise<FittingRow> {
  return db.transaction(async (tx) => {
    const entry = only(await tx.insert(modifications).values({
      unitId, hand: 'done_by_us', reason: 'safety', reversibility: 're_solder', disposition: 'discarded', doneOn: '2026-03-02', loggedBy: actor.id,
    }).returning())
    const row = only(await tx.insert(fittings).values({
      modificationId: entry.id, unitId, lotId, description: lotId === null ? 'Something' : '', quantity: 1, disposition: 'discarded', fittedBy: actor.id, ...values,
    }).returning())
    if (lotId !== null) {
      await tx.insert(lotMovements).values({ lotId, kind: 'fitted', quantity: -row.quantity, fittingId: row.id, personId: actor.id })
      await tx.update(partLots).set({ quantity: sql`${partLots.quantity} - ${row.quantity}` }).where(eq(partLots.id, lotId))
    }
    return row
  })
}

/** A unit sold to somebody, without the questions a sale asks. */
export async function insertSale(db: Database, actor: Person, unit: typeof units.$inferSelect, buyerId: string, soldOn = '2026-04-01'): Promise<void> {
  await db.insert(sales).values({ unitId: unit.id, buyerId, priceMinor: 1, currency: 'GBP', soldOn, soldBy: actor.id, frozenSheet: await buildProvenanceSheet(db, unit.id) })
  await db.update(units).set({ state: 'sold' }).where(eq(units.id, unit.id))
}
