import { and, desc, eq, exists, gt, isNull, lt, ne, or, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import { z } from 'zod'
import { locations, lotCounts, lotMovements, parties, partLots, partTypes, units } from '../../drizzle/schema'
import type { FieldChange } from '../../shared/domain/ledger-events'
import { readDateCode } from '../../shared/domain/markings/date-codes'
import { LOT_CONDITION_LABELS, LOT_SOURCE_LABELS, PART_KIND_LABELS } from '../../shared/domain/part-lots'
import { COUNTED_IN_LABELS } from '../../shared/domain/part-quantity'
import { lotTitle, partTitle } from '../../shared/domain/part-words'
import { may } from '../../shared/domain/roles'
import { formatTag, parseTag } from '../../shared/domain/tag'
import type { ChangedPartLot, CorrectedReceipt, LotPlacing, LotsQuery, LotStandingChange, NewPartLot } from '../../shared/schemas/part-lot'
import type { Page } from '../../shared/types/page'
import type { PartLotSummary, PartLotView } from '../../shared/types/part'
import type { Person } from '../../shared/types/person'
import { readCursor, writeCursor } from '../utils/cursor'
import type { Database } from '../utils/db'
import { badRequest, conflict, forbidden, invalid, stale } from '../utils/errors'
import { appendLedger } from './ledger'
import type { LotRow } from './lot-stock'
import { inLotUnits, lockLot, moveStock, quantityForField } from './lot-stock'
import { getLotView, selectLots, toLotSummary } from './lot-view'
import { partyNamed } from './parties'
import { findOrAddPartType } from './part-types'
import { findPlace, placeForField } from './places'
import { todayInShop } from './shop-day'
import { readAmount } from './shop-money'
import { takeTag } from './tags'

/** The newest first; of those that came the same day, by tag. */
const placeInList = z.tuple([z.iso.date(), z.string()])

/** Lots that answer a query, in pages. Costs and suppliers are null for those who may not see them. 400 for a place there is not. */
export async function listLots(db: Database, reader: Pick<Person, 'role'>, query: LotsQuery): Promise<Page<PartLotSummary>> {
  const wanted = and(...await conditions(db, query))
  const after = query.cursor === undefined ? undefined : beyond(readCursor(query.cursor, placeInList))
  const rows = await selectLots(db).where(and(wanted, after)).orderBy(desc(partLots.acquiredOn), desc(partLots.tag)).limit(query.limit + 1)
  const [counted] = await db.select({ total: sql<number>`count(*)::int` }).from(partLots).innerJoin(partTypes, eq(partTypes.id, partLots.typeId)).where(wanted)
  const last = rows.length > query.limit ? rows[query.limit - 1]?.lot : undefined
  return {
    items: rows.slice(0, query.limit).map(row => toLotSummary(row, reader)),
    nextCursor: last ? writeCursor([last.acquiredOn, last.tag]) : null,
    total: counted?.total ?? 0,
  }
}

const beyond = ([acquiredOn, tag]: z.output<typeof placeInList>) => or(lt(partLots.acquiredOn, acquiredOn), and(eq(partLots.acquiredOn, acquiredOn), lt(partLots.tag, tag)))

async function conditions(db: Database, query: LotsQuery): Promise<(SQL | undefined)[]> {
  return [
    ...wordConditions(query.q),
    query.kind === null ? undefined : eq(partTypes.kind, query.kind),
    query.standing === null ? undefined : eq(partLots.standing, query.standing),
    query.location === null ? undefined : eq(partLots.locationId, await locationId(db, query.location)),
    // A finding may be of a drawer that the book calls empty.
    query.empty === 'yes' || query.findings === 'yes' ? undefined : gt(partLots.quantity, 0),
    query.findings === 'yes' ? hasOpenFinding(db) : undefined,
  ]
}

function wordConditions(words: string): SQL[] {
  const read = parseTag(words)
  if (read.ok) return [read.kind === 'U' ? sql`${partLots.donorUnitId} in (select id from ${units} where tag = ${read.tag})` : eq(partLots.tag, read.tag)]
  const text = sql`concat_ws(' ', ${partTypes.description}, ${partTypes.value}, ${partTypes.tolerance}, ${partTypes.rating}, ${partTypes.package}, ${partLots.maker}, ${partLots.dateCode}, ${partLots.tag})`
  return words.split(/\s+/u).filter(Boolean).slice(0, 8).map(word => sql`${text} ilike ${`%${word.replace(/[\\%_]/gu, '\\$&')}%`}`)
}

const hasOpenFinding = (db: Database) => exists(db.select({ one: sql`1` }).from(lotCounts)
  .where(and(eq(lotCounts.lotId, partLots.id), isNull(lotCounts.settledAt), ne(lotCounts.counted, lotCounts.book))))

async function locationId(db: Database, tag: string): Promise<string> {
  const [place] = await db.select({ id: locations.id }).from(locations).where(eq(locations.tag, tag))
  if (!place) throw badRequest('no-such-place', 'There is no such place: choose one from the list.')
  return place.id
}

/**
 * Enters a lot that came in: its type (made if it is new), its tag, its first movement, all or nothing. 403 for a cost from
 * somebody who may not see costs; 422 at the field for a quantity, amount, day or place that can't be.
 */
export async function enterLot(db: Database, actor: Person, { type: said, quantity: typed, cost: amount, placeTag, supplierName, ...input }: NewPartLot): Promise<PartLotView> {
  if (amount !== '' && !may(actor.role, 'cost.read')) throw forbidden('Your role does not enter costs. Leave the cost empty.')
  return db.transaction(async (tx) => {
    await refuseFuture(tx, input)
    const type = await findOrAddPartType(tx, said)
    const cost = await readAmount(tx, amount, 'cost')
    const quantity = quantityForField({ type }, typed, 'quantity')
    const place = placeTag === null ? null : await placeForField(tx, placeTag, 'placeTag')
    const row = await insertLot(tx, actor, type, {
      ...input,
      supplierId: input.sourceKind === 'supplier' ? await partyNamed(tx, supplierName) : null,
      invoiceNumber: input.sourceKind === 'supplier' ? input.invoiceNumber : '',
      locationId: place?.id ?? null,
    }, { quantity, cost })
    return getLotView(tx, actor, row.lot.tag)
  })
}

type LotValues = Omit<typeof partLots.$inferInsert, 'tag' | 'typeId' | 'quantity' | 'costMinor' | 'currency' | 'enteredBy'>

/** Writes a lot of a type with its first movement and its entry in the ledger, in the caller's transaction. */
export async function insertLot(
  tx: Database, actor: Person, type: LotRow['type'], values: LotValues, stock: { quantity: number, cost: { minor: number, currency: string } | null },
): Promise<LotRow> {
  const [lot] = await tx.insert(partLots).values({
    ...values, tag: await takeTag(tx, 'P'), typeId: type.id, quantity: 0, costMinor: stock.cost === null ? null : 0, currency: stock.cost?.currency ?? null, enteredBy: actor.id,
  }).returning()
  if (!lot) throw new Error('A lot was not written')
  const row = { lot, type }
  await moveStock(tx, actor, row, { kind: 'received', quantity: stock.quantity, costMinor: stock.cost?.minor ?? null })
  await appendLedger(tx, actor, { kind: 'part_lot', id: lot.id }, 'lot_received', {
    name: lotTitle(type, lot.tag), quantity: inLotUnits(row, stock.quantity), source: LOT_SOURCE_LABELS[lot.sourceKind],
  })
  return row
}

/** Later than any part. */
const LAST_DAY = '9999-12-31'

async function refuseFuture(tx: Database, { acquiredOn, madeFrom, dateCode }: { acquiredOn?: string, madeFrom: string | null, dateCode: string }): Promise<void> {
  const today = await todayInShop(tx)
  const code = readDateCode(dateCode, { today })
  // What is no date code may be another mark, and is kept as it is; one that can only mean a day to come was misread.
  if (!code.ok && readDateCode(dateCode, { today: LAST_DAY }).ok) throw invalid([{ path: 'dateCode', message: code.sentence }])
  if (acquiredOn !== undefined && acquiredOn > today) throw invalid([{ path: 'acquiredOn', message: 'The day it came must be today or earlier' }])
  if (madeFrom !== null && madeFrom > today) throw invalid([{ path: 'madeFrom', message: 'This date code is still to come: read it again' }])
}

/**
 * Describes a lot as it should be. A type is never renamed under other lots: the lot is put with the type that is described.
 * 409 if somebody else changed it meanwhile, 422 where how it is counted would change, or its source was pulled or split.
 */
export async function changeLot(db: Database, actor: Person, { tag, version, type: said, source, placeTag, ...input }: ChangedPartLot & { tag: string }): Promise<PartLotView> {
  return db.transaction(async (tx) => {
    const row = await lockLot(tx, tag)
    await requireVersion(tx, actor, row, version)
    await refuseFuture(tx, { madeFrom: input.madeFrom, dateCode: input.dateCode, ...source ? { acquiredOn: source.acquiredOn } : {} })
    if (said.countedIn !== row.type.countedIn) throw invalid([{ path: 'type.countedIn', message: `This lot is counted in ${COUNTED_IN_LABELS[row.type.countedIn].toLowerCase()}: that can’t be changed once it is entered` }])
    const place = placeTag === null ? null : await placeForField(tx, placeTag, 'placeTag')
    const type = await findOrAddPartType(tx, said)
    const next = { ...input, typeId: type.id, locationId: place?.id ?? null, ...await correctedSource(tx, row, source) }
    const changes = await changesBetween(tx, row, { lot: { ...row.lot, ...next }, type })
    if (changes.length === 0) return getLotView(tx, actor, tag)
    await tx.update(partLots).set({ ...next, version: sql`${partLots.version} + 1` }).where(eq(partLots.id, row.lot.id))
    await appendLedger(tx, actor, { kind: 'part_lot', id: row.lot.id }, 'changed', { name: lotTitle(type, tag), changes })
    return getLotView(tx, actor, tag)
  })
}

async function correctedSource(tx: Database, { lot }: LotRow, source: ChangedPartLot['source']) {
  if (source === null) return {}
  if (lot.sourceKind === 'donor' || lot.sourceKind === 'split') {
    throw invalid([{ path: 'source.sourceKind', message: 'This lot came out of a unit or another lot: where it came from is part of their record too, and stays' }])
  }
  const { sourceKind, supplierName, invoiceNumber, acquiredOn, parentTag } = source
  const isBought = sourceKind === 'supplier'
  return {
    sourceKind, acquiredOn, supplierId: isBought ? await partyNamed(tx, supplierName) : null, invoiceNumber: isBought ? invoiceNumber : '',
    parentLotId: sourceKind === 'split' && parentTag !== null ? await parentFor(tx, lot, parentTag) : null,
  }
}

/** The lot another was taken out of; 422 where that would make a lot its own source, at whatever remove. */
async function parentFor(tx: Database, lot: LotRow['lot'], parentTag: string): Promise<string> {
  const [parent] = await tx.select({ id: partLots.id }).from(partLots).where(eq(partLots.tag, parentTag))
  if (!parent) throw invalid([{ path: 'source.parentTag', message: `No part lot has the tag ${formatTag(parentTag)}` }])
  const { rows } = await tx.execute(sql`with recursive above(id) as (
    select ${parent.id}::uuid union select ${partLots.parentLotId} from ${partLots} join above on ${partLots.id} = above.id where ${partLots.parentLotId} is not null
  ) select 1 from above where id = ${lot.id}`)
  if (rows.length > 0) throw invalid([{ path: 'source.parentTag', message: 'A lot can’t be its own source, and that one came out of this one' }])
  return parent.id
}

async function requireVersion(tx: Database, actor: Person, { lot }: LotRow, version: number): Promise<void> {
  if (lot.version !== version) throw stale('lot', await getLotView(tx, actor, lot.tag))
}

/** A lot's answers as the ledger tells them. The supplier is named only as changed: the ledger of a lot is read by everyone. */
async function describe(tx: Database, { lot, type }: LotRow): Promise<Record<string, string>> {
  const place = await findPlace(tx, lot.locationId)
  return {
    'kind': PART_KIND_LABELS[type.kind],
    'what it is': partTitle(type),
    'package or base': type.package,
    'maker as marked': lot.maker,
    'date code as marked': lot.dateCode,
    'made from': lot.madeFrom ?? '',
    'made until': lot.madeTo ?? '',
    'condition': LOT_CONDITION_LABELS[lot.condition],
    'tested': lot.tested,
    'note': lot.note,
    'source': LOT_SOURCE_LABELS[lot.sourceKind],
    'came on': lot.acquiredOn,
    'place': place?.path ?? '',
  }
}

async function changesBetween(tx: Database, before: LotRow, after: LotRow): Promise<FieldChange[]> {
  const [from, to] = [await describe(tx, before), await describe(tx, after)]
  const changes: FieldChange[] = Object.keys(to).filter(field => from[field] !== to[field]).map(field => ({ field, from: from[field] || null, to: to[field] || null }))
  const isOtherInvoice = before.lot.supplierId !== after.lot.supplierId || before.lot.invoiceNumber !== after.lot.invoiceNumber
  return isOtherInvoice ? [...changes, { field: 'supplier or invoice', from: null, to: 'corrected' }] : changes
}

/** Whether a lot may be fitted, and why. 409 if somebody else changed it meanwhile. */
export async function changeStanding(db: Database, actor: Person, { tag, version, standing, why }: LotStandingChange & { tag: string }): Promise<PartLotView> {
  return db.transaction(async (tx) => {
    const row = await lockLot(tx, tag)
    await requireVersion(tx, actor, row, version)
    if (row.lot.standing !== standing) {
      await tx.update(partLots).set({ standing, standingBecause: standing === 'good' ? '' : why, version: sql`${partLots.version} + 1` }).where(eq(partLots.id, row.lot.id))
      await appendLedger(tx, actor, { kind: 'part_lot', id: row.lot.id }, 'lot_standing_changed', { name: lotTitle(row.type, tag), from: row.lot.standing, to: standing, why })
    }
    return getLotView(tx, actor, tag)
  })
}

/** Puts a lot in a place, or in none. 409 if somebody else changed it meanwhile. */
export async function placeLot(db: Database, actor: Person, { tag, version, placeTag }: LotPlacing & { tag: string }): Promise<PartLotView> {
  return db.transaction(async (tx) => {
    const row = await lockLot(tx, tag)
    await requireVersion(tx, actor, row, version)
    const place = placeTag === null ? null : await placeForField(tx, placeTag, 'placeTag')
    const from = await findPlace(tx, row.lot.locationId)
    if ((place?.id ?? null) !== row.lot.locationId) {
      await tx.update(partLots).set({ locationId: place?.id ?? null, version: sql`${partLots.version} + 1` }).where(eq(partLots.id, row.lot.id))
      await appendLedger(tx, actor, { kind: 'part_lot', id: row.lot.id }, 'moved', { from: from?.path ?? null, to: place?.path ?? null })
    }
    return getLotView(tx, actor, tag)
  })
}

/** Names of suppliers already known, for a form's suggestions; only for those who may read names. */
export async function listSuppliers(db: Database): Promise<string[]> {
  const rows = await db.selectDistinct({ name: parties.name }).from(partLots).innerJoin(parties, eq(parties.id, partLots.supplierId)).orderBy(parties.name).limit(500)
  return rows.map(({ name }) => name)
}

/** Corrects how many came in and what they cost, while none of them has moved since. 409 once one has. */
export async function correctReceipt(db: Database, actor: Person, { tag, version, quantity: typed, cost: amount, why }: CorrectedReceipt & { tag: string }): Promise<PartLotView> {
  return db.transaction(async (tx) => {
    const row = await lockLot(tx, tag)
    await requireVersion(tx, actor, row, version)
    if (row.lot.sourceKind === 'donor' || row.lot.sourceKind === 'split') throw conflict('has-a-source', 'What this lot cost came out of a unit or another lot, and stays in balance with it.')
    const movements = await tx.select().from(lotMovements).where(eq(lotMovements.lotId, row.lot.id)).orderBy(lotMovements.id)
    const standing = movements.filter(({ id, reversesId }) => reversesId === null && !movements.some(other => other.reversesId === id))
    const [receipt] = standing
    if (!receipt || standing.length > 1) throw conflict('lot-in-use', 'Parts of this lot have been used or counted out since. Take those movements back first, then correct what came in.')
    const quantity = quantityForField(row, typed, 'quantity')
    const cost = may(actor.role, 'cost.read') ? await readAmount(tx, amount, 'cost') : row.lot.costMinor === null || row.lot.currency === null ? null : { minor: row.lot.costMinor, currency: row.lot.currency }
    await moveStock(tx, actor, row, { kind: 'received', quantity: -receipt.quantity, costMinor: receipt.costMinor === null ? null : 0 - receipt.costMinor, reversesId: receipt.id, note: why })
    await tx.update(partLots).set({ costMinor: cost === null ? null : 0, currency: cost?.currency ?? null }).where(eq(partLots.id, row.lot.id))
    await moveStock(tx, actor, await lockLot(tx, tag), { kind: 'received', quantity, costMinor: cost?.minor ?? null, note: why })
    await appendLedger(tx, actor, { kind: 'part_lot', id: row.lot.id }, 'changed', {
      name: lotTitle(row.type, tag), changes: [{ field: 'came in', from: inLotUnits(row, receipt.quantity), to: inLotUnits(row, quantity) }],
    })
    return getLotView(tx, actor, tag)
  })
}
