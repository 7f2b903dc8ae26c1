import { and, asc, desc, eq, inArray, isNotNull, lt } from 'drizzle-orm'
import { instruments, models, people, readings, sheetChecks, testSheetInstruments, testSheets } from '../../drizzle/schema'
import { judgeDial } from '../../shared/domain/dial-check'
import { staleReason } from '../../shared/domain/staleness'
import type { WorkFact } from '../../shared/domain/staleness'
import { formatTag } from '../../shared/domain/tag'
import type { EarlierSheet, ReadingView, TestSheetSummary, TestSheetView } from '../../shared/types/bench'
import type { Database } from '../utils/db'
import { notFound } from '../utils/errors'
import type { InstrumentRow } from './instruments'
import { instrumentInWords, toInstrumentView } from './instruments'
import { findPowerDecision } from './power'
import { findSafetyCheckOfSheet } from './safety-checks'
import type { UnitRow } from './unit-lock'
import { getUnitRow } from './unit-lock'
import { listWorkFacts } from './work-facts'

export type SheetRow = typeof testSheets.$inferSelect
type ReadingRow = typeof readings.$inferSelect
type CheckRow = typeof sheetChecks.$inferSelect

/** A reading with its error and verdict, computed afresh by the same rule as in the browser. */
function toReadingView(row: ReadingRow): ReadingView {
  const verdict = row.readingHz === null ? null : judgeDial(row.settingHz, row.readingHz, row.tolerancePercent)
  return {
    position: row.position,
    bandLabel: row.bandLabel,
    settingHz: row.settingHz,
    tolerancePercent: row.tolerancePercent,
    readingText: row.readingText,
    readingHz: row.readingHz,
    errorPercent: verdict?.errorPercent ?? null,
    within: verdict?.within ?? null,
    instrumentId: row.instrumentId,
    note: row.note,
  }
}

interface SheetParts { sheet: SheetRow, testedBy: string, readings: ReadingRow[], checks: CheckRow[], instruments: InstrumentRow[] }

function toSummary({ sheet, testedBy, ...parts }: SheetParts, workLog: readonly WorkFact[]): TestSheetSummary {
  const views = parts.readings.map(toReadingView)
  return {
    number: sheet.number,
    testedOn: sheet.testedOn,
    testedBy,
    signedAt: sheet.signedAt?.toISOString() ?? null,
    staleBecause: staleReason(sheet.signedAt?.toISOString() ?? null, workLog)?.sentence ?? null,
    readCount: views.filter(view => view.within !== null).length,
    withinCount: views.filter(view => view.within === true).length,
    outsideCount: views.filter(view => view.within === false).length,
    checksFailed: parts.checks.filter(check => check.result === 'fail').length,
    instruments: parts.instruments.map(row => instrumentInWords(row, sheet.testedOn)),
  }
}

/** Everything that hangs on some sheets, in four questions to the database however many there are. */
async function gatherParts(db: Database, rows: { sheet: SheetRow, testedBy: string }[]): Promise<SheetParts[]> {
  const ids = rows.map(({ sheet }) => sheet.id)
  if (ids.length === 0) return []
  const points = await db.select().from(readings).where(inArray(readings.sheetId, ids)).orderBy(asc(readings.position))
  const checks = await db.select().from(sheetChecks).where(inArray(sheetChecks.sheetId, ids)).orderBy(asc(sheetChecks.position))
  const used = await db.select({ sheetId: testSheetInstruments.sheetId, instrument: instruments }).from(testSheetInstruments)
    .innerJoin(instruments, eq(instruments.id, testSheetInstruments.instrumentId))
    .where(inArray(testSheetInstruments.sheetId, ids)).orderBy(asc(instruments.tag))
  return rows.map(({ sheet, testedBy }) => ({
    sheet,
    testedBy,
    readings: points.filter(point => point.sheetId === sheet.id),
    checks: checks.filter(check => check.sheetId === sheet.id),
    instruments: used.filter(({ sheetId }) => sheetId === sheet.id).map(({ instrument }) => instrument),
  }))
}

const selectSheets = (db: Database) => db.select({ sheet: testSheets, testedBy: people.name }).from(testSheets)
  .innerJoin(people, eq(people.id, testSheets.testedBy))

/** A unit's sheets (by its row's id), the newest first. */
export async function listTestSheets(db: Database, unitId: string): Promise<TestSheetSummary[]> {
  const rows = await selectSheets(db).where(eq(testSheets.unitId, unitId)).orderBy(desc(testSheets.number))
  if (rows.length === 0) return []
  const workLog = await listWorkFacts(db, unitId)
  return (await gatherParts(db, rows)).map(parts => toSummary(parts, workLog))
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
  return {
    ...toSummary(parts, await listWorkFacts(db, unit.id)),
    unitTag: unit.tag,
    unitName: model ? `${model.maker} ${model.designation}` : '',
    hazardHold: unit.hazardHold,
    powerRefusal: power.allowed ? null : power.sentence,
    warmUpMinutes: sheet.warmUpMinutes,
    supply: sheet.supply,
    ambientCelsius: sheet.ambientCelsius,
    note: sheet.note,
    instrumentList: parts.instruments.map(row => toInstrumentView(row, sheet.testedOn)),
    readings: parts.readings.map(toReadingView),
    checks: parts.checks.map(({ name, result, note }) => ({ name, result, note })),
    safety: await findSafetyCheckOfSheet(db, unit.id, sheet.id),
    earlier: await findEarlier(db, unit.id, sheet.number),
    version: sheet.version,
  }
}

/** The newest signed sheet before this one on which the dial was read. */
async function findEarlier(db: Database, unitId: string, number: number): Promise<EarlierSheet | null> {
  const [row] = await db.selectDistinct({ id: testSheets.id, number: testSheets.number, testedOn: testSheets.testedOn }).from(testSheets)
    .innerJoin(readings, and(eq(readings.sheetId, testSheets.id), isNotNull(readings.readingHz)))
    .where(and(eq(testSheets.unitId, unitId), lt(testSheets.number, number), isNotNull(testSheets.signedAt)))
    .orderBy(desc(testSheets.number)).limit(1)
  if (!row) return null
  const points = await db.select().from(readings).where(eq(readings.sheetId, row.id)).orderBy(asc(readings.position))
  return { number: row.number, testedOn: row.testedOn, readings: points.map(toReadingView) }
}

/** The 404 for a sheet that is not there. */
export const noSuchSheet = (tag: string, number: number) => notFound(`Unit ${formatTag(tag)} has no test sheet ${number}.`, 'no-such-sheet')
