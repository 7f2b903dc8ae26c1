import { sql } from 'drizzle-orm'
import { bigint, boolean, check, date, index, integer, jsonb, numeric, pgEnum, pgTable, primaryKey, smallint, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import type { Result } from '../../shared/domain/evaluation'
import type { Limit } from '../../shared/domain/limits'
import { CHECK_RESULTS } from '../../shared/domain/sheet-checks'
import { FITTING_CONDITIONS, SAFETY_CLASSES, TRIAGE_VERDICTS } from '../../shared/domain/triage'
import { instant, timestamps, version } from './columns'
import { decisionRule, quantity, section } from './measuring'
import { hazard, models } from './models'
import { people } from './people'
import { units } from './units'

export const safetyClass = pgEnum('safety_class', SAFETY_CLASSES)
export const fittingCondition = pgEnum('fitting_condition', FITTING_CONDITIONS)
export const triageVerdict = pgEnum('triage_verdict', TRIAGE_VERDICTS)
export const checkResult = pgEnum('check_result', CHECK_RESULTS)

/** A measured amount: exact as typed, in the base unit of its quantity. */
const measured = () => numeric({ mode: 'number' })

/** What is read, between which limits: the same columns in a procedure and, copied on the day, on a sheet. */
const checkpointColumns = () => ({
  position: smallint().notNull(),
  section: section().notNull(),
  bandLabel: text().notNull().default(''),
  label: text().notNull().default(''),
  quantity: quantity().notNull(),
  atHz: bigint({ mode: 'number' }),
  nominal: measured(),
  span: measured(),
  limitSpec: jsonb().$type<Limit>(),
})

/** A safety look before power. Never edited: a second look is a second row, and the newest counts. */
export const triages = pgTable('triages', {
  id: uuid().primaryKey().defaultRandom(),
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  safetyClass: safetyClass().notNull(),
  lead: fittingCondition().notNull(),
  plug: fittingCondition().notNull(),
  fuse: fittingCondition().notNull(),
  fuseRating: text().notNull().default(''),
  voltageSetting: text().notNull().default(''),
  hazards: hazard().array().notNull().default(sql`'{}'`),
  note: text().notNull().default(''),
  verdict: triageVerdict().notNull(),
  doneBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  createdAt: instant().notNull().defaultNow(),
}, t => [index('triages_unit_idx').on(t.unitId, t.createdAt)])

/** The shop's own measuring instruments. */
export const instruments = pgTable('instruments', {
  id: uuid().primaryKey().defaultRandom(),
  tag: text().notNull(),
  name: text().notNull(),
  serial: text().notNull().default(''),
  /** What it measures and how well, in words. What is computed with stands in `instrument_capabilities`. */
  accuracy: text().notNull().default(''),
  retiredAt: instant(),
  version: version(),
  ...timestamps,
}, t => [
  uniqueIndex('instruments_tag_key').on(t.tag),
  check('instruments_tag_form', sql`${t.tag} ~ '^B[0-9]{5,}[0-9A-Z]$'`),
])

/** One version of a model's procedure. Never edited: a change is the next version, and an old sheet keeps the one it was made with. */
export const procedureVersions = pgTable('procedure_versions', {
  id: uuid().primaryKey().defaultRandom(),
  modelId: uuid().notNull().references(() => models.id, { onDelete: 'restrict' }),
  number: integer().notNull(),
  /** What the limits are taken from: "handbook, table 5". */
  origin: text().notNull().default(''),
  /** What changed since the version before. */
  why: text().notNull().default(''),
  warmUpMinutes: integer(),
  supply: text().notNull().default(''),
  decisionRule: decisionRule().notNull(),
  guardFactor: numeric({ precision: 4, scale: 2, mode: 'number' }).notNull(),
  madeBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  createdAt: instant().notNull().defaultNow(),
}, t => [
  uniqueIndex('procedure_versions_number_key').on(t.modelId, t.number),
  check('procedure_versions_guard_factor', sql`${t.guardFactor} between 0 and 3`),
])

export const procedureCheckpoints = pgTable('procedure_checkpoints', {
  id: uuid().primaryKey().defaultRandom(),
  versionId: uuid().notNull().references(() => procedureVersions.id, { onDelete: 'restrict' }),
  ...checkpointColumns(),
}, t => [uniqueIndex('procedure_checkpoints_position_key').on(t.versionId, t.position)])

/** One sitting of measurements on one unit. */
export const testSheets = pgTable('test_sheets', {
  id: uuid().primaryKey().defaultRandom(),
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  /** 1, 2, 3… within the unit. */
  number: integer().notNull(),
  testedOn: date({ mode: 'string' }).notNull(),
  warmUpMinutes: integer(),
  /** "240 V 50 Hz through isolating transformer". */
  supply: text().notNull().default(''),
  ambientCelsius: numeric({ precision: 5, scale: 1, mode: 'number' }),
  note: text().notNull().default(''),
  /** Null: made from the bands of the model, without a procedure. */
  procedureVersionId: uuid().references(() => procedureVersions.id, { onDelete: 'restrict' }),
  /** What was added to, left out of or done otherwise than in the procedure. */
  deviations: text().notNull().default(''),
  decisionRule: decisionRule().notNull().default('simple'),
  /** r in the guard band w = r·U. */
  guardFactor: numeric({ precision: 4, scale: 2, mode: 'number' }).notNull().default(1),
  /** What is watched while it warms up: "320 kc/s on band A". */
  driftLabel: text().notNull().default(''),
  driftQuantity: quantity().notNull().default('frequency'),
  testedBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  /** Signed: the sitting is over, its readings stand. */
  signedAt: instant(),
  signedBy: uuid().references(() => people.id, { onDelete: 'restrict' }),
  version: version(),
  ...timestamps,
}, t => [
  uniqueIndex('test_sheets_number_key').on(t.unitId, t.number),
  check('test_sheets_warm_up', sql`${t.warmUpMinutes} is null or ${t.warmUpMinutes} between 0 and 100000`),
  check('test_sheets_guard_factor', sql`${t.guardFactor} between 0 and 3`),
])

export const testSheetInstruments = pgTable('test_sheet_instruments', {
  sheetId: uuid().notNull().references(() => testSheets.id, { onDelete: 'restrict' }),
  instrumentId: uuid().notNull().references(() => instruments.id, { onDelete: 'restrict' }),
}, t => [
  primaryKey({ name: 'test_sheet_instruments_pkey', columns: [t.sheetId, t.instrumentId] }),
  index('test_sheet_instruments_instrument_idx').on(t.instrumentId),
])

/** Both as they were when the sheet was signed: what an instrument is said to be worth may change, the report may not. */
export interface SignedResults { found: Result | null, left: Result | null }

/** A checkpoint of a sheet, its limit copied on the day, and what was read: as found before touching, as left after. */
export const readings = pgTable('readings', {
  id: uuid().primaryKey().defaultRandom(),
  sheetId: uuid().notNull().references(() => testSheets.id, { onDelete: 'restrict' }),
  ...checkpointColumns(),
  /** As it was typed, "98.2 kc", and as understood, in the base unit; both null while not read. */
  foundText: text(),
  foundValue: measured(),
  /** Null where nothing was adjusted. */
  leftText: text(),
  leftValue: measured(),
  /** The instrument named for this reading; null while the sheet is open: the best of the sheet's instruments. */
  instrumentId: uuid().references(() => instruments.id, { onDelete: 'restrict' }),
  /** Set by the signature. */
  signedResults: jsonb().$type<SignedResults>(),
  note: text().notNull().default(''),
}, t => [
  uniqueIndex('readings_position_key').on(t.sheetId, t.position),
  index('readings_instrument_idx').on(t.instrumentId),
  check('readings_found_and_understood', sql`(${t.foundText} is null) = (${t.foundValue} is null)`),
  check('readings_left_and_understood', sql`(${t.leftText} is null) = (${t.leftValue} is null)`),
])

/** A value watched while a piece warms up. */
export const driftReadings = pgTable('drift_readings', {
  id: uuid().primaryKey().defaultRandom(),
  sheetId: uuid().notNull().references(() => testSheets.id, { onDelete: 'restrict' }),
  position: smallint().notNull(),
  /** Minutes since power was put on. */
  minutes: numeric({ precision: 9, scale: 2, mode: 'number' }).notNull(),
  readingText: text().notNull(),
  readingValue: measured().notNull(),
}, t => [
  uniqueIndex('drift_readings_position_key').on(t.sheetId, t.position),
  check('drift_readings_minutes', sql`${t.minutes} >= 0`),
])

/** A check that is answered rather than measured: "attenuator works". */
export const sheetChecks = pgTable('sheet_checks', {
  id: uuid().primaryKey().defaultRandom(),
  sheetId: uuid().notNull().references(() => testSheets.id, { onDelete: 'restrict' }),
  position: smallint().notNull(),
  name: text().notNull(),
  result: checkResult().notNull().default('not_done'),
  note: text().notNull().default(''),
}, t => [uniqueIndex('sheet_checks_position_key').on(t.sheetId, t.position)])

/** An electrical safety check. Says what was checked and against which limit, never that the piece is safe. */
export const safetyChecks = pgTable('safety_checks', {
  id: uuid().primaryKey().defaultRandom(),
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  sheetId: uuid().references(() => testSheets.id, { onDelete: 'restrict' }),
  safetyClass: safetyClass().notNull(),
  /** Null: not measured. */
  earthBondMilliohm: integer(),
  insulationKilohm: integer(),
  insulationTestVolts: integer(),
  leakageMicroamp: integer(),
  leadAndPlug: checkResult().notNull(),
  fuse: checkResult().notNull(),
  polarity: checkResult().notNull(),
  visual: checkResult().notNull(),
  /** The fuse that is fitted: "T 500 mA". */
  fuseRating: text().notNull().default(''),
  /** The reservoir capacitor and its bleeder, for the time it takes to fall; null: not looked at. */
  reservoirMicrofarad: numeric({ precision: 12, scale: 4, mode: 'number' }),
  bleederKilohm: numeric({ precision: 12, scale: 4, mode: 'number' }),
  reservoirVolts: integer(),
  /** The limits in force on the day and where they came from. */
  earthBondLimitMilliohm: integer().notNull(),
  insulationLimitKilohm: integer().notNull(),
  leakageLimitMicroamp: integer().notNull(),
  limitsOrigin: text().notNull(),
  passed: boolean().notNull(),
  note: text().notNull().default(''),
  instrumentId: uuid().references(() => instruments.id, { onDelete: 'restrict' }),
  doneBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  createdAt: instant().notNull().defaultNow(),
}, t => [
  index('safety_checks_unit_idx').on(t.unitId, t.createdAt),
  check('safety_checks_not_negative', sql`coalesce(${t.earthBondMilliohm}, 0) >= 0 and coalesce(${t.insulationKilohm}, 0) >= 0 and coalesce(${t.leakageMicroamp}, 0) >= 0`),
])
