import { sql } from 'drizzle-orm'
import { bigint, boolean, check, date, index, integer, numeric, pgEnum, pgTable, primaryKey, smallint, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { CHECK_RESULTS } from '../../shared/domain/sheet-checks'
import { FITTING_CONDITIONS, SAFETY_CLASSES, TRIAGE_VERDICTS } from '../../shared/domain/triage'
import { instant, timestamps, version } from './columns'
import { hazard } from './models'
import { people } from './people'
import { units } from './units'

export const safetyClass = pgEnum('safety_class', SAFETY_CLASSES)
export const fittingCondition = pgEnum('fitting_condition', FITTING_CONDITIONS)
export const triageVerdict = pgEnum('triage_verdict', TRIAGE_VERDICTS)
export const checkResult = pgEnum('check_result', CHECK_RESULTS)

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
  /** What it measures and how well, as its maker states it. */
  accuracy: text().notNull().default(''),
  calibratedOn: date({ mode: 'string' }),
  calibrationDue: date({ mode: 'string' }),
  calibrationNote: text().notNull().default(''),
  retiredAt: instant(),
  version: version(),
  ...timestamps,
}, t => [
  uniqueIndex('instruments_tag_key').on(t.tag),
  check('instruments_tag_form', sql`${t.tag} ~ '^B[0-9]{5,}[0-9A-Z]$'`),
])

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
  testedBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  /** Signed: the sitting is over, its readings stand. */
  signedAt: instant(),
  version: version(),
  ...timestamps,
}, t => [
  uniqueIndex('test_sheets_number_key').on(t.unitId, t.number),
  check('test_sheets_warm_up', sql`${t.warmUpMinutes} is null or ${t.warmUpMinutes} between 0 and 100000`),
])

export const testSheetInstruments = pgTable('test_sheet_instruments', {
  sheetId: uuid().notNull().references(() => testSheets.id, { onDelete: 'restrict' }),
  instrumentId: uuid().notNull().references(() => instruments.id, { onDelete: 'restrict' }),
}, t => [
  primaryKey({ name: 'test_sheet_instruments_pkey', columns: [t.sheetId, t.instrumentId] }),
  index('test_sheet_instruments_instrument_idx').on(t.instrumentId),
])

/** A dial checkpoint: the setting, its limit copied from the model on the day, and what was read. */
export const readings = pgTable('readings', {
  id: uuid().primaryKey().defaultRandom(),
  sheetId: uuid().notNull().references(() => testSheets.id, { onDelete: 'restrict' }),
  position: smallint().notNull(),
  bandLabel: text().notNull(),
  settingHz: bigint({ mode: 'number' }).notNull(),
  tolerancePercent: numeric({ precision: 7, scale: 4, mode: 'number' }).notNull(),
  /** As it was typed, "98.2 kc", and as understood, in hertz; both null while not read. */
  readingText: text(),
  readingHz: numeric({ precision: 20, scale: 6, mode: 'number' }),
  instrumentId: uuid().references(() => instruments.id, { onDelete: 'restrict' }),
  note: text().notNull().default(''),
}, t => [
  uniqueIndex('readings_position_key').on(t.sheetId, t.position),
  check('readings_setting_positive', sql`${t.settingHz} > 0`),
  check('readings_value_positive', sql`${t.readingHz} is null or ${t.readingHz} > 0`),
  check('readings_typed_and_understood', sql`(${t.readingText} is null) = (${t.readingHz} is null)`),
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
