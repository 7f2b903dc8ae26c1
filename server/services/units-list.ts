import { and, asc, count, desc, eq, inArray, isNull, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import { z } from 'zod'
import { bands, locationPaths, locations, models, photos, unitCoverage, units } from '../../drizzle/schema'
import type { Interval } from '../../shared/domain/coverage'
import { may } from '../../shared/domain/roles'
import { formatTag } from '../../shared/domain/tag'
import type { UnitsListQuery } from '../../shared/schemas/units-list'
import type { BandView } from '../../shared/types/model'
import type { Page } from '../../shared/types/page'
import type { Person } from '../../shared/types/person'
import type { UnitSummary } from '../../shared/types/unit'
import { readCursor, writeCursor } from '../utils/cursor'
import type { Database } from '../utils/db'
import { badRequest } from '../utils/errors'
import { waitsFor } from './unit-needs'
import { matchesWords } from './units-search'

/** Where a page ended: to the microsecond, because two units may be booked in within one millisecond. */
const placeInList = z.tuple([z.iso.datetime({ precision: 6 }), z.uuid()])

const bookedInAt = sql<string>`to_char(${units.createdAt} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"')`

/**
 * Units that answer a query, the newest first, in pages. `total` counts all that answer. Money is null for those who
 * may not see it. 400 for a place that does not exist or a cursor that is not ours.
 *
 * The number of statements does not depend on the number of units.
 */
export async function listUnits(db: Database, reader: Pick<Person, 'role'>, query: UnitsListQuery): Promise<Page<UnitSummary>> {
  const wanted = and(...await conditions(db, query))
  const [counted] = await db.select({ total: count() }).from(units).innerJoin(models, eq(models.id, units.modelId)).where(wanted)
  const rows = await selectRows(db, and(wanted, afterCursor(query.cursor)), query.limit + 1)
  const shown = rows.slice(0, query.limit)
  const last = rows.length > query.limit ? shown.at(-1) : undefined
  return {
    items: await summarise(db, reader, shown),
    nextCursor: last ? writeCursor([last.bookedInAt, last.id]) : null,
    total: counted?.total ?? 0,
  }
}

type ListRow = Awaited<ReturnType<typeof selectRows>>[number]

function selectRows(db: Database, where: SQL | undefined, limit: number) {
  return db.select({
    id: units.id,
    tag: units.tag,
    model: { id: models.id, maker: models.maker, designation: models.designation, kind: models.kind, yearsFrom: models.yearsFrom, yearsTo: models.yearsTo },
    serialAnswer: units.serialAnswer,
    serial: units.serial,
    state: units.state,
    hazardHold: units.hazardHold,
    placeTag: locations.tag,
    placePath: locationPaths.path,
    ownership: units.ownership,
    askingMinor: units.askingMinor,
    askingCurrency: units.askingCurrency,
    bookedInAt,
  }).from(units)
    .innerJoin(models, eq(models.id, units.modelId))
    .leftJoin(locations, eq(locations.id, units.locationId))
    .leftJoin(locationPaths, eq(locationPaths.id, units.locationId))
    .where(where).orderBy(desc(units.createdAt), desc(units.id)).limit(limit)
}

async function summarise(db: Database, reader: Pick<Person, 'role'>, rows: ListRow[]): Promise<UnitSummary[]> {
  const bandsOf = await bandsByModel(db, [...new Set(rows.map(row => row.model.id))])
  const photoOf = await firstPhotos(db, rows.map(row => row.id))
  const seesPrice = may(reader.role, 'price.read')
  return rows.map((row) => {
    const photoId = photoOf.get(row.id)
    return {
      tag: row.tag,
      model: row.model,
      serial: { answer: row.serialAnswer, text: row.serial },
      state: row.state,
      hazardHold: row.hazardHold,
      place: row.placeTag !== null && row.placePath !== null ? { tag: row.placeTag, path: row.placePath } : null,
      bands: bandsOf.get(row.model.id) ?? [],
      ownership: row.ownership,
      askingMinor: seesPrice ? row.askingMinor : null,
      askingCurrency: seesPrice ? row.askingCurrency : null,
      thumbnailUrl: photoId === undefined ? null : `/api/photos/${photoId}/320.webp`,
      createdAt: row.bookedInAt,
    }
  })
}

/** The bands of several models in one statement, in the order of the switch. */
async function bandsByModel(db: Database, modelIds: string[]): Promise<Map<string, BandView[]>> {
  const byModel = new Map<string, BandView[]>()
  if (modelIds.length === 0) return byModel
  const rows = await db.select({
    modelId: bands.modelId, label: bands.label, function: bands.function, lowerHz: bands.lowerHz, upperHz: bands.upperHz,
    dialTolerancePercent: bands.dialTolerancePercent,
  }).from(bands).where(inArray(bands.modelId, modelIds)).orderBy(asc(bands.modelId), asc(bands.position))
  for (const { modelId, ...band } of rows) byModel.set(modelId, [...byModel.get(modelId) ?? [], band])
  return byModel
}

/** The first photo of each of several units, in one statement. */
async function firstPhotos(db: Database, unitIds: string[]): Promise<Map<string, string>> {
  if (unitIds.length === 0) return new Map()
  const rows = await db.selectDistinctOn([photos.unitId], { unitId: photos.unitId, id: photos.id }).from(photos)
    .where(and(inArray(photos.unitId, unitIds), isNull(photos.removedAt)))
    .orderBy(asc(photos.unitId), asc(photos.subject), asc(photos.position), asc(photos.createdAt))
  return new Map(rows.map(row => [row.unitId, row.id]))
}

function afterCursor(cursor: string | undefined): SQL | undefined {
  if (cursor === undefined) return undefined
  const [at, id] = readCursor(cursor, placeInList)
  return sql`(${units.createdAt}, ${units.id}) < (${at}::timestamptz, ${id}::uuid)`
}

async function conditions(db: Database, query: UnitsListQuery): Promise<(SQL | undefined)[]> {
  return [
    query.state && query.state.length > 0 ? inArray(units.state, query.state) : undefined,
    query.model === undefined ? undefined : eq(units.modelId, query.model),
    query.location === undefined ? undefined : await standsIn(db, query.location),
    query.needs && waitsFor(db, query.needs),
    coverageAnswers(query),
    query.q ? matchesWords(query.q) : undefined,
  ]
}

/** In this place or in any place within it. */
async function standsIn(db: Database, tag: string): Promise<SQL> {
  const [place] = await db.select({ id: locations.id }).from(locations).where(eq(locations.tag, tag))
  if (!place) throw badRequest('no-such-place', `No place has the tag ${formatTag(tag)}.`)
  return sql`${units.locationId} in (select ${locationPaths.id} from ${locationPaths} where ${place.id}::uuid = any(${locationPaths.ids}))`
}

/** Whole hertz, both ends included, as PostgreSQL's range. */
const rangeOf = ({ lowerHz, upperHz }: Interval) => sql`int8range(${lowerHz}::int8, ${upperHz}::int8, '[]')`

/** All that is asked must be answered by one function: generating 455 kHz and measuring 30 MHz is not generating both. */
function coverageAnswers({ covers, overlaps, function: functions }: UnitsListQuery): SQL | undefined {
  const asked = [
    ...(covers ?? []).map(range => sql`${unitCoverage.ranges} @> ${rangeOf(range)}`),
    ...(overlaps ?? []).map(range => sql`${unitCoverage.ranges} && ${rangeOf(range)}`),
    ...functions && functions.length > 0 ? [inArray(unitCoverage.function, functions), sql`not isempty(${unitCoverage.ranges})`] : [],
  ]
  if (asked.length === 0) return undefined
  return sql`exists (select 1 from ${unitCoverage} where ${and(eq(unitCoverage.unitId, units.id), ...asked)})`
}
