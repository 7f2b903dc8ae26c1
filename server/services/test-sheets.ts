import { and, asc, eq, isNull, max, ne, sql } from 'drizzle-orm'
import { bands, driftReadings, models, readings, sheetChecks, shop, testSheetInstruments, testSheets } from '../../drizzle/schema'
import type { Checkpoint } from '../../shared/domain/checkpoint'
import { checkpointInWords } from '../../shared/domain/checkpoint'
import { DEFAULT_RULE } from '../../shared/domain/decision'
import { modelCheckpoints } from '../../shared/domain/dial-check'
import type { EquipmentKind } from '../../shared/domain/equipment-kinds'
import { COLD_CHECKS, SUGGESTED_CHECKS } from '../../shared/domain/sheet-checks'
import { outsideCount, tallyInWords, withinCount } from '../../shared/domain/sheet-tally'
import { readTaken } from '../../shared/domain/taken'
import type { NewTestSheet, ReopenedTestSheet, SavedTestSheet } from '../../shared/schemas/test-sheet'
import type { ReadingView, TestSheetView } from '../../shared/types/bench'
import type { FieldError } from '../../shared/types/problem'
import type { Database } from '../utils/db'
import { conflict, invalid, stale } from '../utils/errors'
import { instrumentsForField } from './instruments'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import { requirePower } from './power'
import { findCurrentProcedure } from './procedures'
import { refuseClosedToTests } from './safety-checks'
import type { ReadingRow } from './sheet-results'
import { fromCheckpoint, toCheckpoint } from './sheet-results'
import { todayInShop } from './shop-day'
import type { SheetRow } from './test-sheet-view'
import { noSuchSheet, viewSheet } from './test-sheet-view'
import type { UnitRow } from './unit-lock'
import { lockUnit } from './unit-lock'

export { getTestSheet, listTestSheets, listTestSheetsOf } from './test-sheet-view'

interface SheetAddress { tag: string, number: number }

/**
 * Opens a sheet, numbered within the unit: the checkpoints of its model's procedure (or the dial as its bands give it) and
 * the checks suggested for its kind. A sitting without power has neither readings nor checks that need it. 409 without a triage that allows power, while another
 * sheet of the unit is open, or once the unit is sold or gone.
 */
export async function startTestSheet(db: Database, actor: Actor, { tag, energised, testedOn, checkpoints = 'procedure' }: Omit<NewTestSheet, 'checkpoints'> & Partial<NewTestSheet> & { tag: string }): Promise<TestSheetView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    refuseClosedToTests(unit.state)
    if (energised) await requirePower(tx, unit)
    await refuseSecondOpen(tx, unit, null)
    const day = await dayOfSitting(tx, testedOn)
    const [newest] = await tx.select({ number: max(testSheets.number) }).from(testSheets).where(eq(testSheets.unitId, unit.id))
    const number = (newest?.number ?? 0) + 1
    const plan = await planOf(tx, unit, { energised, checkpoints })
    const [sheet] = await tx.insert(testSheets).values({ unitId: unit.id, number, testedOn: day, testedBy: actor.id, ...plan.start }).returning({ id: testSheets.id })
    if (!sheet) throw new Error('The test sheet was not inserted')
    await insertPoints(tx, sheet.id, plan.kind, plan.points, energised)
    await appendUnitLedger(tx, actor, unit.id, 'sheet_started', { sheetNumber: number })
    return viewSheet(tx, unit, number)
  })
}

/** Limits are copied on the day: a later change of the model or its procedure does not judge old readings anew. */
async function insertPoints(tx: Database, sheetId: string, kind: EquipmentKind, points: readonly Checkpoint[], energised: boolean): Promise<void> {
  if (points.length > 0) await tx.insert(readings).values(points.map((point, index) => ({ sheetId, position: index + 1, ...fromCheckpoint(point) })))
  const checks = energised ? SUGGESTED_CHECKS[kind] : COLD_CHECKS
  await tx.insert(sheetChecks).values(checks.map((name, index) => ({ sheetId, position: index + 1, name })))
}

/** What a sitting starts from: the model's procedure as it stands today, or the dial as its bands give it. */
async function planOf(tx: Database, unit: UnitRow, { energised, checkpoints }: Pick<NewTestSheet, 'energised' | 'checkpoints'>): Promise<SheetPlan> {
  const [model] = await tx.select().from(models).where(eq(models.id, unit.modelId))
  if (!model) throw new Error('The model of a unit is gone, which its foreign key forbids')
  const procedure = checkpoints === 'procedure' && energised ? await findCurrentProcedure(tx, unit.modelId) : null
  if (procedure) {
    const { id, warmUpMinutes, supply, decisionRule: rule } = procedure
    return { kind: model.kind, points: procedure.checkpoints, start: { procedureVersionId: id, warmUpMinutes, supply, decisionRule: rule.rule, guardFactor: rule.factor } }
  }
  const modelBands = await tx.select().from(bands).where(eq(bands.modelId, unit.modelId)).orderBy(asc(bands.position))
  return { kind: model.kind, points: energised ? modelCheckpoints(modelBands, model.dialTolerancePercent) : [], start: await shopRule(tx) }
}

