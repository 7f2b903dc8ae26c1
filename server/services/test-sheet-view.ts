import { group } from 'd3-array'
import { and, asc, desc, eq, inArray, isNotNull, isNull, lt } from 'drizzle-orm'
import { alias } from 'drizzle-orm/pg-core'
import { driftReadings, instruments, models, people, photos, procedureVersions, readings, sheetChecks, testSheetInstruments, testSheets } from '../../drizzle/schema'
import { isWithin } from '../../shared/domain/decision'
import { boundsOf } from '../../shared/domain/limits'
import { tallyOf } from '../../shared/domain/sheet-tally'
import { formatTag } from '../../shared/domain/tag'
import type { EarlierReading, EarlierSheet, ReadingView, StaleView, TestSheetSummary, TestSheetView } from '../../shared/types/bench'
import type { Database } from '../utils/db'
import { notFound } from '../utils/errors'
import type { InstrumentRecord } from './instruments'
import { gatherInstruments, instrumentInWords, toGauge, toInstrumentView } from './instruments'
import { instrumentWarnings } from './instrument-warnings'
import { findPowerDecision } from './power'
import { findSafetyCheckOfSheet } from './safety-checks'
import type { CheckpointFields, ReadingRow, SheetRow } from './sheet-results'
import { checkpointFields, resultsOf, ruleOf, takenView, toCheckpoint } from './sheet-results'
import { staleViews } from './sheet-staleness'
import { todayInShop } from './shop-day'
import type { UnitRow } from './unit-lock'
import { getUnitRow } from './unit-lock'

export type { SheetRow } from './sheet-results'
type CheckRow = typeof sheetChecks.$inferSelect

interface SheetHead { sheet: SheetRow, testedBy: string, signedBy: string | null, procedureNumber: number | null, procedureOrigin: string | null }
interface SheetParts extends SheetHead { readings: ReadingRow[], checks: CheckRow[], instruments: InstrumentRecord[] }

/** The readings of a sheet with what follows from each. */
function readingsOf({ sheet, readings: rows, instruments: records }: SheetParts, photoIds: ReadonlyMap<string, string[]>): ReadingView[] {
  const gauges = records.map(record => toGauge(record, sheet.testedOn))
  return rows.map((row) => {
    const { found, left } = resultsOf(row, gauges, ruleOf(sheet))
    return {
      id: row.id,
      position: row.position,
      ...toCheckpoint(row),
      found: takenView(row.foundText, found),
      left: takenView(row.leftText, left),
      instrumentId: row.instrumentId,
      note: row.note,
      photoIds: photoIds.get(row.id) ?? [],
    }
  })
}

const NO_PHOTOS: ReadonlyMap<string, string[]> = new Map()

function toSummary(parts: SheetParts, stale: StaleView, warnings: string[], views: readonly ReadingView[]): TestSheetSummary {
  const { sheet } = parts
  return {
    number: sheet.number,
    testedOn: sheet.testedOn,
    testedBy: parts.testedBy,
    signedAt: sheet.signedAt?.toISOString() ?? null,
    ...stale,
    tally: tallyOf(views),
    checksFailed: parts.checks.filter(check => check.result === 'fail').length,
    instruments: parts.instruments.map(record => instrumentInWords(record, sheet.testedOn)),
    instrumentWarnings: warnings,
  }
}

