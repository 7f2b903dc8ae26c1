import { sql } from 'drizzle-orm'
import { check, date, index, integer, numeric, pgEnum, pgTable, smallint, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { FOUND_ERROR_KINDS, RECALL_OUTCOMES } from '../../shared/domain/recall'
import { instruments, testSheets } from './bench'
import { instant, version } from './columns'
import { files } from './files'
import { quantity } from './measuring'
import { people } from './people'

const amount = () => numeric({ mode: 'number' })

/** One line of an instrument's specification, in base units: over what it holds and how well it measures. */
export const instrumentCapabilities = pgTable('instrument_capabilities', {
  id: uuid().primaryKey().defaultRandom(),
  instrumentId: uuid().notNull().references(() => instruments.id, { onDelete: 'restrict' }),
  position: smallint().notNull(),
  label: text().notNull().default(''),
  quantity: quantity().notNull(),
  lower: amount().notNull(),
  upper: amount().notNull(),
  percentOfReading: amount(),
  percentOfRange: amount(),
  digits: amount(),
  digitStep: amount(),
  ppm: amount(),
  ageingPpmPerYear: amount(),
  gateSeconds: amount(),
  decibels: amount(),
}, t => [
  uniqueIndex('instrument_capabilities_position_key').on(t.instrumentId, t.position),
  check('instrument_capabilities_range_in_order', sql`${t.lower} >= 0 and ${t.lower} <= ${t.upper}`),
])

/** A calibration certificate. Never edited: one entered by mistake is withdrawn and says why. */
export const calibrations = pgTable('calibrations', {
  id: uuid().primaryKey().defaultRandom(),
  instrumentId: uuid().notNull().references(() => instruments.id, { onDelete: 'restrict' }),
  /** Null only for records older than certificates, of which just the day it fell due was kept. */
  calibratedOn: date({ mode: 'string' }),
  /** Null: no day was set. */
  dueOn: date({ mode: 'string' }),
  certificateNumber: text().notNull().default(''),
  laboratory: text().notNull().default(''),
  /** To what it is traceable; empty: then it was checked against something, not calibrated. */
  traceableTo: text().notNull().default(''),
  note: text().notNull().default(''),
  /** The certificate as a PDF. */
  fileId: uuid().references(() => files.id, { onDelete: 'restrict' }),
  enteredBy: uuid().references(() => people.id, { onDelete: 'restrict' }),
  withdrawnAt: instant(),
  withdrawnBecause: text(),
  createdAt: instant().notNull().defaultNow(),
}, t => [
  index('calibrations_instrument_idx').on(t.instrumentId, t.calibratedOn),
  check('calibrations_due_after', sql`num_nonnulls(${t.calibratedOn}, ${t.dueOn}) > 0 and (${t.dueOn} is null or ${t.calibratedOn} is null or ${t.dueOn} > ${t.calibratedOn})`),
  check('calibrations_withdrawn_says_why', sql`(${t.withdrawnAt} is null) = (${t.withdrawnBecause} is null)`),
])

export const foundErrorKind = pgEnum('found_error_kind', FOUND_ERROR_KINDS)
export const recallOutcome = pgEnum('recall_outcome', RECALL_OUTCOMES)

/** An instrument was found wrong: every sheet it was used for since its last good check is to be looked at. */
export const instrumentRecalls = pgTable('instrument_recalls', {
  id: uuid().primaryKey().defaultRandom(),
  instrumentId: uuid().notNull().references(() => instruments.id, { onDelete: 'restrict' }),
  /** 1, 2, 3… within the instrument. */
  number: integer().notNull(),
  foundOn: date({ mode: 'string' }).notNull(),
  /** The last day on which it was known to be right; null: never. */
  goodOn: date({ mode: 'string' }),
  /** Only readings of this quantity; null: all. */
  quantity: quantity(),
  errorKind: foundErrorKind().notNull(),
  /** By how much it reads too high (negative: too low); null where it can't be said. */
  errorAmount: amount(),
  why: text().notNull(),
  startedBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  closedAt: instant(),
  version: version(),
  createdAt: instant().notNull().defaultNow(),
}, t => [
  uniqueIndex('instrument_recalls_number_key').on(t.instrumentId, t.number),
  check('instrument_recalls_amount_is_said', sql`(${t.errorKind} = 'not_known') = (${t.errorAmount} is null)`),
  check('instrument_recalls_days_in_order', sql`${t.goodOn} is null or ${t.goodOn} <= ${t.foundOn}`),
])

/** One sheet of a recall, until somebody has said what follows for it. */
export const instrumentRecallSheets = pgTable('instrument_recall_sheets', {
  id: uuid().primaryKey().defaultRandom(),
  recallId: uuid().notNull().references(() => instrumentRecalls.id, { onDelete: 'restrict' }),
  sheetId: uuid().notNull().references(() => testSheets.id, { onDelete: 'restrict' }),
  outcome: recallOutcome(),
  note: text().notNull().default(''),
  decidedBy: uuid().references(() => people.id, { onDelete: 'restrict' }),
  decidedAt: instant(),
}, t => [
  uniqueIndex('instrument_recall_sheets_key').on(t.recallId, t.sheetId),
  index('instrument_recall_sheets_sheet_idx').on(t.sheetId),
  check('instrument_recall_sheets_decided', sql`num_nonnulls(${t.outcome}, ${t.decidedBy}, ${t.decidedAt}) in (0, 3)`),
])
