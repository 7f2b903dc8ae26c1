import { z } from 'zod'
import { parseDecimal, toNumber } from '../domain/decimal'
import { DECISION_RULES, MOST_GUARD_FACTOR } from '../domain/decision'
import { QUANTITIES } from '../domain/reading'
import { CHECK_RESULTS } from '../domain/sheet-checks'
import { day, line, optionalLine, optionalProse, uuid, versionSeen } from './common'
import { typedShare } from './measure'

/** The most free checks a sheet holds, and points it may name in one save. */
const MOST_CHECKS = 60
export const MOST_POINTS = 600
const MOST_DRIFT_READINGS = 200
const MOST_DRIFT_MINUTES = 20_000
const MOST_INSTRUMENTS = 20

/** Starting a sheet: with power, or a cold sitting whose checks need none. */
export const newTestSheet = z.object({
  energised: z.boolean({ error: 'Say whether it will be powered' }).default(true),
  testedOn: day('the day of the sitting').optional(),
  /** The checkpoints of the model's procedure where it has one, or only the dial as its bands give it. */
  checkpoints: z.enum(['procedure', 'bands'], { error: 'Choose the procedure or the bands' }).default('procedure'),
})
export type NewTestSheet = z.output<typeof newTestSheet>

const typedReading = z.string({ error: 'The reading must be text, like 98.2 kc' }).max(400, 'The reading must be 400 characters or less')
  .transform(text => text.trim()).nullable().optional()

const reading = z.object({
  /** Which point: its number on the sheet. */
  position: z.int({ error: 'Name the point by its number' }).min(1, 'Name the point by its number'),
  /** As typed, before anything was touched and after adjustment; null or empty takes it back. Left out: as it was. */
  found: typedReading,
  left: typedReading,
  /** The instrument that took it; null or empty: the best of the sheet's. */
  instrumentId: z.preprocess(value => value === '' ? null : value, uuid('an instrument from the list').nullable()).optional(),
  note: optionalLine('the note', 400).optional(),
})

const drift = z.object({
  label: optionalLine('what is watched'),
  quantity: z.enum(QUANTITIES, { error: 'Choose what is watched' }),
  readings: z.array(z.object({
    minutes: z.union([z.string(), z.number()], { error: 'Enter the minutes since power was put on' }).transform((value, context) => {
      const read = parseDecimal(String(value))
      const minutes = read.ok ? toNumber(read.decimal) : Number.NaN
      if (minutes >= 0 && minutes <= MOST_DRIFT_MINUTES) return minutes
      context.addIssue({ code: 'custom', message: 'Minutes since power was put on: a number, 0 or more' })
      return z.NEVER
    }),
    text: z.string({ error: 'Enter the reading' }).transform(text => text.trim()).pipe(z.string().min(1, 'Enter the reading').max(60, 'The reading must be 60 characters or less')),
  })).max(MOST_DRIFT_READINGS, `A warm-up has ${MOST_DRIFT_READINGS} readings at most`),
})

const check = z.object({
  name: line('what is checked'),
  result: z.enum(CHECK_RESULTS, { error: 'Choose pass, fail, not done or not applicable' }),
  note: optionalLine('the note', 400),
})

/** The text of a number typed into a box: empty is none. */
const numberOrNone = (message: string, least: number, most: number, whole: boolean) =>
  z.preprocess((value) => {
    if (typeof value !== 'string') return value
    const text = value.trim().replace('\u2212', '-').replace(',', '.')
    return text === '' ? null : /^-?\d+(\.\d+)?$/.test(text) ? Number(text) : Number.NaN
  }, z.number({ error: message }).refine(value => value >= least && value <= most && (!whole || Number.isInteger(value)), message).nullable())

/** A part of a sheet as it should be now. What is left out stays as it is, so that two parts can be saved apart. */
export const savedTestSheet = z.object({
  version: versionSeen,
  testedOn: day('the day of the sitting').optional(),
  warmUpMinutes: numberOrNone('Warm-up must be a whole number of minutes, 0 to 10 000', 0, 10_000, true).optional(),
  supply: optionalLine('the supply').optional(),
  ambientCelsius: numberOrNone('Ambient must be a temperature between −40 and 80 °C', -40, 80, false).optional(),
  note: optionalProse('the note').optional(),
  instrumentIds: z.array(uuid('an instrument from the list')).max(MOST_INSTRUMENTS, `A sheet names ${MOST_INSTRUMENTS} instruments at most`).optional(),
  readings: z.array(reading).max(MOST_POINTS, 'That is more points than a sheet has').optional(),
  /** All the free checks, in their order: those left out are taken off the sheet. */
  checks: z.array(check).max(MOST_CHECKS, `A sheet holds ${MOST_CHECKS} checks at most`).optional(),
  deviations: optionalProse('what was done otherwise').optional(),
  decisionRule: z.enum(DECISION_RULES, { error: 'Choose simple acceptance or a guard band' }).optional(),
  /** r in the guard band w = r·U. */
  guardFactor: typedShare('the guard band’s factor', MOST_GUARD_FACTOR).transform(factor => factor ?? 1).optional(),
  /** All the readings of the warm-up, in their order. */
  drift: drift.optional(),
})
export type SavedTestSheet = z.output<typeof savedTestSheet>

export const signedTestSheet = z.object({ version: versionSeen })
export const reopenedTestSheet = z.object({ why: line('why the sheet is opened again', 400), version: versionSeen })
export type ReopenedTestSheet = z.output<typeof reopenedTestSheet>