/** Everything that hangs on some sheets, in a few questions to the database however many there are. */
async function gatherParts(db: Database, rows: readonly SheetHead[]): Promise<SheetParts[]> {
  const ids = rows.map(({ sheet }) => sheet.id)
  if (ids.length === 0) return []
  const points = await db.select().from(readings).where(inArray(readings.sheetId, ids)).orderBy(asc(readings.position))
  const checks = await db.select().from(sheetChecks).where(inArray(sheetChecks.sheetId, ids)).orderBy(asc(sheetChecks.position))
  const used = await db.select().from(testSheetInstruments).where(inArray(testSheetInstruments.sheetId, ids))
  const usedIds = [...new Set(used.map(({ instrumentId }) => instrumentId))]
  const records = usedIds.length === 0 ? [] : await gatherInstruments(db, await db.select().from(instruments).where(inArray(instruments.id, usedIds)).orderBy(asc(instruments.tag)))
  const pointsOf = group(points, ({ sheetId }) => sheetId)
  return rows.map(head => ({
    ...head,
    readings: pointsOf.get(head.sheet.id) ?? [],
    checks: checks.filter(check => check.sheetId === head.sheet.id),
    instruments: records.filter(({ row }) => used.some(({ sheetId, instrumentId }) => sheetId === head.sheet.id && instrumentId === row.id)),
  }))
}

const signers = alias(people, 'signers')
const selectSheets = (db: Database) => db.select({
  sheet: testSheets, testedBy: people.name, signedBy: signers.name, procedureNumber: procedureVersions.number, procedureOrigin: procedureVersions.origin,
}).from(testSheets)
  .innerJoin(people, eq(people.id, testSheets.testedBy))
  .leftJoin(signers, eq(signers.id, testSheets.signedBy))
  .leftJoin(procedureVersions, eq(procedureVersions.id, testSheets.procedureVersionId))

/** A unit's sheets (by its row's id), the newest first. */
export async function listTestSheets(db: Database, unitId: string): Promise<TestSheetSummary[]> {
  const rows = await selectSheets(db).where(eq(testSheets.unitId, unitId)).orderBy(desc(testSheets.number))
  if (rows.length === 0) return []
  const staleOf = await staleViews(db, rows.map(({ sheet }) => sheet))
  const all = await gatherParts(db, rows)
  const warnings = await warningsOf(db, all)
  return all.map(parts => toSummary(parts, staleOf(parts.sheet.id), warnings.get(parts.sheet.id) ?? [], readingsOf(parts, NO_PHOTOS)))
}

async function warningsOf(db: Database, all: readonly SheetParts[]): Promise<Map<string, string[]>> {
  const today = await todayInShop(db)
  return instrumentWarnings(db, all.map(({ sheet, instruments: records }) => ({ sheetId: sheet.id, testedOn: sheet.testedOn, records })), today)
}

/** The same by the unit's tag; 404 if there is no such unit. */
export async function listTestSheetsOf(db: Database, tag: string): Promise<TestSheetSummary[]> {
  return listTestSheets(db, (await getUnitRow(db, tag)).id)
}

/** One sheet by the unit's compact tag and its number within the unit; 404 if there is none. */
export async function getTestSheet(db: Database, { tag, number }: { tag: string, number: number }): Promise<TestSheetView> {
  return viewSheet(db, await getUnitRow(db, tag), number)
}

/** The same for a unit already read. */
export async function viewSheet(db: Database, unit: UnitRow, number: number): Promise<TestSheetView> {
  const rows = await selectSheets(db).where(and(eq(testSheets.unitId, unit.id), eq(testSheets.number, number)))
  const [parts] = await gatherParts(db, rows)
  if (!parts) throw noSuchSheet(unit.tag, number)
  const { sheet } = parts
  const [model] = await db.select({ maker: models.maker, designation: models.designation }).from(models).where(eq(models.id, unit.modelId))
  const power = await findPowerDecision(db, unit)
  const views = readingsOf(parts, await photosOf(db, parts.readings))
  const warnings = await warningsOf(db, [parts])
  return {
    ...toSummary(parts, (await staleViews(db, [sheet]))(sheet.id), warnings.get(sheet.id) ?? [], views),
    unitTag: unit.tag,
    unitName: model ? `${model.maker} ${model.designation}` : '',
    hazardHold: unit.hazardHold,
    powerRefusal: power.allowed ? null : power.sentence,
    warmUpMinutes: sheet.warmUpMinutes,
    supply: sheet.supply,
    ambientCelsius: sheet.ambientCelsius,
    note: sheet.note,
    procedure: parts.procedureNumber === null ? null : { number: parts.procedureNumber, origin: parts.procedureOrigin ?? '' },
    deviations: sheet.deviations,
    decisionRule: ruleOf(sheet),
    signedBy: parts.signedBy,
    drift: { label: sheet.driftLabel, quantity: sheet.driftQuantity, readings: await listDrift(db, sheet.id) },
    instrumentList: parts.instruments.map(record => toInstrumentView(record, sheet.testedOn)),
    readings: views,
    checks: parts.checks.map(({ name, result, note }) => ({ name, result, note })),
    safety: await findSafetyCheckOfSheet(db, unit.id, sheet.id),
    earlier: await listEarlier(db, unit.id, sheet.number),
    version: sheet.version,
  }
}

