import { z } from 'zod'
import type { Capability } from '../domain/accuracy'
import { QUANTITIES } from '../domain/reading'
import { day, line, optionalLine, optionalProse, pageQuery, uuid, versionSeen } from './common'
import { rawAmount, readAmount, typedShare } from './measure'
import { tagOf } from './params'

export const MOST_CAPABILITIES = 60

const dayOrNone = (label: string) => z.preprocess(value => value === '' ? null : value, day(label).nullable().default(null))

/** One line of an instrument's specification, its range with units as typed. */
export const instrumentCapability = z.object({
  label: optionalLine('the range'),
  quantity: z.enum(QUANTITIES, { error: 'Choose what it measures' }),
  lower: rawAmount.nullable().default(null),
  upper: rawAmount,
  percentOfReading: typedShare('per cent of reading', 100),
  percentOfRange: typedShare('per cent of range', 100),
  digits: typedShare('the digits', 10_000),
  digitStep: rawAmount.nullable().default(null),
  ppm: typedShare('the time base’s ppm', 1e6),
  ageingPpmPerYear: typedShare('the ageing in ppm a year', 1e6),
  gateSeconds: typedShare('the gate time in seconds', 10_000),
  decibels: typedShare('the dB', 100),
}).transform((said, context): Capability => {
  const read = (field: 'lower' | 'upper' | 'digitStep') => {
    const amount = readAmount(said[field], said.quantity)
    if (!amount.ok) context.addIssue({ code: 'custom', path: [field], message: amount.sentence })
    return amount.ok ? amount.value : null
  }
  const [lower, upper, digitStep] = [read('lower'), read('upper'), read('digitStep')]
  if (upper === null && context.issues.length === 0) context.addIssue({ code: 'custom', path: ['upper'], message: 'Enter the highest it reads, with its unit' })
  if (upper !== null && (lower ?? 0) > upper) context.addIssue({ code: 'custom', path: ['lower'], message: 'The lowest it reads is above the highest: swap them or mend one' })
  if ((lower ?? 0) < 0) context.addIssue({ code: 'custom', path: ['lower'], message: 'Give the range without its sign: it holds for both' })
  return { ...said, lower: lower ?? 0, upper: upper ?? 0, digitStep }
})

const capabilities = z.array(instrumentCapability, { error: 'What it measures must be a list' }).max(MOST_CAPABILITIES, `An instrument has ${MOST_CAPABILITIES} ranges at most`).default([])

const certificate = z.object({
  calibratedOn: day('the day it was calibrated'),
  dueOn: dayOrNone('the day the next calibration is due'),
  certificateNumber: optionalLine('the certificate’s number'),
  laboratory: optionalLine('who calibrated it'),
  traceableTo: optionalLine('what it is traceable to', 400),
  note: optionalProse('the certificate note'),
})

const inOrder = ({ calibratedOn, dueOn }: z.output<typeof certificate>, context: z.RefinementCtx) => {
  if (dueOn !== null && dueOn <= calibratedOn) {
    context.addIssue({ code: 'custom', path: ['dueOn'], message: 'The next calibration must be due after the day of the last' })
  }
}

/** A certificate as it is entered; its PDF may come with it. */
export const newCalibration = certificate.superRefine(inOrder)
export type NewCalibration = z.output<typeof newCalibration>

export const withdrawnCalibration = z.object({ why: line('why it is withdrawn', 400) })
export const calibrationParams = z.object({ tag: tagOf('B'), id: uuid('a certificate') })

const instrument = z.object({
  name: line('what the instrument is'),
  serial: optionalLine('the serial'),
  accuracy: optionalLine('the accuracy', 400),
  capabilities,
})

/** A bench instrument, new to the book, with its certificate if there is one. */
export const newInstrument = instrument.extend({ calibration: newCalibration.nullable().default(null) })
export type NewInstrument = z.output<typeof newInstrument>

/** The same as it should be now, and the version it was changed from. Certificates are added, never changed. */
export const changedInstrument = instrument.extend({ version: versionSeen })
export type ChangedInstrument = z.output<typeof changedInstrument>

export const retiredInstrument = z.object({ why: line('why it is retired', 400), version: versionSeen })
export type RetiredInstrument = z.output<typeof retiredInstrument>

export const instrumentParams = z.object({ tag: tagOf('B') })

export const instrumentQuery = pageQuery.extend({
  /** `yes`: also those that are retired. */
  retired: z.enum(['yes', 'no'], { error: 'retired must be yes or no' }).default('no'),
})
export type InstrumentQuery = z.output<typeof instrumentQuery>
