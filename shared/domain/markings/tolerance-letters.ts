/**
 * The letters for tolerances and temperature coefficients of IEC 60062.
 *
 * B, C, D, F, G, J, K, M and, on capacitors, H are as secondary sources of the code give them, and so are B, C and D in picofarads
 * below 10 pF, and W, P and L on resistors. The others are from memory and carry a doubt. The standard itself was not seen.
 */
import { NARROW_SPACE } from '../frequency'

/** Deviations allowed from the value: `minus` downwards, `plus` upwards, both positive, in per cent of it or in picofarads. */
export interface Tolerance {
  unit: '%' | 'pF'
  minus: number
  plus: number
}

interface LetterEntry { letter: string, minus: number, plus: number, isSure: boolean }
const both = (letter: string, percent: number, isSure = true): LetterEntry => ({ letter, minus: percent, plus: percent, isSure })

const PERCENT: readonly LetterEntry[] = [
  both('L', 0.01), both('P', 0.02), both('W', 0.05), both('B', 0.1), both('C', 0.25), both('D', 0.5), both('F', 1), both('G', 2), both('H', 3), both('J', 5),
  both('K', 10), both('M', 20), both('E', 0.005, false), both('N', 30, false),
  { letter: 'Q', minus: 10, plus: 30, isSure: false }, { letter: 'T', minus: 10, plus: 50, isSure: false },
  { letter: 'S', minus: 20, plus: 50, isSure: false }, { letter: 'Z', minus: 20, plus: 80, isSure: false },
]
/** Capacitors below 10 pF. */
const PICOFARADS: readonly LetterEntry[] = [both('B', 0.1), both('C', 0.25), both('D', 0.5), both('F', 1, false), both('G', 2, false)]
export const ABSOLUTE_BELOW_FARADS = 10e-12

export interface LetterTolerance { tolerance: Tolerance, doubt: string | null }

const doubtOf = (letter: string): string => `The letter ${letter} as a tolerance could not be checked against a published table: measure if it matters.`

/** What a tolerance letter stands for on a part of a value in ohms or farads; null where it stands for none. Capitals only. */
export function toleranceOfLetter(letter: string, kind: 'resistor' | 'capacitor', value: number): LetterTolerance | null {
  const absolute = kind === 'capacitor' && value < ABSOLUTE_BELOW_FARADS * (1 - 1e-9) ? PICOFARADS.find(entry => entry.letter === letter) : undefined
  const entry = absolute ?? PERCENT.find(candidate => candidate.letter === letter)
  if (!entry) return null
  const { minus, plus, isSure } = entry
  return { tolerance: { unit: absolute ? 'pF' : '%', minus, plus }, doubt: isSure ? null : doubtOf(letter) }
}

/** The letter of a tolerance in ± per cent; null where there is none. */
export function letterOfTolerance(percent: number): string | null {
  return PERCENT.find(({ minus, plus }) => minus === percent && plus === percent)?.letter ?? null
}

/** ± per cent; null where the tolerance is lopsided or in picofarads. */
export function symmetricPercent(tolerance: Tolerance | null): number | null {
  return tolerance?.unit === '%' && tolerance.minus === tolerance.plus ? tolerance.plus : null
}

/** "±5 %", "−20/+80 %", "±0.25 pF". */
export function toleranceWords({ unit, minus, plus }: Tolerance): string {
  const size = minus === plus ? `±${plus}` : `\u2212${minus}/+${plus}`
  return `${size}${NARROW_SPACE}${unit}`
}

/** Temperature coefficients of resistors in ppm/K (public tables of the code; Z is left out, for they give it two values). */
const COEFFICIENTS: Readonly<Record<string, number>> = { U: 250, S: 100, R: 50, Q: 25, P: 15, M: 5, K: 1 }

/** The temperature coefficient that a letter after the tolerance letter stands for, in ppm/K; null where it stands for none. */
export function coefficientOfLetter(letter: string): number | null {
  return COEFFICIENTS[letter] ?? null
}
