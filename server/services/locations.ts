import { and, count, eq, isNull, ne, sql } from 'drizzle-orm'
import { keptWithItems, locationPaths, locations, units } from '../../drizzle/schema'
import type { FieldChange } from '../../shared/domain/ledger-events'
import type { LocationKind } from '../../shared/domain/locations'
import { LOCATION_KIND_LABELS, mayStandIn } from '../../shared/domain/locations'
import { formatTag } from '../../shared/domain/tag'
import type { LocationChange, NewLocation } from '../../shared/schemas/locations'
import type { ItemHere, LocationContents, LocationView } from '../../shared/types/location'
import type { PlaceView } from '../../shared/types/unit'
import type { Database } from '../utils/db'
import { conflict, invalid, notFound, stale } from '../utils/errors'
import { violates } from '../utils/pg-errors'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'
import { takeTag } from './tags'

type LocationRow = typeof locations.$inferSelect

/** Every place as a tree read downwards: each after the one it stands in, names in the order a person counts. */
export async function listLocations(db: Database): Promise<LocationView[]> {
  const { rows } = await db.execute<LocationRecord>(selectLocations(sql`true`))
  return rows.sort((a, b) => compareNames(a.names, b.names)).map(toView)
}

/** The places something can be put in, as tag and path. */
export async function listPlaces(db: Database): Promise<PlaceView[]> {
  return (await listLocations(db)).filter(place => place.retiredAt === null).map(({ tag, path }) => ({ tag, path }))
}

/** One place with the kept-with items that are in it or in the places inside it; 404 if no place has the tag. */
export async function getLocation(db: Database, tag: string): Promise<LocationContents> {
  const view = await getView(db, tag)
  const { rows } = await db.execute<ItemHere & Record<string, unknown>>(sql`
    select item.tag, item.kind, item.description, unit.tag as "unitTag", place.path
    from ${keptWithItems} item
    join ${units} unit on unit.id = item.unit_id
    join ${locationPaths} place on place.id = item.location_id
    where item.removed_at is null and (select id from ${locations} where tag = ${tag}) = any(place.ids)
    order by place.path, item.tag limit 500`)
  return { ...view, items: rows.map(({ tag: itemTag, kind, description, unitTag, path }) => ({ tag: itemTag, kind, description, unitTag, path })) }
}

/** Adds a room, bay, shelf or bin. 422 where it may not stand, or where a neighbour has its name. */
export async function addLocation(db: Database, actor: Actor, input: NewLocation): Promise<LocationView> {
  const tag = await refuseTakenName(() => db.transaction(async (tx) => {
    const parent = await lockParent(tx, input.kind, input.parentTag)
    const made = await takeTag(tx, 'L')
    const [row] = await tx.insert(locations).values({ tag: made, kind: input.kind, name: input.name, note: input.note, parentId: parent?.id ?? null })
      .returning({ id: locations.id })
    if (!row) throw new Error('The place was not written')
    await appendLedger(tx, actor, { kind: 'location', id: row.id }, 'created', { name: (await getView(tx, made)).path })
    return made
  }))
  return getView(db, tag)
}

/** Renames, moves, annotates or retires a place. A place is retired only when nothing is in it. */
export async function changeLocation(db: Database, actor: Actor, tag: string, change: LocationChange): Promise<LocationView> {
  await refuseTakenName(() => db.transaction(async (tx) => {
    const row = await lockLocation(tx, tag)
    const before = await getView(tx, tag)
    if (row.version !== change.version) throw stale('place', before)
    const parentId = change.parentTag === undefined ? row.parentId : await newParent(tx, row, change.parentTag)
    const retired = change.retired ?? row.retiredAt !== null
    if (retired && !row.retiredAt) await refuseUnlessEmpty(tx, row, before.path)
    if (!retired && row.retiredAt) await refuseInRetired(tx, parentId)
    await tx.update(locations).set({
      name: change.name ?? row.name, note: change.note ?? row.note, parentId, version: sql`${locations.version} + 1`,
      retiredAt: retired ? row.retiredAt ?? sql`now()` : null,
    }).where(eq(locations.id, row.id))
    await recordChange(tx, actor, row.id, before, await getView(tx, tag))
  }))
  return getView(db, tag)
}

async function recordChange(tx: Database, actor: Actor, id: string, before: LocationView, after: LocationView): Promise<void> {
  const subject = { kind: 'location', id } as const
  if (after.retiredAt && !before.retiredAt) return appendLedger(tx, actor, subject, 'retired', { name: before.path, why: 'no longer used' })
  const changes: FieldChange[] = [
    { field: 'place', from: before.path, to: after.path },
    { field: 'note', from: before.note || null, to: after.note || null },
    { field: 'used', from: before.retiredAt ? 'no' : 'yes', to: after.retiredAt ? 'no' : 'yes' },
  ].filter(({ from, to }) => from !== to)
  if (changes.length) await appendLedger(tx, actor, subject, 'changed', { name: after.path, changes })
}

/** The place it is to stand in, checked against the rules; a move keeps everything inside it. */
async function newParent(tx: Database, row: LocationRow, parentTag: string | null): Promise<string | null> {
  if (parentTag === row.tag) throw invalid([{ path: 'parentTag', message: 'A place cannot stand in itself' }])
  if (parentTag !== null) {
    const [inside] = await tx.select({ id: locations.id }).from(locations).innerJoin(locationPaths, eq(locationPaths.id, locations.id))
      .where(and(eq(locations.tag, parentTag), sql`${row.id}::uuid = any(${locationPaths.ids})`))
    if (inside) throw invalid([{ path: 'parentTag', message: 'A place cannot stand in one that is inside it' }])
  }
  return (await lockParent(tx, row.kind, parentTag))?.id ?? null
}

