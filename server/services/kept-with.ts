import { and, asc, eq, isNull, sql } from 'drizzle-orm'
import { keptWithItems, locationPaths, locations, units } from '../../drizzle/schema'
import { KEPT_WITH_KIND_LABELS, ORIGINALITY_LABELS, WHEREABOUTS_LABELS } from '../../shared/domain/kept-with'
import type { FieldChange } from '../../shared/domain/ledger-events'
import { formatTag } from '../../shared/domain/tag'
import type { UnitState } from '../../shared/domain/unit-state-names'
import type { ChangedKeptWith, NewKeptWith, RemovedKeptWith } from '../../shared/schemas/kept-with'
import type { KeptWithView } from '../../shared/types/kept-with'
import type { Database } from '../utils/db'
import { conflict, notFound, stale } from '../utils/errors'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import { placeForField } from './places'
import { takeTag } from './tags'
import { getUnitRow, lockUnit } from './unit-lock'

type ItemRow = typeof keptWithItems.$inferSelect

interface ItemWithPlace { item: ItemRow, placeTag: string | null, placePath: string | null }

const isHere = isNull(keptWithItems.removedAt)

function selectItems(db: Database) {
  return db.select({ item: keptWithItems, placeTag: locations.tag, placePath: locationPaths.path }).from(keptWithItems)
    .leftJoin(locations, eq(locations.id, keptWithItems.locationId))
    .leftJoin(locationPaths, eq(locationPaths.id, keptWithItems.locationId))
}

function toView({ item, placeTag, placePath }: ItemWithPlace): KeptWithView {
  return {
    tag: item.tag,
    kind: item.kind,
    description: item.description,
    originality: item.originality,
    condition: item.condition,
    whereabouts: item.whereabouts,
    place: placeTag !== null && placePath !== null ? { tag: placeTag, path: placePath } : null,
    missingSince: item.missingSince?.toISOString() ?? null,
    absenceDisclosed: item.absenceDisclosed,
    packedAt: item.packedAt?.toISOString() ?? null,
    version: item.version,
  }
}

/** What belongs to a unit (by its row's id), in the order it was noted; removed items are left out. */
export async function listKeptWith(db: Database, unitId: string): Promise<KeptWithView[]> {
  const rows = await selectItems(db).where(and(eq(keptWithItems.unitId, unitId), isHere))
    .orderBy(asc(keptWithItems.createdAt), asc(keptWithItems.tag))
  return rows.map(toView)
}

/** The same by the unit's tag; 404 if there is no such unit. */
export async function listKeptWithOf(db: Database, tag: string): Promise<KeptWithView[]> {
  return listKeptWith(db, (await getUnitRow(db, tag)).id)
}

/** One item with the unit it belongs to; 404 if there is none, or it was removed. */
export async function getKeptWith(db: Database, tag: string): Promise<KeptWithView & { unitTag: string }> {
  const [row] = await selectItems(db).where(and(eq(keptWithItems.tag, tag), isHere))
  if (!row) throw noSuchItem(tag)
  const [unit] = await db.select({ tag: units.tag }).from(units).where(eq(units.id, row.item.unitId))
  if (!unit) throw noSuchItem(tag)
  return { ...toView(row), unitTag: unit.tag }
}

/** Adds an item to a unit whose row the caller has locked, in the caller's transaction. */
export async function insertKeptWith(tx: Database, actor: Actor, unitId: string, input: NewKeptWith & { kitItemId?: string | null }): Promise<string> {
  const place = input.placeTag === null ? null : await placeForField(tx, input.placeTag, 'placeTag')
  const tag = await takeTag(tx, 'K')
  await tx.insert(keptWithItems).values({
    tag, unitId,
    kitItemId: input.kitItemId ?? null,
    kind: input.kind,
    description: input.description,
    originality: input.originality,
    condition: input.condition,
    whereabouts: input.whereabouts,
    locationId: place?.id ?? null,
    missingSince: input.whereabouts === 'missing' ? new Date() : null,
    absenceDisclosed: input.absenceDisclosed,
  })
  await appendUnitLedger(tx, actor, unitId, 'kept_with_added', { tag, description: input.description })
  return tag
}

/** Notes another item that belongs to the unit; it takes the next K tag. 409 once the unit has left the shop. */
export async function addKeptWith(db: Database, actor: Actor, { tag, ...input }: NewKeptWith & { tag: string }): Promise<KeptWithView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    refuseOnceGone(unit.state)
    return getKeptWith(tx, await insertKeptWith(tx, actor, unit.id, input))
  })
}

