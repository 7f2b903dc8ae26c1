import { z } from 'zod'
import { day, line, optionalLine, optionalProse, pageQuery, versionSeen } from './common'
import { tagOf } from './params'

const dayOrNone = (label: string) => z.preprocess(value => value === '' ? null : value, day(label).nullable().default(null))

const instrument = z.object({
  name: line('what the instrument is'),
  serial: optionalLine('the serial'),
  accuracy: optionalLine('the accuracy', 400),
  calibratedOn: dayOrNone('the day it was calibrated'),
  calibrationDue: dayOrNone('the day the next calibration is due'),
  calibrationNote: optionalProse('the certificate note'),
})

type Calibrated = Pick<z.output<typeof instrument>, 'calibratedOn' | 'calibrationDue'>

const inOrder = ({ calibratedOn, calibrationDue }: Calibrated, context: z.RefinementCtx<Calibrated>) => {
  if (calibratedOn !== null && calibrationDue !== null && calibrationDue <= calibratedOn) {
    context.addIssue({ code: 'custom', path: ['calibrationDue'], message: 'The next calibration must be due after the day of the last' })
  }
}

/** A bench instrument, new to the book. */
export const newInstrument = instrument.superRefine(inOrder)
export type NewInstrument = z.output<typeof newInstrument>

/** The same as it should be now, and the version it was changed from. */
export const changedInstrument = instrument.extend({ version: versionSeen }).superRefine(inOrder)
export type ChangedInstrument = z.output<typeof changedInstrument>

export const retiredInstrument = z.object({ why: line('why it is retired', 400), version: versionSeen })
export type RetiredInstrument = z.output<typeof retiredInstrument>

export const instrumentParams = z.object({ tag: tagOf('B') })

export const instrumentQuery = pageQuery.extend({
  /** `yes`: also those that are retired. */
  retired: z.enum(['yes', 'no'], { error: 'retired must be yes or no' }).default('no'),
})
export type InstrumentQuery = z.output<typeof instrumentQuery>