/** The photographs of each reading, by the reading's id. */
async function photosOf(db: Database, rows: readonly ReadingRow[]): Promise<ReadonlyMap<string, string[]>> {
  if (rows.length === 0) return NO_PHOTOS
  const taken = await db.select({ id: photos.id, readingId: photos.readingId }).from(photos)
    .where(and(inArray(photos.readingId, rows.map(({ id }) => id)), isNull(photos.removedAt))).orderBy(asc(photos.createdAt))
  const byReading = new Map<string, string[]>()
  for (const { id, readingId } of taken) if (readingId) byReading.set(readingId, [...byReading.get(readingId) ?? [], id])
  return byReading
}

async function listDrift(db: Database, sheetId: string) {
  const rows = await db.select().from(driftReadings).where(eq(driftReadings.sheetId, sheetId)).orderBy(asc(driftReadings.position))
  return rows.map(({ minutes, readingText, readingValue }) => ({ minutes, text: readingText, value: readingValue }))
}

/** How many earlier sheets a chart shows behind the newest. */
const MOST_EARLIER = 20

/** The signed sheets before this one, the newest first, with what they left behind at each checkpoint. */
async function listEarlier(db: Database, unitId: string, number: number): Promise<EarlierSheet[]> {
  const sheets = await db.select({ id: testSheets.id, number: testSheets.number, testedOn: testSheets.testedOn }).from(testSheets)
    .where(and(eq(testSheets.unitId, unitId), lt(testSheets.number, number), isNotNull(testSheets.signedAt)))
    .orderBy(desc(testSheets.number)).limit(MOST_EARLIER)
  if (sheets.length === 0) return []
  const rows = await db.select({ ...checkpointFields, sheetId: readings.sheetId, foundValue: readings.foundValue, leftValue: readings.leftValue }).from(readings)
    .where(and(inArray(readings.sheetId, sheets.map(({ id }) => id)), isNotNull(readings.foundValue))).orderBy(asc(readings.position))
  const byId = group(rows, ({ sheetId }) => sheetId)
  return sheets.map(({ id, ...sheet }) => ({ ...sheet, readings: (byId.get(id) ?? []).flatMap(toEarlier) })).filter(sheet => sheet.readings.length > 0)
}

function toEarlier({ foundValue, leftValue, ...row }: CheckpointFields & { foundValue: number | null, leftValue: number | null }): EarlierReading[] {
  const value = leftValue ?? foundValue
  if (value === null) return []
  const { section, bandLabel, label, atHz, nominal, limit, ...rest } = toCheckpoint(row)
  const limits = limit === null ? null : boundsOf(limit, { ...rest, nominal })
  return [{ section, bandLabel, label, atHz, nominal, value, within: limits?.ok ? isWithin(value, limits.bounds) : null }]
}

/** The 404 for a sheet that is not there. */
export const noSuchSheet = (tag: string, number: number) => notFound(`Unit ${formatTag(tag)} has no test sheet ${number}.`, 'no-such-sheet')
