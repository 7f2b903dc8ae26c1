import { and, asc, eq, isNull, max, ne, sql } from 'drizzle-orm'
import { bands, models, readings, sheetChecks, testSheetInstruments, testSheets } from '../../drizzle/schema'
import { modelCheckpoints, readDial } from '../../shared/domain/dial-reading'
import { formatFrequency } from '../../shared/domain/frequency'
import { COLD_CHECKS, SUGGESTED_CHECKS } from '../../shared/domain/sheet-checks'
import type { NewTestSheet, ReopenedTestSheet, SavedTestSheet } from '../../shared/schemas/test-sheet'
import type { TestSheetView } from '../../shared/types/bench'
import type { FieldError } from '../../shared/types/problem'
import type { Database } from '../utils/db'
import { conflict, invalid, stale } from '../utils/errors'
import { instrumentsForField } from './instruments'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import { requirePower } from './power'
import { refuseClosedToTests } from './safety-checks'
import { todayInShop } from './shop-day'
import type { SheetRow } from './test-sheet-view'
import { noSuchSheet, viewSheet } from './test-sheet-view'
import type { UnitRow } from './unit-lock'
import { lockUnit } from './unit-lock'

export { getTestSheet, listTestSheets, listTestSheetsOf } from './test-sheet-view'

interface SheetAddress { tag: string, number: number }

/**
 * Opens a sheet, numbered within the unit: the dial points of its model and the checks suggested for its kind. A sitting
 * without power has neither dial points nor checks that need it. 409 without a triage that allows power, while another
 * sheet of the unit is open, or once the unit is sold or gone.
 */
export async function startTestSheet(db: Database, actor: Actor, { tag, energised, testedOn }: NewTestSheet & { tag: string }): Promise<TestSheetView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    refuseClosedToTests(unit.state)
    if (energised) await requirePower(tx, unit)
    await refuseSecondOpen(tx, unit, null)
    const day = await dayOfSitting(tx, testedOn)
    const [newest] = await tx.select({ number: max(testSheets.number) }).from(testSheets).where(eq(testSheets.unitId, unit.id))
    const number = (newest?.number ?? 0) + 1
    const [sheet] = await tx.insert(testSheets).values({ unitId: unit.id, number, testedOn: day, testedBy: actor.id }).returning({ id: testSheets.id })
    if (!sheet) throw new Error('The test sheet was not inserted')
    await insertPoints(tx, unit, sheet.id, energised)
    await appendUnitLedger(tx, actor, unit.id, 'sheet_started', { sheetNumber: number })
    return viewSheet(tx, unit, number)
  })
}

/** Limits are copied from the model on the day: a later change of the model does not judge old readings anew. */
async function insertPoints(tx: Database, unit: UnitRow, sheetId: string, energised: boolean): Promise<void> {
  const [model] = await tx.select().from(models).where(eq(models.id, unit.modelId))
  if (!model) throw new Error('The model of a unit is gone, which its foreign key forbids')
  const modelBands = await tx.select().from(bands).where(eq(bands.modelId, unit.modelId)).orderBy(asc(bands.position))
  const points = energised ? modelCheckpoints(modelBands, model.dialTolerancePercent) : []
  if (points.length > 0) await tx.insert(readings).values(points.map((point, index) => ({ sheetId, position: index + 1, ...point })))
  const checks = energised ? SUGGESTED_CHECKS[model.kind] : COLD_CHECKS
  await tx.insert(sheetChecks).values(checks.map((name, index) => ({ sheetId, position: index + 1, name })))
}

async function dayOfSitting(tx: Database, testedOn: string | undefined): Promise<string> {
  const today = await todayInShop(tx)
  if (testedOn !== undefined && testedOn > today) throw invalid([{ path: 'testedOn', message: 'Day of the sitting must be today or in the past' }])
  return testedOn ?? today
}

async function refuseSecondOpen(tx: Database, unit: UnitRow, except: string | null): Promise<void> {
  const [open] = await tx.select({ number: testSheets.number }).from(testSheets)
    .where(and(eq(testSheets.unitId, unit.id), isNull(testSheets.signedAt), except === null ? undefined : ne(testSheets.id, except))).limit(1)
  if (!open) return
  const sentence = `Test sheet ${open.number} of this unit is still open. Carry on with it, or sign it first.`
  throw conflict('sheet-open', sentence, {
    refusals: [{ guard: 'sheet-open', sentence, remedy: `Sign test sheet ${open.number}.`, href: `/units/${unit.tag}/test-sheets/${open.number}` }],
  })
}

