import { and, asc, desc, eq, inArray, isNotNull, sql } from 'drizzle-orm'
import { lotMovements, parties, partLots, partTypes } from '../../drizzle/schema'
import { readQuantity, formatQuantity } from '../../shared/domain/part-quantity'
import { partTitle } from '../../shared/domain/part-words'
import type { BoughtFor } from '../../shared/domain/reorder'
import { may } from '../../shared/domain/roles'
import type { PartMinimum, PartTypesQuery } from '../../shared/schemas/part-type'
import type { PartStock, ReorderLine } from '../../shared/types/reorder'
import type { Database } from '../utils/db'
import { invalid, notFound, stale } from '../utils/errors'
import { SHOP_SUBJECT } from './first-run'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'
import type { LotReader } from './lot-view'
import { toPartTypeView } from './part-types'

/** The most types that a search answers with. */
const MOST_FOUND = 40

/** What of a type may be fitted: a lot in quarantine fills no drawer. */
const inStock = sql<number>`coalesce(sum(${partLots.quantity}) filter (where ${partLots.standing} = 'good'), 0)`.mapWith(Number)

const selectStock = (db: Database) => db.select({ type: partTypes, inStock }).from(partTypes).leftJoin(partLots, eq(partLots.typeId, partTypes.id)).groupBy(partTypes.id).$dynamic()

/**
 * Every type with a minimum of which fewer good ones are there, in the order of its name; quantities in its smallest unit, costs in
 * minor units. Who sold the last and what it cost are null for those who may not see them.
 */
export async function listReorder(db: Database, { role }: LotReader): Promise<ReorderLine[]> {
  const rows = await selectStock(db).where(isNotNull(partTypes.minimum)).having(sql`${inStock} < ${partTypes.minimum}`).orderBy(asc(partTypes.description), asc(partTypes.value), asc(partTypes.id))
  const ids = rows.map(({ type }) => type.id)
  const suppliers = may(role, 'parties.read') ? await lastSuppliers(db, ids) : new Map<string, string>()
  const costs = may(role, 'cost.read') ? await lastCosts(db, ids) : new Map<string, BoughtFor>()
  return rows.map(({ type, inStock: there }) => {
    const minimum = type.minimum ?? 0
    return {
      type: toPartTypeView(type), inStock: there, minimum, short: minimum - there,
      lastSupplier: suppliers.get(type.id) ?? null, lastBought: costs.get(type.id) ?? null,
    }
  })
}

async function lastSuppliers(db: Database, typeIds: string[]): Promise<Map<string, string>> {
  const rows = await db.selectDistinctOn([partLots.typeId], { typeId: partLots.typeId, name: parties.name }).from(partLots)
    .innerJoin(parties, eq(parties.id, partLots.supplierId))
    .where(inArray(partLots.typeId, typeIds)).orderBy(partLots.typeId, desc(partLots.acquiredOn), desc(partLots.tag))
  return new Map(rows.map(({ typeId, name }) => [typeId, name]))
}

/** What came in with the last lot that was bought at a known cost: what a donor's part took of its cost says nothing of a price. */
async function lastCosts(db: Database, typeIds: string[]): Promise<Map<string, BoughtFor>> {
  const rows = await db.selectDistinctOn([partLots.typeId], {
    typeId: partLots.typeId, currency: partLots.currency,
    quantity: sql<number>`sum(${lotMovements.quantity})`.mapWith(Number), costMinor: sql<number>`sum(${lotMovements.costMinor})`.mapWith(Number),
  }).from(partLots)
    .innerJoin(lotMovements, and(eq(lotMovements.lotId, partLots.id), eq(lotMovements.kind, 'received')))
    .where(and(inArray(partLots.typeId, typeIds), eq(partLots.sourceKind, 'supplier'), isNotNull(partLots.costMinor)))
    .groupBy(partLots.id).having(sql`sum(${lotMovements.quantity}) > 0`)
    .orderBy(partLots.typeId, desc(partLots.acquiredOn), desc(partLots.tag))
  return new Map(rows.flatMap(({ typeId, currency, ...bought }) => currency === null ? [] : [[typeId, { ...bought, currency }]]))
}

/** Types of part that answer these words, those with a minimum first; 40 at most. */
export async function listPartTypes(db: Database, { q }: PartTypesQuery): Promise<PartStock[]> {
  const text = sql`concat_ws(' ', ${partTypes.description}, ${partTypes.value}, ${partTypes.tolerance}, ${partTypes.rating}, ${partTypes.package})`
  const words = q.split(/\s+/u).filter(Boolean).slice(0, 8).map(word => sql`${text} ilike ${`%${word.replace(/[\\%_]/gu, '\\$&')}%`}`)
  const rows = await selectStock(db).where(and(...words)).orderBy(sql`${partTypes.minimum} is null`, asc(partTypes.description), asc(partTypes.value), asc(partTypes.id)).limit(MOST_FOUND)
  return rows.map(row => ({ ...row, type: toPartTypeView(row.type) }))
}

async function getPartStock(db: Database, id: string): Promise<PartStock> {
  const [row] = await selectStock(db).where(eq(partTypes.id, id))
  if (!row) throw noSuchType()
  return { ...row, type: toPartTypeView(row.type) }
}

const noSuchType = () => notFound('There is no such type of part.', 'no-such-part-type')

/**
 * Sets how many of a type should be there at least, or stops watching it (an empty minimum). 404 for no such type, 409 with the
 * type as it stands if somebody else changed it meanwhile, 422 for a quantity that can't be.
 */
export async function setMinimum(db: Database, actor: Actor, { id, minimum: typed, version }: PartMinimum & { id: string }): Promise<PartStock> {
  return db.transaction(async (tx) => {
    const [type] = await tx.select().from(partTypes).where(eq(partTypes.id, id)).for('update')
    if (!type) throw noSuchType()
    if (type.version !== version) throw stale('part', await getPartStock(tx, id))
    const reading = typed === '' ? null : readQuantity(typed, type.countedIn)
    if (reading && !reading.ok) throw invalid([{ path: 'minimum', message: reading.sentence }])
    const minimum = reading?.quantity ?? null
    if (minimum === type.minimum) return getPartStock(tx, id)
    const words = (quantity: number | null) => quantity === null ? null : formatQuantity(quantity, type.countedIn)
    await tx.update(partTypes).set({ minimum, version: sql`${partTypes.version} + 1` }).where(eq(partTypes.id, id))
    await appendLedger(tx, actor, SHOP_SUBJECT, 'changed', { name: partTitle(type), changes: [{ field: 'minimum', from: words(type.minimum), to: words(minimum) }] })
    return getPartStock(tx, id)
  })
}