interface SheetPlan { kind: EquipmentKind, points: Checkpoint[], start: Partial<typeof testSheets.$inferInsert> }

async function shopRule(tx: Database): Promise<Pick<SheetRow, 'decisionRule' | 'guardFactor'>> {
  const [settings] = await tx.select({ decisionRule: shop.decisionRule, guardFactor: shop.guardFactor }).from(shop)
  return settings ?? { decisionRule: DEFAULT_RULE.rule, guardFactor: DEFAULT_RULE.factor }
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
    if (input.drift) await saveDrift(tx, unit, sheet.id, input.drift)
    await tx.update(testSheets).set({
      testedOn: input.testedOn === undefined ? sheet.testedOn : await dayOfSitting(tx, input.testedOn),
      warmUpMinutes: input.warmUpMinutes === undefined ? sheet.warmUpMinutes : input.warmUpMinutes,
      supply: input.supply ?? sheet.supply,
      ambientCelsius: input.ambientCelsius === undefined ? sheet.ambientCelsius : input.ambientCelsius,
      note: input.note ?? sheet.note,
      deviations: input.deviations ?? sheet.deviations,
      decisionRule: input.decisionRule ?? sheet.decisionRule,
      guardFactor: input.guardFactor ?? sheet.guardFactor,
      driftLabel: input.drift?.label ?? sheet.driftLabel,
      driftQuantity: input.drift?.quantity ?? sheet.driftQuantity,
      version: sql`${testSheets.version} + 1`,
    }).where(eq(testSheets.id, sheet.id))
    return viewSheet(tx, unit, number)
  })
}

function refuseSigned(sheet: SheetRow): void {
  if (sheet.signedAt) throw conflict('sheet-signed', `Test sheet ${sheet.number} is signed, so its readings stand. Open it again, and say why, to change it.`)
}

type SavedReadings = NonNullable<SavedTestSheet['readings']>
type SavedReading = SavedReadings[number]

/** What a text saved for one side of a reading means: nothing said, taken back, or a value. */
function sideOf(typed: string | null | undefined, row: ReadingRow): { text: string | null, value: number | null } | string | undefined {
  if (typed === undefined) return undefined
  if (typed === null || typed === '') return { text: null, value: null }
  const taken = readTaken(typed, toCheckpoint(row))
  return taken.ok ? { text: typed, value: taken.value } : taken.sentence
}

function changeOf(row: ReadingRow, { found, left, instrumentId, note }: SavedReading, index: number): { set: Partial<ReadingRow>, errors: FieldError[], isNew: boolean } {
  const [foundSide, leftSide] = [sideOf(found, row), sideOf(left, row)]
  const errors = ([['found', foundSide], ['left', leftSide]] as const).flatMap(([part, side]) =>
    typeof side === 'string' ? [{ path: `readings.${index}.${part}`, message: side }] : [])
  const set: Partial<ReadingRow> = {
    ...typeof foundSide === 'object' ? { foundText: foundSide.text, foundValue: foundSide.value } : {},
    ...typeof leftSide === 'object' ? { leftText: leftSide.text, leftValue: leftSide.value } : {},
    ...instrumentId === undefined ? {} : { instrumentId },
    ...note === undefined ? {} : { note },
  }
  const isNew = [[set.foundText, row.foundText], [set.leftText, row.leftText]].some(([now, before]) => Boolean(now) && now !== before)
  return { set, errors, isNew }
}

async function saveReadings(tx: Database, unit: UnitRow, sheet: SheetRow, saved: SavedReadings): Promise<void> {
  if (saved.length === 0) return
  const rows = await tx.select().from(readings).where(eq(readings.sheetId, sheet.id))
  const byPosition = new Map(rows.map(row => [row.position, row]))
  const changes = saved.map((reading, index) => {
    const row = byPosition.get(reading.position)
    return row
      ? { id: row.id, ...changeOf(row, reading, index) }
      : { id: '', set: {}, errors: [{ path: `readings.${index}.position`, message: `The sheet has no point ${reading.position}` }], isNew: false }
  })
  const errors = changes.flatMap(change => change.errors)
  if (errors.length > 0) throw invalid(errors)
  await instrumentsForField(tx, changes.flatMap(({ set }) => set.instrumentId ?? []), 'readings', rows.flatMap(({ instrumentId }) => instrumentId ?? []))
  if (changes.some(change => change.isNew)) await requirePower(tx, unit)
  for (const { id, set } of changes) {
    if (Object.keys(set).length > 0) await tx.update(readings).set(set).where(eq(readings.id, id))
  }
}