/** Lock order: the unit, then the sheet. 409 if the version seen is no longer the current one. */
async function lockSheet(tx: Database, { tag, number }: SheetAddress, version: number): Promise<{ unit: UnitRow, sheet: SheetRow }> {
  const unit = await lockUnit(tx, tag)
  const [sheet] = await tx.select().from(testSheets).where(and(eq(testSheets.unitId, unit.id), eq(testSheets.number, number))).for('update')
  if (!sheet) throw noSuchSheet(tag, number)
  if (sheet.version !== version) throw stale('test sheet', await viewSheet(tx, unit, number))
  refuseClosedToTests(unit.state)
  return { unit, sheet }
}

/**
 * Saves a part of an open sheet. All or nothing: a reading that can't be understood is refused at its own field, and
 * the rest is not written, so that it can be sent again as it stands. What is saved while the sitting lasts is a draft; the story
 * hears of it when the sheet is signed. 409 when stale, signed, or when a new reading would need power that is not allowed.
 */
export async function saveTestSheet(db: Database, _actor: Actor, { tag, number, version, ...input }: SavedTestSheet & SheetAddress): Promise<TestSheetView> {
  return db.transaction(async (tx) => {
    const { unit, sheet } = await lockSheet(tx, { tag, number }, version)
    refuseSigned(sheet)
    await saveReadings(tx, unit, sheet, input.readings ?? [])
    if (input.checks) await saveChecks(tx, sheet.id, input.checks)
    if (input.instrumentIds) await saveInstruments(tx, sheet.id, input.instrumentIds)
    await tx.update(testSheets).set({
      testedOn: input.testedOn === undefined ? sheet.testedOn : await dayOfSitting(tx, input.testedOn),
      warmUpMinutes: input.warmUpMinutes === undefined ? sheet.warmUpMinutes : input.warmUpMinutes,
      supply: input.supply ?? sheet.supply,
      ambientCelsius: input.ambientCelsius === undefined ? sheet.ambientCelsius : input.ambientCelsius,
      note: input.note ?? sheet.note,
      version: sql`${testSheets.version} + 1`,
    }).where(eq(testSheets.id, sheet.id))
    return viewSheet(tx, unit, number)
  })
}

function refuseSigned(sheet: SheetRow): void {
  if (sheet.signedAt) throw conflict('sheet-signed', `Test sheet ${sheet.number} is signed, so its readings stand. Open it again, and say why, to change it.`)
}

type SavedReadings = NonNullable<SavedTestSheet['readings']>

async function saveReadings(tx: Database, unit: UnitRow, sheet: SheetRow, saved: SavedReadings): Promise<void> {
  if (saved.length === 0) return
  const points = await tx.select().from(readings).where(eq(readings.sheetId, sheet.id))
  const errors: FieldError[] = []
  const changes = saved.flatMap(({ position, readingText, note }, index) => {
    const point = points.find(each => each.position === position)
    if (!point) {
      errors.push({ path: `readings.${index}.position`, message: `The sheet has no point ${position}` })
      return []
    }
    const noted = note === undefined ? {} : { note }
    if (readingText === undefined) return [{ point, set: noted, isNew: false }]
    if (readingText === null || readingText === '') return [{ point, set: { ...noted, readingText: null, readingHz: null }, isNew: false }]
    const read = readDial(readingText, point)
    if (!read.ok) {
      errors.push({ path: `readings.${index}.readingText`, message: read.sentence })
      return []
    }
    return [{ point, set: { ...noted, readingText, readingHz: read.hz }, isNew: point.readingText !== readingText }]
  })
  if (errors.length > 0) throw invalid(errors)
  if (changes.some(change => change.isNew)) await requirePower(tx, unit)
  for (const { point, set } of changes) {
    if (Object.keys(set).length > 0) await tx.update(readings).set(set).where(eq(readings.id, point.id))
  }
}

