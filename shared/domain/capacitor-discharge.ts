/**
 * How long a reservoir capacitor stays dangerous: t = R·C·ln(V₀/V). Ohm, farad, volts, seconds.
 *
 * IEC 61010-1 asks of the pins of a plug that they are not hazardous five seconds after it is pulled, by a limit of charge of
 * about 45 µC; "60 V or less" is only the common shortcut (secondary source).
 */
export const USUAL_VOLTS = 60
export const CHARGE_LIMIT_MICROCOULOMB = 45

export interface Reservoir { volts: number, farad: number, /** Null: no bleeder is fitted. */ bleederOhm: number | null }
export type Discharge = { kind: 'falls', seconds: number, sentence: string } | { kind: 'stays', sentence: string } | { kind: 'refused', sentence: string }

/** Charge of a capacitor in microcoulomb. */
export const chargeMicrocoulomb = (volts: number, farad: number): number => volts * farad * 1e6

const words = (seconds: number): string => seconds < 1 ? 'under a second' : seconds < 120 ? `about ${Math.ceil(seconds)} seconds` : `about ${Math.ceil(seconds / 60)} minutes`

/** The time from power off until the capacitor has fallen to `targetVolts` through its bleeder. Says nothing of other paths. */
export function dischargeTime({ volts, farad, bleederOhm }: Reservoir, targetVolts = USUAL_VOLTS): Discharge {
  const figures = [volts, farad, targetVolts, ...bleederOhm === null ? [] : [bleederOhm]]
  if (figures.some(figure => !(figure > 0) || !Number.isFinite(figure))) return { kind: 'refused', sentence: 'Volts, capacitance and bleeder must be above zero.' }
  if (volts <= targetVolts) return { kind: 'falls', seconds: 0, sentence: `It is not charged above ${targetVolts} V. Check with a meter all the same.` }
  if (bleederOhm === null) return { kind: 'stays', sentence: 'Without a bleeder it can stay charged for days: discharge it through a resistor and check with a meter before touching anything.' }
  const seconds = bleederOhm * farad * Math.log(volts / targetVolts)
  return { kind: 'falls', seconds, sentence: `It falls from ${volts} V to ${targetVolts} V in ${words(seconds)} if the bleeder is whole. Check with a meter before touching anything.` }
}
