/**
 * Capacitances in figures: the three-digit code (two figures, then a power of ten, in picofarads), and bare numbers with the units of
 * old parts. Source of the code, of 8 and 9 as ×0.01 and ×0.1, and of R as a point: secondary sources of the EIA and IEC 60062 codes.
 * How old parts were numbered is common practice, no source. Not read: two-character voltage codes, and letters of the dielectric.
 */
import { NARROW_SPACE } from '../frequency'
import type { Tolerance } from './tolerance-letters'
import { ABSOLUTE_BELOW_FARADS, letterOfTolerance, toleranceOfLetter } from './tolerance-letters'

export interface CapacitorReading {
  farads: number
  tolerance: Tolerance | null
  /** The unit the figures were taken to be in. */
  takenIn: 'pF' | 'nF' | 'µF'
  /** Why that unit, and what is doubtful, in sentences. */
  notes: readonly string[]
}
/** `isOther`: the text is no such code at all, and may be another. */
export type CapacitorResult = { ok: true, reading: CapacitorReading } | { ok: false, isOther: boolean, sentence: string }

const refuse = (sentence: string): { ok: false, isOther: false, sentence: string } => ({ ok: false, isOther: false, sentence })
const other = (sentence: string): { ok: false, isOther: true, sentence: string } => ({ ok: false, isOther: true, sentence })
const shown = (text: string): string => `“${text.trim().slice(0, 40)}”`

/** The third digit as a power of ten of picofarads. */
const powerOf = (digit: string): number => ({ 8: -2, 9: -1 })[digit] ?? Number(digit)
/** "10 000", "0.01". */
const multiplierWords = (power: number): string => power < 0 ? (10 ** power).toFixed(-power) : String(10 ** power).replace(/\B(?=(?:\d{3})+$)/g, NARROW_SPACE)

function withLetter(text: string, picofarads: string, letter: string, note: string): CapacitorResult {
  const farads = Number(`${picofarads}e-12`)
  const tolerance = letter === '' ? null : toleranceOfLetter(letter, 'capacitor', farads)
  if (letter !== '' && !tolerance) return refuse(`${shown(text)} can’t be read: ${letter} stands for no tolerance.`)
  return { ok: true, reading: { farads, tolerance: tolerance?.tolerance ?? null, takenIn: 'pF', notes: tolerance?.doubt ? [note, tolerance.doubt] : [note] } }
}

/**
 * Reads 104, 104K, 479 or 4R7 as a capacitor has them, in picofarads. Refused with a sentence: what is not of that form, a code that
 * begins with 0, a letter that is no tolerance.
 */
export function readThreeDigits(text: string): CapacitorResult {
  const typed = text.trim().toUpperCase()
  const point = /^(\d?)R(\d)([A-Z]?)$/.exec(typed)
  if (point && /[1-9]/.test(typed)) return withLetter(text, `${point[1] || '0'}.${point[2]}`, point[3] ?? '', 'The R stands for the point; taken in picofarads, as on a capacitor.')
  const [, figures = '', digit = '', letter = ''] = /^(\d\d)(\d)([A-Z]?)$/.exec(typed) ?? []
  if (figures === '') return other(`${shown(text)} is not a three-digit code. It looks like 104 or 104K.`)
  if (figures.startsWith('0')) return other(`${shown(text)} is not a three-digit code: the code never begins with 0.`)
  const power = powerOf(digit)
  return withLetter(text, String(Number(`${figures}e${power}`)), letter, `Taken in picofarads: ${figures} × ${multiplierWords(power)}${NARROW_SPACE}pF.`)
}

/** The three-digit code of a capacitance in farads, with the letter of its tolerance in ± per cent: "104K". */
export function writeThreeDigits(farads: number, tolerancePercent: number | null = null): { ok: true, text: string } | { ok: false, sentence: string } {
  if (!(farads > 0 && Number.isFinite(farads))) return refuse('A capacitance must be above 0.')
  const [mantissa = '', exponent = ''] = (farads * 1e12).toExponential(1).split('e')
  const power = Number(exponent) - 1
  if (Math.abs(Number(`${mantissa}e${exponent}`) / (farads * 1e12) - 1) > 1e-9) return refuse('The code has two figures, and this value has more.')
  if (power < -2 || power > 7) return refuse(`The code goes from 0.1${NARROW_SPACE}pF to 990${NARROW_SPACE}µF.`)
  if (tolerancePercent !== null && farads < ABSOLUTE_BELOW_FARADS * (1 - 1e-9)) return refuse(`Below 10${NARROW_SPACE}pF the letters stand for picofarads, not per cent.`)
  const letter = tolerancePercent === null ? '' : letterOfTolerance(tolerancePercent)
  if (letter === null) return refuse(`No letter stands for ±${tolerancePercent}${NARROW_SPACE}%.`)
  return { ok: true, text: `${mantissa.replace('.', '')}${power < 0 ? power + 10 : power}${letter}` }
}

interface OldUnit { words: RegExp, power: number, takenIn: CapacitorReading['takenIn'], note?: string }
const OLD_UNITS: readonly OldUnit[] = [
  { words: /^pF?d?$/i, power: -12, takenIn: 'pF' },
  { words: /^nF?d?$/i, power: -9, takenIn: 'nF' },
  { words: /^(?:[µμ]{2}|uu|mm)Fd?$/i, power: -12, takenIn: 'pF', note: 'Micromicrofarads are picofarads.' },
  { words: /^[µμu]F?d?$/i, power: -6, takenIn: 'µF' },
  { words: /^mFd?s?$/i, power: -6, takenIn: 'µF', note: 'On old parts mF, MF and mfd are microfarads, never millifarads.' },
]

function unitsOf(word: string, number: string): readonly OldUnit[] {
  if (word !== '') return OLD_UNITS.filter(({ words }) => words.test(word))
  const micro: OldUnit = { words: /^$/, power: -6, takenIn: 'µF', note: 'No unit is marked: taken in microfarads, as on paper and electrolytic capacitors.' }
  const pico: OldUnit = { words: /^$/, power: -12, takenIn: 'pF', note: 'No unit is marked: taken in picofarads, as on mica and ceramic capacitors.' }
  if (Number(number) < 1) return [micro]
  if (Number(number) > 1000) return [pico]
  return Number(number) >= 100 ? [pico, micro] : [micro, pico]
}

/**
 * Reads a number with or without a unit as on old parts: .01 MFD, 250 MMF, 0.1 µF 10 %, 470, 8. Without a unit there may be two
 * readings, the likelier first: below 1 in microfarads, above 1000 in picofarads, between in either. An empty list where it is no such number.
 */
export function readBareCapacitance(text: string): readonly CapacitorReading[] {
  const [, number = '', word = '', percent = ''] = /^(\d{0,7}(?:[.,]\d{1,6})?)\s*([A-Zµμ.]*?)(?:\s*[±+/-]*\s*(\d{1,2}(?:\.\d)?)\s*%)?$/i.exec(text.trim()) ?? []
  const plain = number.replace(',', '.').replace(/^\./, '0.')
  if (!(Number(plain) > 0)) return []
  const size = Number(percent)
  const tolerance: Tolerance | null = percent === '' ? null : { unit: '%', minus: size, plus: size }
  return unitsOf(word.replaceAll('.', ''), plain).map(({ power, takenIn, note }) => ({ farads: Number(`${plain}e${power}`), tolerance, takenIn, notes: note ? [note] : [] }))
}
