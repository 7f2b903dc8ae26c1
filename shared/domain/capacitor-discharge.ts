/**
 * How long a reservoir capacitor stays dangerous: t = R·C·ln(V₀/V). Ohm, farad, volts, seconds.
 *
 * IEC 61010-1 asks of the pins of a plug that they are not hazardous five seconds after it is pulled, by a limit of charge of
 * about 45 µC; "60 V or less" is only the common shortcut (secondary source).
 */
import { NARROW_SPACE } from './frequency'

/** The voltage to which a discharge is usually reckoned, volts DC. Not a promise of anything. */
export const USUAL_VOLTS = 60
/** Seconds after unplugging at which the standard looks at the pins, and the charge they may then hold. */
export const PLUG_TEST_SECONDS = 5
export const CHARGE_LIMIT_MICROCOULOMB = 45

export interface Reservoir { volts: number, farad: number, /** Null: no bleeder is fitted. */ bleederOhm: number | null }
export type Discharge = { kind: 'falls', seconds: number, sentence: string } | { kind: 'stays', sentence: string } | { kind: 'refused', sentence: string }

/** Charge of a capacitor in microcoulomb: Q = C·V, in volts and farad. */
export const chargeMicrocoulomb = (volts: number, farad: number): number => volts * farad * 1e6

const isAbove = (figure: number): boolean => figure > 0 && Number.isFinite(figure)

function words(seconds: number): string {
  if (seconds < 1) return 'under a second'
  if (seconds < 120) return `about ${Math.ceil(seconds)} seconds`
  return seconds < 7200 ? `about ${Math.ceil(seconds / 60)} minutes` : `about ${Math.ceil(seconds / 3600)} hours`
}

const refuse = (sentence: string): Discharge => ({ kind: 'refused', sentence })

/** What can't be reckoned with, in a sentence; null when nothing is wrong. Nought volts is a capacitor without charge. */
function problemOf({ volts, farad, bleederOhm }: Reservoir, targetVolts: number): string | null {
  if (!(volts >= 0) || !Number.isFinite(volts)) return 'Enter the voltage across the capacitor as a number of volts, nought or more.'
  if (!isAbove(farad)) return 'Enter the capacitance as a number above nought.'
  if (bleederOhm !== null && !isAbove(bleederOhm)) return 'Enter the bleeder as a number of ohms above nought, or leave it out where none is fitted.'
  return isAbove(targetVolts) ? null : 'Enter the voltage that it is to fall to as a number above nought: it never falls to nought itself.'
}

/**
 * The time from power off until the capacitor has fallen to `targetVolts` through its bleeder, said no shorter than it is.
 * 0 where it is not above that to begin with; never a number without a bleeder. Says nothing of other paths, of an open
 * bleeder, or of what a capacitor recovers.
 */
export function dischargeTime(reservoir: Reservoir, targetVolts = USUAL_VOLTS): Discharge {
  const problem = problemOf(reservoir, targetVolts)
  if (problem) return refuse(problem)
  const { volts, farad, bleederOhm } = reservoir
  if (volts <= targetVolts) return { kind: 'falls', seconds: 0, sentence: `It is not charged above ${targetVolts} V. Check with a meter all the same.` }
  if (bleederOhm === null) return { kind: 'stays', sentence: 'Without a bleeder it can stay charged for days: discharge it through a resistor and check with a meter before touching anything.' }
  const seconds = bleederOhm * farad * Math.log(volts / targetVolts)
  if (!Number.isFinite(seconds)) return refuse('These figures give no time that means anything. Check the units: ohms, farads and volts.')
  return { kind: 'falls', seconds, sentence: `It falls from ${volts} V to ${targetVolts} V in ${words(seconds)} if the bleeder is whole. Check with a meter before touching anything.` }
}

/** A charge to three figures and a whole number from a hundred on, so that it never shows a power of ten. */
const chargeInWords = (microcoulomb: number): string =>
  `${microcoulomb >= 100 ? Math.round(microcoulomb) : Number(microcoulomb.toPrecision(3))}${NARROW_SPACE}µC`

/**
 * The charge that a capacitor holds against the limit of charge of IEC 61010-1’s plug test, in words: a limit of charge and
 * not of voltage, so that a capacitor at 60 V can still be far beyond it. Asks back for what can’t be reckoned with.
 */
export function chargeNote(volts: number, farad: number): string {
  const problem = problemOf({ volts, farad, bleederOhm: null }, USUAL_VOLTS)
  if (problem) return problem
  const charge = chargeMicrocoulomb(volts, farad)
  const against = charge > CHARGE_LIMIT_MICROCOULOMB ? 'more than' : 'not more than'
  const limit = `the ${CHARGE_LIMIT_MICROCOULOMB}${NARROW_SPACE}µC or so that IEC 61010-1 allows at the pins of a plug ${PLUG_TEST_SECONDS}${NARROW_SPACE}s after it is pulled`
  return `It holds ${chargeInWords(charge)} at ${volts}${NARROW_SPACE}V, ${against} ${limit}. That is a limit of charge; ${USUAL_VOLTS}${NARROW_SPACE}V or less is only the usual shortcut. Check with a meter before touching anything.`
}