/** Writes an item as it should be now. 409 if somebody else changed it meanwhile, or once the unit has left the shop. */
export async function changeKeptWith(db: Database, actor: Actor, { tag, version, ...input }: ChangedKeptWith & { tag: string }): Promise<KeptWithView> {
  return db.transaction(async (tx) => {
    const row = await lockItem(tx, tag, version)
    const place = input.placeTag === null ? null : await placeForField(tx, input.placeTag, 'placeTag')
    const changes = changesBetween(
      describe(row.item, row.placePath),
      describe(input, place?.path ?? null),
    )
    if (changes.length > 0) {
      await tx.update(keptWithItems).set({
        kind: input.kind,
        description: input.description,
        originality: input.originality,
        condition: input.condition,
        whereabouts: input.whereabouts,
        locationId: place?.id ?? null,
        missingSince: input.whereabouts === 'missing' ? row.item.missingSince ?? new Date() : null,
        absenceDisclosed: input.absenceDisclosed,
        // What is missing can't be in the parcel.
        ...input.whereabouts === 'missing' ? { packedAt: null, packedBy: null } : {},
        version: sql`${keptWithItems.version} + 1`,
      }).where(eq(keptWithItems.id, row.item.id))
      await appendUnitLedger(tx, actor, row.item.unitId, 'kept_with_changed', { tag, description: input.description, changes })
    }
    return getKeptWith(tx, tag)
  })
}

/** Takes an item off the unit's list and says why; it stays in the ledger. */
export async function removeKeptWith(db: Database, actor: Actor, { tag, why, version }: RemovedKeptWith & { tag: string }): Promise<KeptWithView[]> {
  return db.transaction(async (tx) => {
    const { item } = await lockItem(tx, tag, version)
    await tx.update(keptWithItems).set({ removedAt: new Date(), version: sql`${keptWithItems.version} + 1` }).where(eq(keptWithItems.id, item.id))
    await appendUnitLedger(tx, actor, item.unitId, 'kept_with_removed', { tag, description: item.description, why })
    return listKeptWith(tx, item.unitId)
  })
}

/** Ticks an item off as packed, or takes the tick back. Doing so twice changes nothing. */
export async function setPacked(db: Database, actor: Actor, { tag, packed }: { tag: string, packed: boolean }): Promise<KeptWithView> {
  return db.transaction(async (tx) => {
    const { item } = await lockItem(tx, tag)
    if (packed && item.whereabouts === 'missing') {
      throw conflict('missing', `${item.description} is noted as missing. If it has been found, change where it is, then tick it.`)
    }
    if ((item.packedAt !== null) !== packed) await writePacked(tx, actor, item, packed)
    return getKeptWith(tx, tag)
  })
}

/** Takes back every packed tick of a unit, inside the transaction that brings it back. */
export async function unpackAll(tx: Database, actor: Actor | null, unitId: string): Promise<void> {
  const items = await tx.select().from(keptWithItems).where(and(eq(keptWithItems.unitId, unitId), isHere, sql`${keptWithItems.packedAt} is not null`))
  for (const item of items) await writePacked(tx, actor, item, false)
}

async function writePacked(tx: Database, actor: Actor | null, item: ItemRow, packed: boolean): Promise<void> {
  await tx.update(keptWithItems).set({
    packedAt: packed ? new Date() : null,
    packedBy: packed ? actor?.id ?? null : null,
    version: sql`${keptWithItems.version} + 1`,
  }).where(eq(keptWithItems.id, item.id))
  await appendUnitLedger(tx, actor, item.unitId, 'packed', { tag: item.tag, description: item.description, packed })
}

/** Lock order: the unit, then the item. The item is read again under the lock. */
async function lockItem(tx: Database, tag: string, version?: number): Promise<ItemWithPlace> {
  const { unitTag } = await getKeptWith(tx, tag)
  const unit = await lockUnit(tx, unitTag)
  refuseOnceGone(unit.state)
  const [row] = await selectItems(tx).where(and(eq(keptWithItems.tag, tag), isHere))
  if (!row) throw noSuchItem(tag)
  if (version !== undefined && row.item.version !== version) throw stale('item', toView(row))
  return row
}

function refuseOnceGone(state: UnitState): void {
  if (state === 'dispatched') {
    throw conflict('record-closed', 'The unit has been dispatched, so what went with it stays as written. Take the unit back first, if it has come back.')
  }
}

const noSuchItem = (tag: string) => notFound(`No kept-with item has the tag ${formatTag(tag)}.`, 'no-such-item')

type Described = Pick<ItemRow, 'kind' | 'description' | 'originality' | 'condition' | 'whereabouts' | 'absenceDisclosed'>

/** An item's answers as the story tells them. */
function describe(item: Described, placePath: string | null): Record<string, string> {
  return {
    'kind': KEPT_WITH_KIND_LABELS[item.kind],
    'description': item.description,
    'originality': ORIGINALITY_LABELS[item.originality],
    'condition': item.condition,
    'where it is': item.whereabouts === 'elsewhere' && placePath !== null ? placePath : WHEREABOUTS_LABELS[item.whereabouts],
    'what the buyer is told of its absence': item.absenceDisclosed,
  }
}

function changesBetween(before: Record<string, string>, after: Record<string, string>): FieldChange[] {
  return Object.keys(after)
    .filter(field => before[field] !== after[field])
    .map(field => ({ field, from: before[field] || null, to: after[field] || null }))
}