type SavedDrift = NonNullable<SavedTestSheet['drift']>

async function saveDrift(tx: Database, unit: UnitRow, sheetId: string, { quantity, readings: rows }: SavedDrift): Promise<void> {
  const read = rows.map(({ text }) => readTaken(text, { section: 'other', quantity, nominal: null, atHz: null }))
  const errors = read.flatMap((taken, index) => taken.ok ? [] : [{ path: `drift.readings.${index}.text`, message: taken.sentence }])
  if (errors.length > 0) throw invalid(errors)
  if (rows.length > 0) await requirePower(tx, unit)
  await tx.delete(driftReadings).where(eq(driftReadings.sheetId, sheetId))
  const values = rows.flatMap(({ minutes, text }, index) => {
    const taken = read[index]
    return taken?.ok ? [{ sheetId, position: index + 1, minutes, readingText: text, readingValue: taken.value }] : []
  })
  if (values.length > 0) await tx.insert(driftReadings).values(values)
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
    await freezeResults(tx, before)
    await tx.update(testSheets).set({ signedAt: sql`clock_timestamp()`, signedBy: actor.id, version: sql`${testSheets.version} + 1` }).where(eq(testSheets.id, sheet.id))
    await appendUnitLedger(tx, actor, unit.id, 'sheet_signed', {
      sheetNumber: number, verdict: sheetVerdict(before), within: withinCount(before.tally), outside: outsideCount(before.tally),
    })
    return viewSheet(tx, unit, number)
  })
}

/** What was computed at the signature stands, whatever is said of an instrument later; and each reading keeps who took it. */
async function freezeResults(tx: Database, sheet: TestSheetView): Promise<void> {
  for (const reading of sheet.readings) {
    const results = { found: reading.found?.result ?? null, left: reading.left?.result ?? null }
    const instrumentId = (results.left ?? results.found)?.instrumentId ?? reading.instrumentId
    await tx.update(readings).set({ signedResults: results, instrumentId }).where(eq(readings.id, reading.id))
  }
}

function refuseEmpty(sheet: TestSheetView): void {
  const isChecked = sheet.checks.some(check => check.result === 'pass' || check.result === 'fail')
  if (sheet.tally.read === 0 && !isChecked && sheet.safety === null) {
    throw invalid([{ path: 'readings', message: 'Nothing has been read or checked yet, so there is nothing to sign' }])
  }
  if (sheet.tally.read > 0 && sheet.instrumentList.length === 0) {
    throw invalid([{ path: 'instrumentIds', message: 'Choose the instrument that took the readings: a reading without one shows nothing' }])
  }
}

/** The sheet's outcome in words, for the story. */
function sheetVerdict({ tally, checks, checksFailed }: TestSheetView): string {
  const passed = checks.filter(check => check.result === 'pass').length
  return [tallyInWords(tally), `${passed} ${passed === 1 ? 'check' : 'checks'} passed, ${checksFailed} failed`].filter(Boolean).join(', ')
}

/** Opens a signed sheet again and says why; the story keeps every reading as it stood. */
export async function reopenTestSheet(db: Database, actor: Actor, { tag, number, version, why }: ReopenedTestSheet & SheetAddress): Promise<TestSheetView> {
  return db.transaction(async (tx) => {
    const { unit, sheet } = await lockSheet(tx, { tag, number }, version)
    if (!sheet.signedAt) throw conflict('sheet-open', `Test sheet ${number} is open already.`)
    await refuseSecondOpen(tx, unit, sheet.id)
    const before = await viewSheet(tx, unit, number)
    await tx.update(readings).set({ signedResults: null }).where(eq(readings.sheetId, sheet.id))
    await tx.update(testSheets).set({ signedAt: null, signedBy: null, version: sql`${testSheets.version} + 1` }).where(eq(testSheets.id, sheet.id))
    await appendUnitLedger(tx, actor, unit.id, 'sheet_reopened', {
      sheetNumber: number, why, said: before.readings.flatMap(saidOf),
    })
    return viewSheet(tx, unit, number)
  })
}

/** A reading as it stood, for the story: "A 320 kHz: found 318.2 kc, left 320.1 kc". */
function saidOf({ found, left, ...point }: ReadingView): string[] {
  if (!found && !left) return []
  const read = left ? [found ? `found ${found.text}` : '', `left ${left.text}`].filter(Boolean).join(', ') : found?.text ?? ''
  return [`${[point.bandLabel, checkpointInWords(point)].filter(Boolean).join(' ')}: ${read}`]
}