async function saveChecks(tx: Database, sheetId: string, checks: NonNullable<SavedTestSheet['checks']>): Promise<void> {
  await tx.delete(sheetChecks).where(eq(sheetChecks.sheetId, sheetId))
  if (checks.length > 0) await tx.insert(sheetChecks).values(checks.map((check, index) => ({ sheetId, position: index + 1, ...check })))
}

async function saveInstruments(tx: Database, sheetId: string, ids: readonly string[]): Promise<void> {
  const named = await tx.select({ id: testSheetInstruments.instrumentId }).from(testSheetInstruments).where(eq(testSheetInstruments.sheetId, sheetId))
  const rows = await instrumentsForField(tx, ids, 'instrumentIds', named.map(({ id }) => id))
  await tx.delete(testSheetInstruments).where(eq(testSheetInstruments.sheetId, sheetId))
  if (rows.length > 0) await tx.insert(testSheetInstruments).values(rows.map(({ id }) => ({ sheetId, instrumentId: id })))
}

/** Ends the sitting: the readings stand. 422 if nothing was read or checked, or if no instrument is named for what was read. */
export async function signTestSheet(db: Database, actor: Actor, { tag, number, version }: SheetAddress & { version: number }): Promise<TestSheetView> {
  return db.transaction(async (tx) => {
    const { unit, sheet } = await lockSheet(tx, { tag, number }, version)
    refuseSigned(sheet)
    const before = await viewSheet(tx, unit, number)
    refuseEmpty(before)
    await tx.update(testSheets).set({ signedAt: sql`clock_timestamp()`, version: sql`${testSheets.version} + 1` }).where(eq(testSheets.id, sheet.id))
    await appendUnitLedger(tx, actor, unit.id, 'sheet_signed', {
      sheetNumber: number, verdict: sheetVerdict(before), within: before.withinCount, outside: before.outsideCount,
    })
    return viewSheet(tx, unit, number)
  })
}

function refuseEmpty(sheet: TestSheetView): void {
  const isChecked = sheet.checks.some(check => check.result === 'pass' || check.result === 'fail')
  if (sheet.readCount === 0 && !isChecked && sheet.safety === null) {
    throw invalid([{ path: 'readings', message: 'Nothing has been read or checked yet, so there is nothing to sign' }])
  }
  if (sheet.readCount > 0 && sheet.instrumentList.length === 0) {
    throw invalid([{ path: 'instrumentIds', message: 'Choose the instrument that took the readings: a reading without one shows nothing' }])
  }
}

/** The sheet's outcome in words, for the story. */
function sheetVerdict({ readings: points, withinCount, outsideCount, checks, checksFailed }: TestSheetView): string {
  const unread = points.length - withinCount - outsideCount
  const dial = points.length === 0 ? [] : [outsideCount === 0 ? 'no dial point out' : `${outsideCount} of ${points.length} dial points out`]
  const left = unread === 0 ? [] : [`${unread} not read`]
  const passed = checks.filter(check => check.result === 'pass').length
  return [...dial, ...left, `${passed} ${passed === 1 ? 'check' : 'checks'} passed, ${checksFailed} failed`].join(', ')
}

/** Opens a signed sheet again and says why; the story keeps every reading as it stood. */
export async function reopenTestSheet(db: Database, actor: Actor, { tag, number, version, why }: ReopenedTestSheet & SheetAddress): Promise<TestSheetView> {
  return db.transaction(async (tx) => {
    const { unit, sheet } = await lockSheet(tx, { tag, number }, version)
    if (!sheet.signedAt) throw conflict('sheet-open', `Test sheet ${number} is open already.`)
    await refuseSecondOpen(tx, unit, sheet.id)
    const before = await viewSheet(tx, unit, number)
    await tx.update(testSheets).set({ signedAt: null, version: sql`${testSheets.version} + 1` }).where(eq(testSheets.id, sheet.id))
    await appendUnitLedger(tx, actor, unit.id, 'sheet_reopened', {
      sheetNumber: number, why, said: before.readings.flatMap(point => point.readingText === null ? [] : [`${point.bandLabel} ${formatFrequency(point.settingHz)}: ${point.readingText}`]),
    })
    return viewSheet(tx, unit, number)
  })
}
