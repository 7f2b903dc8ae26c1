import { and, asc, desc, eq, inArray, isNull, notInArray } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import { holds, ledger, locationPaths, models, people, units } from '../../drizzle/schema'
import { eventsHiddenFrom, tellEvent } from '../../shared/domain/story'
import { IN_STOCK_STATES } from '../../shared/domain/unit-state-names'
import { UNIT_NEEDS } from '../../shared/domain/unit-needs'
import type { Person } from '../../shared/types/person'
import type { TodayLine, TodayUnit, TodayView } from '../../shared/types/today'
import type { Database } from '../utils/db'
import { waitsFor } from './unit-needs'

/** How many pieces of each line the page names, and how many lines of the story. */
const NAMED = 5
const STORY_LINES = 12

const isInStock = inArray(units.state, [...IN_STOCK_STATES])

/** What waits to be done in the shop today, and what happened last; money and names as the reader may see them. */
export async function getToday(db: Database, reader: Pick<Person, 'role'>): Promise<TodayView> {
  const lines: TodayLine[] = []
  for (const key of UNIT_NEEDS) {
    const which = waitsFor(db, key)
    const total = await db.$count(units, which)
    if (total > 0) lines.push({ key, total, units: await nameUnits(db, which) })
  }
  return { inStock: await db.$count(units, isInStock), lines, story: await latestStory(db, reader) }
}

async function nameUnits(db: Database, which: SQL | undefined): Promise<TodayUnit[]> {
  const rows = await db.select({
    tag: units.tag, maker: models.maker, designation: models.designation, state: units.state, hazardHold: units.hazardHold,
    path: locationPaths.path, until: holds.until,
  }).from(units)
    .innerJoin(models, eq(models.id, units.modelId))
    .leftJoin(locationPaths, eq(locationPaths.id, units.locationId))
    .leftJoin(holds, and(eq(holds.unitId, units.id), isNull(holds.releasedAt)))
    .where(which).orderBy(asc(units.createdAt), asc(units.id)).limit(NAMED)
  return rows.map(({ tag, maker, designation, state, hazardHold, path, until }) => ({
    tag, name: `${maker} ${designation}`, state, hazardHold, note: hazardHold ?? (until ? `until ${until}` : path ?? 'no place'),
  }))
}

async function latestStory(db: Database, reader: Pick<Person, 'role'>): Promise<TodayView['story']> {
  const hidden = eventsHiddenFrom(reader.role)
  const rows = await db.select({
    id: ledger.id, at: ledger.at, who: people.name, event: ledger.event, details: ledger.details,
    tag: units.tag, maker: models.maker, designation: models.designation,
  }).from(ledger)
    .innerJoin(units, eq(units.id, ledger.unitId)).innerJoin(models, eq(models.id, units.modelId))
    .leftJoin(people, eq(people.id, ledger.personId))
    .where(hidden.length > 0 ? notInArray(ledger.event, hidden) : undefined)
    .orderBy(desc(ledger.id)).limit(STORY_LINES)
  return rows.map(({ details, at, maker, designation, ...entry }) => ({
    ...entry, name: `${maker} ${designation}`, at: at.toISOString(), ...tellEvent(entry.event, details),
  }))
}
