import { z } from 'zod'
import { parseReading } from '../domain/reading'
import { CHECK_RESULTS } from '../domain/sheet-checks'
import { day, line, optionalLine, optionalProse, uuid, versionSeen } from './common'

/** The most free checks a sheet holds, and points it may name in one save. */
const MOST_CHECKS = 60
const MOST_POINTS = 400
const MOST_INSTRUMENTS = 20

/** Starting a sheet: with power, or a cold sitting whose checks need none. */
export const newTestSheet = z.object({
  energised: z.boolean({ error: 'Say whether it will be powered' }).default(true),
  testedOn: day('the day of the sitting').optional(),
})
export type NewTestSheet = z.output<typeof newTestSheet>

const typedReading = z.string({ error: 'The reading must be text, like 98.2 kc' }).max(60, 'The reading must be 60 characters or less')
  .transform(text => text.trim()).nullable().optional()

const reading = z.object({
  /** Which point: its number on the sheet. */
  position: z.int({ error: 'Name the point by its number' }).min(1, 'Name the point by its number'),
  /** As typed; null or empty takes the reading back. Left out: as it was. */
  readingText: typedReading,
  note: optionalLine('the note', 400).optional(),
}).superRefine(({ readingText }, context) => {
  // Without the setting the unit can't be assumed; that is judged by the service. What is no reading at all is refused here.
  if (!readingText) return
  const read = parseReading(readingText, 'frequency')
  if (!read.ok && read.reason !== 'unit-missing') context.addIssue({ code: 'custom', path: ['readingText'], message: read.sentence })
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
})
export type SavedTestSheet = z.output<typeof savedTestSheet>

export const signedTestSheet = z.object({ version: versionSeen })
export const reopenedTestSheet = z.object({ why: line('why the sheet is opened again', 400), version: versionSeen })
export type ReopenedTestSheet = z.output<typeof reopenedTestSheet>
