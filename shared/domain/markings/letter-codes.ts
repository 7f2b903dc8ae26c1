/**
 * The letter-and-digit code of IEC 60062, both ways: the letter of the multiplier stands where the decimal point would.
 * R, K, M, G and L (milliohms) for resistance; p, n, µ, m and F for capacitance. Source: an encyclopaedia's article on the code;
 * the capacitance examples and L are from memory.
 */
import { NARROW_SPACE } from '../frequency'
import type { LetterTolerance, Tolerance } from './tolerance-letters'
import { ABSOLUTE_BELOW_FARADS, coefficientOfLetter, letterOfTolerance, toleranceOfLetter } from './tolerance-letters'

export interface LetterReading {
  kind: 'resistor' | 'capacitor'
  /** Ohms or farads. */
  value: number
  tolerance: Tolerance | null
  /** Parts per million per kelvin; null where no letter says so. */
  ppmPerKelvin: number | null
  notes: readonly string[]
}
/** `isOther`: the text is no such code at all, and may be another. */
export type LetterResult = { ok: true, reading: LetterReading } | { ok: false, isOther: boolean, sentence: string }
export type LetterText = { ok: true, text: string } | { ok: false, sentence: string }

type Letters = readonly (readonly [power: number, letter: string])[]
const RESISTANCE: Letters = [[9, 'G'], [6, 'M'], [3, 'K'], [0, 'R'], [-3, 'L']]
const CAPACITANCE: Letters = [[0, 'F'], [-3, 'm'], [-6, 'µ'], [-9, 'n'], [-12, 'p']]

const refuse = (sentence: string): { ok: false, isOther: false, sentence: string } => ({ ok: false, isOther: false, sentence })
const other = (sentence: string): { ok: false, isOther: true, sentence: string } => ({ ok: false, isOther: true, sentence })
const shown = (text: string): string => `“${text.trim().slice(0, 40)}”`
const numberOf = (whole: string, fraction: string, power: number): number => Number(`${whole || '0'}.${fraction || '0'}e${power}`)

interface Suffix { tolerance: LetterTolerance | null, ppmPerKelvin: number | null }

/** The letters behind the value: a tolerance, on a resistor perhaps a temperature coefficient. Or the letter that stands for none. */
function readSuffix(letters: string, kind: 'resistor' | 'capacitor', value: number): Suffix | string {
  const [first, second] = letters
  if (first === undefined) return { tolerance: null, ppmPerKelvin: null }
  const tolerance = toleranceOfLetter(first, kind, value)
  if (!tolerance) return `${first} stands for no tolerance`
  if (second === undefined) return { tolerance, ppmPerKelvin: null }
  const ppmPerKelvin = kind === 'resistor' ? coefficientOfLetter(second) : null
  return ppmPerKelvin === null ? `${second} stands for no temperature coefficient` : { tolerance, ppmPerKelvin }
}

function toReading(text: string, kind: 'resistor' | 'capacitor', value: number, letters: string, notes: readonly string[]): LetterResult {
  const suffix = readSuffix(letters.toUpperCase(), kind, value)
  if (typeof suffix === 'string') return refuse(`${shown(text)} can’t be read: ${suffix}.`)
  const doubt = suffix.tolerance?.doubt
  return { ok: true, reading: { kind, value, tolerance: suffix.tolerance?.tolerance ?? null, ppmPerKelvin: suffix.ppmPerKelvin, notes: doubt ? [...notes, doubt] : notes } }
}

/**
 * Reads a resistance like 4K7, R47, 0R47, 470R or 4K7J, with a tolerance letter and perhaps one for the temperature coefficient.
 * Small letters are read as capitals; a small m with a note. Refused with a sentence: what is not of that form, and nought.
 */
export function readResistanceCode(text: string): LetterResult {
  const parts = /^(\d{0,4})([RKMGL])(\d{0,4})([A-Z]{0,2})$/i.exec(text.trim())
  const [, whole = '', letter = '', fraction = '', letters = ''] = parts ?? []
  if (whole + fraction === '') return other(`${shown(text)} is not a letter code of resistance. It looks like 4K7, R47 or 470R.`)
  const [power] = RESISTANCE.find(([, name]) => name === letter.toUpperCase()) ?? [0]
  const value = numberOf(whole, fraction, power)
  if (value === 0) return refuse(`${shown(text)} marks a bridge of 0${NARROW_SPACE}Ω, not a value.`)
  const notes = letter === 'm' ? ['The m is read as M, megohms. On a capacitor a small m is millifarads.'] : []
  return toReading(text, 'resistor', value, letters, notes)
}

