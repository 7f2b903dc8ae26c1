import { eq, inArray } from 'drizzle-orm'
import { instruments, keptWithItems, locationPaths, locations, models, partLots, partTypes, units } from '../../drizzle/schema'
import { partTitle } from '../../shared/domain/part-words'
import type { TagKind } from '../../shared/domain/tag'
import { formatTag, isTagKind, TAG_KIND_LABELS } from '../../shared/domain/tag'
import type { TaggedThing } from '../../shared/types/tagged-thing'
import type { Database } from '../utils/db'
import { notFound } from '../utils/errors'

/** A thing with its tag, and the unit behind it where it is one. */
export interface FoundThing extends TaggedThing { unit: { id: string, modelId: string, hazardHold: string | null } | null }

type Finder = (db: Database, tags: string[]) => Promise<FoundThing[]>

const findUnits: Finder = async (db, tags) => {
  const rows = await db.select({
    tag: units.tag, id: units.id, modelId: units.modelId, hazardHold: units.hazardHold, maker: models.maker, designation: models.designation,
  }).from(units).innerJoin(models, eq(models.id, units.modelId)).where(inArray(units.tag, tags))
  return rows.map(({ tag, maker, designation, ...unit }) => ({
    tag, kind: 'U', title: `${maker} ${designation}`, subtitle: '', href: `/units/${tag}`, unit,
  }))
}

const findKeptWith: Finder = async (db, tags) => {
  const rows = await db.select({ tag: keptWithItems.tag, title: keptWithItems.description, unitTag: units.tag })
    .from(keptWithItems).innerJoin(units, eq(units.id, keptWithItems.unitId)).where(inArray(keptWithItems.tag, tags))
  return rows.map(({ tag, title, unitTag }) => ({
    tag, kind: 'K', title, subtitle: `with ${formatTag(unitTag)}`, href: `/units/${unitTag}`, unit: null,
  }))
}

const findLocations: Finder = async (db, tags) => {
  const rows = await db.select({ tag: locations.tag, title: locations.name, path: locationPaths.path })
    .from(locations).innerJoin(locationPaths, eq(locationPaths.id, locations.id)).where(inArray(locations.tag, tags))
  return rows.map(({ tag, title, path }) => ({
    tag, kind: 'L', title, subtitle: path === title ? '' : path, href: `/locations/${tag}`, unit: null,
  }))
}

const findInstruments: Finder = async (db, tags) => {
  const rows = await db.select({ tag: instruments.tag, title: instruments.name, serial: instruments.serial })
    .from(instruments).where(inArray(instruments.tag, tags))
  return rows.map(({ tag, title, serial }) => ({
    tag, kind: 'B', title, subtitle: serial === '' ? '' : `serial ${serial}`, href: `/instruments/${tag}`, unit: null,
  }))
}

const findLots: Finder = async (db, tags) => {
  const rows = await db.select({ tag: partLots.tag, type: partTypes, maker: partLots.maker, dateCode: partLots.dateCode }).from(partLots)
    .innerJoin(partTypes, eq(partTypes.id, partLots.typeId)).where(inArray(partLots.tag, tags))
  return rows.map(({ tag, type, maker, dateCode }) => ({
    tag, kind: 'P', title: partTitle(type), subtitle: [maker, dateCode].filter(Boolean).join(' '), href: `/parts/${tag}`, unit: null,
  }))
}

const FINDERS: Record<TagKind, Finder> = { U: findUnits, K: findKeptWith, P: findLots, L: findLocations, B: findInstruments }

/** What compact tags stand for, in the order given. 404 naming the first that stands for nothing. */
export async function findTagged(db: Database, tags: readonly string[]): Promise<FoundThing[]> {
  const found = new Map<string, FoundThing>()
  for (const [letter, find] of Object.entries(FINDERS)) {
    const wanted = [...new Set(tags.filter(tag => tag.startsWith(letter)))]
    if (wanted.length === 0) continue
    for (const thing of await find(db, wanted)) found.set(thing.tag, thing)
  }
  return tags.map((tag) => {
    const thing = found.get(tag)
    if (!thing) throw noSuchTag(tag)
    return thing
  })
}

/** What one compact tag stands for; 404 if nothing has it. */
export async function getTagged(db: Database, tag: string): Promise<TaggedThing> {
  const [thing] = await findTagged(db, [tag])
  if (!thing) throw noSuchTag(tag)
  const { unit: _unit, ...shown } = thing
  return shown
}

function noSuchTag(tag: string) {
  const letter = tag.charAt(0)
  const kind = isTagKind(letter) ? TAG_KIND_LABELS[letter].toLowerCase() : 'thing'
  return notFound(`No ${kind} has the tag ${formatTag(tag)}. The tag itself is sound: it may be from another shop, or never given out.`, 'no-such-tag')
}