/** The place to stand in, kept from being retired until this transaction ends. */
async function lockParent(tx: Database, kind: LocationKind, parentTag: string | null): Promise<LocationRow | null> {
  const refuse = (message: string) => invalid([{ path: 'parentTag', message }])
  if (parentTag === null) {
    if (!mayStandIn(kind, null)) throw refuse(`Choose where the ${LOCATION_KIND_LABELS[kind].toLowerCase()} stands: only a room stands by itself`)
    return null
  }
  const [parent] = await tx.select().from(locations).where(eq(locations.tag, parentTag)).for('share')
  if (!parent) throw refuse(`No place has the tag ${formatTag(parentTag)}`)
  if (parent.retiredAt) throw refuse(`${parent.name} is no longer used: choose another place`)
  if (!mayStandIn(kind, parent.kind)) {
    throw refuse(kind === 'room' ? 'A room stands by itself' : `A ${LOCATION_KIND_LABELS[kind].toLowerCase()} cannot stand in a ${LOCATION_KIND_LABELS[parent.kind].toLowerCase()}`)
  }
  return parent
}

async function refuseInRetired(tx: Database, parentId: string | null): Promise<void> {
  if (parentId === null) return
  const [parent] = await tx.select().from(locations).where(eq(locations.id, parentId)).for('share')
  if (parent?.retiredAt) throw conflict('parent-retired', `${parent.name}, where it stands, is not used either. Bring that back first.`)
}

/** The row is locked: whoever is putting something here has finished, or waits and will find it retired. */
async function refuseUnlessEmpty(tx: Database, { id }: LocationRow, path: string): Promise<void> {
  const [inside] = await tx.select({ n: count() }).from(locations).where(and(eq(locations.parentId, id), isNull(locations.retiredAt)))
  const [standing] = await tx.select({ n: count() }).from(units).where(and(eq(units.locationId, id), ne(units.state, 'dispatched')))
  const [kept] = await tx.select({ n: count() }).from(keptWithItems).where(and(eq(keptWithItems.locationId, id), isNull(keptWithItems.removedAt)))
  const what = [
    inWords(inside?.n ?? 0, 'place', 'places'), inWords(standing?.n ?? 0, 'unit', 'units'), inWords(kept?.n ?? 0, 'kept-with item', 'kept-with items'),
  ].filter(Boolean)
  if (what.length) throw conflict('not-empty', `${path} still holds ${what.join(' and ')}. Move what is there first.`)
}

const inWords = (n: number, one: string, many: string) => n === 0 ? '' : `${n} ${n === 1 ? one : many}`

async function lockLocation(tx: Database, tag: string): Promise<LocationRow> {
  const [row] = await tx.select().from(locations).where(eq(locations.tag, tag)).for('update')
  if (!row) throw noSuchPlace(tag)
  return row
}

const noSuchPlace = (tag: string) => notFound(`No place has the tag ${formatTag(tag)}.`, 'no-such-place')

async function refuseTakenName<T>(write: () => Promise<T>): Promise<T> {
  try {
    return await write()
  } catch (error) {
    if (violates(error, 'locations_name_key')) throw invalid([{ path: 'name', message: 'A place of this name stands there already' }])
    throw error
  }
}

interface LocationRecord extends Record<string, unknown> {
  tag: string
  kind: LocationKind
  name: string
  names: string[]
  path: string
  parent_tag: string | null
  note: string
  retired_at: string | Date | null
  units: number
  kept_with: number
  version: number
}

function selectLocations(where: ReturnType<typeof sql>) {
  return sql`
    select l.tag, l.kind, l.name, p.names, p.path, parent.tag as parent_tag, l.note, l.retired_at, l.version,
      (select count(*)::int from ${units} u where u.location_id = l.id and u.state <> 'dispatched') as units,
      (select count(*)::int from ${keptWithItems} k where k.location_id = l.id and k.removed_at is null) as kept_with
    from ${locations} l
    join ${locationPaths} p on p.id = l.id
    left join ${locations} parent on parent.id = l.parent_id
    where ${where}`
}

async function getView(db: Database, tag: string): Promise<LocationView> {
  const { rows: [row] } = await db.execute<LocationRecord>(selectLocations(sql`l.tag = ${tag}`))
  if (!row) throw noSuchPlace(tag)
  return toView(row)
}

function toView(row: LocationRecord): LocationView {
  return {
    tag: row.tag, kind: row.kind, name: row.name, path: row.path, depth: row.names.length - 1, parentTag: row.parent_tag, note: row.note,
    retiredAt: row.retired_at === null ? null : new Date(row.retired_at).toISOString(), units: row.units, keptWith: row.kept_with, version: row.version,
  }
}

const names = new Intl.Collator('en', { numeric: true, sensitivity: 'base' })

function compareNames(a: readonly string[], b: readonly string[]): number {
  for (const [index, name] of a.entries()) {
    const other = b[index]
    if (other === undefined) return 1
    const order = names.compare(name, other)
    if (order !== 0) return order
  }
  return a.length - b.length
}