/** The power of ten of a capacitance letter. P, N and U are stamped as capitals too; M is not read, for on old parts it is µ. */
function capacitancePower(letter: string): number {
  const name = /[PN]/.test(letter) ? letter.toLowerCase() : letter.replace(/[uUμ]/, 'µ')
  return CAPACITANCE.find(([, known]) => known === name)?.[0] ?? 0
}

/**
 * Reads a capacitance like 4n7, 47p, p33, 2µ2 (also 2u2) or 4n7K, with a tolerance letter. An F straight after the letter, as in
 * 47pF, is the unit. Refused with a sentence: what is not of that form, and nought.
 */
export function readCapacitanceCode(text: string): LetterResult {
  const parts = /^(\d{0,4})([pnuµμPNUmF])(\d{0,4})([A-Za-z]{0,2})$/.exec(text.trim())
  const [, whole = '', letter = '', fraction = '', letters = ''] = parts ?? []
  const value = numberOf(whole, fraction, capacitancePower(letter))
  if (whole + fraction === '' || value === 0) return other(`${shown(text)} is not a letter code of capacitance. It looks like 4n7, 47p or 2µ2.`)
  const hasUnit = fraction === '' && letter !== 'F' && /^F/i.test(letters)
  const notes = hasUnit && letters.length === 1 ? [`The F is read as farads. Where it stands apart it is the tolerance, ±1${NARROW_SPACE}%.`] : []
  return toReading(text, 'capacitor', value, hasUnit ? letters.slice(1) : letters, notes)
}

/** The figures either side of the letter; null where there are more than four. */
function figuresOf(scaled: number): { whole: string, fraction: string } | null {
  const [whole = '', fraction = ''] = String(scaled).split('.')
  const figures = { whole: whole === '0' ? '' : whole, fraction }
  return /^\d{1,4}$/.test(figures.whole + fraction) ? figures : null
}

/** `least`: how small a number may stand before a letter. A tolerance F straight after the letter would read as the unit: a 0 comes between. */
function write(value: number, tolerancePercent: number | null, letters: Letters, least: (letter: string) => number): LetterText {
  if (!(value > 0 && Number.isFinite(value))) return refuse('A value must be above 0.')
  const sizes = letters.map(([power, letter]) => ({ letter, scaled: Number((value / 10 ** power).toPrecision(12)) }))
  const size = sizes.find(({ letter, scaled }) => scaled >= least(letter)) ?? sizes.at(-1)
  const figures = size && figuresOf(size.scaled)
  if (!figures) return refuse('The code has room for four figures, and this value does not fit into them.')
  const tolerance = tolerancePercent === null ? '' : letterOfTolerance(tolerancePercent)
  if (tolerance === null) return refuse(`No letter stands for ±${tolerancePercent}${NARROW_SPACE}%.`)
  const fraction = figures.fraction || (tolerance === 'F' && /[pnµm]/.test(size.letter) ? '0' : '')
  return { ok: true, text: `${figures.whole}${size.letter}${fraction}${tolerance}` }
}

/** A resistance in ohms in the code, "4K7" or with its tolerance in ± per cent "4K7J". R47 for 0.47 Ω, 47L for 0.047 Ω. */
export function writeResistanceCode(ohms: number, tolerancePercent: number | null = null): LetterText {
  return write(ohms, tolerancePercent, RESISTANCE, letter => letter === 'R' ? 0.1 : 1)
}

/**
 * A capacitance in farads in the code, "4n7" or with its tolerance in ± per cent "4n7K"; p33 for 0.33 pF. Refused with a tolerance
 * below 10 pF, where the letters stand for picofarads.
 */
export function writeCapacitanceCode(farads: number, tolerancePercent: number | null = null): LetterText {
  if (tolerancePercent !== null && farads < ABSOLUTE_BELOW_FARADS * (1 - 1e-9)) return refuse(`Below 10${NARROW_SPACE}pF the letters stand for picofarads, not per cent.`)
  return write(farads, tolerancePercent, CAPACITANCE, () => 1)
}
