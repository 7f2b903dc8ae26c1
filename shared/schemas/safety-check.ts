import { z } from 'zod'
import type { Quantity } from '../domain/reading'
import { parseReading } from '../domain/reading'
import { CHECK_RESULTS } from '../domain/sheet-checks'
import { SAFETY_CLASSES } from '../domain/triage'
import { optionalLine, optionalProse, uuid } from './common'

/** What the database keeps in an integer column. */
const MOST = 2_000_000_000

/** `decimals` and `most` in the unit it is kept in; whole, and what an integer holds, unless said. */
interface Measured { quantity: Quantity, unit: string, perUnit: number, cautious: 'up' | 'down', label: string, decimals?: number, most?: number }

/** A value that is not exact in the kept unit is taken to its worse side. */
const ROUNDING = 1e-9
function kept(value: number, cautious: 'up' | 'down', decimals: number): number {
  const steps = value * 10 ** decimals
  const whole = cautious === 'up' ? Math.ceil(steps - ROUNDING) : Math.floor(steps + ROUNDING)
  return Number((whole / 10 ** decimals).toFixed(decimals))
}

/** A measurement typed as it was read; empty: not measured. A bare number is in the unit beside the box. */
const measured = ({ quantity, unit, perUnit, cautious, label, decimals = 0, most = MOST }: Measured) =>
  z.string({ error: `${label} must be text, like 0.2 ${unit}` }).max(60, `${label} must be 60 characters or less`).nullable().default(null)
    .transform((typed, context) => {
      const text = (typed ?? '').trim()
      if (text === '') return null
      // A meter at the end of its range shows "> 200 M": at least that is known.
      const bare = cautious === 'down' ? text.replace(/^>\s*/, '') : text
      const reading = parseReading(/^[\d.,\s]+$/.test(bare) ? `${bare} ${unit}` : bare, quantity)
      if (!reading.ok) {
        context.addIssue({ code: 'custom', message: reading.sentence })
        return z.NEVER
      }
      const value = kept(reading.value * perUnit, cautious, decimals)
      if (value < 0 || value > most) {
        context.addIssue({ code: 'custom', message: value < 0 ? `${label} can’t be below zero` : `${label} is more than a meter shows: check the unit` })
        return z.NEVER
      }
      return value
    })

const EARTH_BOND: Measured = { quantity: 'resistance', unit: 'ohm', perUnit: 1000, cautious: 'up', label: 'Earth bond' }
const INSULATION: Measured = { quantity: 'resistance', unit: 'Mohm', perUnit: 0.001, cautious: 'down', label: 'Insulation' }
const LEAKAGE: Measured = { quantity: 'current', unit: 'mA', perUnit: 1_000_000, cautious: 'up', label: 'Leakage' }

// Taken to the side on which the charge stays longer.
const RESERVOIR: Measured = { quantity: 'capacitance', unit: 'uF', perUnit: 1_000_000, cautious: 'up', label: 'Reservoir capacitor', decimals: 4, most: 10_000_000 }
const BLEEDER: Measured = { quantity: 'resistance', unit: 'kohm', perUnit: 0.001, cautious: 'up', label: 'Bleeder', decimals: 4, most: 10_000_000 }
const RESERVOIR_VOLTS: Measured = { quantity: 'voltage', unit: 'V', perUnit: 1, cautious: 'up', label: 'Voltage on the reservoir capacitor', most: 100_000 }

const result = (what: string) => z.enum(CHECK_RESULTS, { error: `Choose how ${what} came out` })

/** A limit typed as a measurement is; empty: as suggested for the class. */
const limit = (of: Measured) => measured({ ...of, label: `${of.label} limit` })
  .refine(value => value === null || value > 0, `${of.label} limit must be above zero`)

/** A part of the supply as it is marked or measured; empty: not looked at, or not there. */
const part = (of: Measured) => measured(of).refine(value => value === null || value > 0, `${of.label} must be above zero: leave it empty where there is none`)

export const newSafetyCheck = z.object({
  safetyClass: z.enum(SAFETY_CLASSES, { error: 'Choose its class' }),
  /** As read: "0.06 ohm". A bare number is in ohms. */
  earthBond: measured(EARTH_BOND),
  /** As read: "20 M". A bare number is in megohms. */
  insulation: measured(INSULATION),
  insulationTestVolts: z.preprocess(value => value === '' || value === undefined ? null : typeof value === 'string' ? Number(value) : value,
    z.int({ error: 'Test voltage must be a whole number of volts' }).min(1, 'Test voltage must be above zero').max(10_000, 'Test voltage must be 10 000 V or less').nullable()),
  /** As read: "0.4 mA". A bare number is in milliamperes. */
  leakage: measured(LEAKAGE),
  leadAndPlug: result('the lead and plug'),
  fuse: result('the fuse'),
  polarity: result('the polarity'),
  visual: result('the visual inspection'),
  /** The fuse that is fitted: "T 500 mA". */
  fuseRating: optionalLine('the fuse rating'),
  /** The reservoir capacitor, microfarads as kept: "32 uF". A bare number is in µF. */
  reservoirMicrofarad: part(RESERVOIR),
  /** The resistor across it, kilohms as kept: "220 k". A bare number is in kΩ. */
  bleederKilohm: part(BLEEDER),
  /** What stands on it in work, whole volts as kept: "350". */
  reservoirVolts: part(RESERVOIR_VOLTS),
  earthBondLimit: limit(EARTH_BOND),
  insulationLimit: limit(INSULATION),
  leakageLimit: limit(LEAKAGE),
  /** Where limits other than the suggested come from. */
  limitsOrigin: optionalLine('where the limits come from', 400),
  note: optionalProse('the note'),
  instrumentId: z.preprocess(value => value === '' ? null : value, uuid('an instrument from the list').nullable().default(null)),
  /** The sheet of whose sitting it is a part. */
  sheetNumber: z.int({ error: 'Name the sheet by its number' }).min(1, 'Name the sheet by its number').nullable().default(null),
}).superRefine((input, context) => {
  if (input.earthBond !== null && input.safetyClass !== 'earthed') {
    context.addIssue({ code: 'custom', path: ['earthBond'], message: 'Only an earthed piece has an earth bond: clear it, or change the class' })
  }
  if (input.insulation !== null && input.insulationTestVolts === null) {
    context.addIssue({ code: 'custom', path: ['insulationTestVolts'], message: 'Enter the voltage of the insulation test' })
  }
  const isMeasured = input.earthBond !== null || input.insulation !== null || input.leakage !== null
  if (isMeasured && input.instrumentId === null) {
    context.addIssue({ code: 'custom', path: ['instrumentId'], message: 'Choose the instrument that measured it' })
  }
  const changesLimits = input.earthBondLimit !== null || input.insulationLimit !== null || input.leakageLimit !== null
  if (changesLimits && input.limitsOrigin === '') {
    context.addIssue({ code: 'custom', path: ['limitsOrigin'], message: 'Enter where the limits come from' })
  }
})
export type NewSafetyCheck = z.output<typeof newSafetyCheck>
