/** Each code as one reader of typed text, giving what `readMarking` gathers: readings with their words, and how likely each is. */
import { formatAmount } from '../amount'
import { fromNumber, writeDecimal } from '../decimal'
import { NARROW_SPACE } from '../frequency'
import { parseReading } from '../reading'
import type { CapacitorReading } from './capacitor-codes'
import { readBareCapacitance, readThreeDigits } from './capacitor-codes'
import type { DateCodeOptions } from './date-codes'
import { readDateCode } from './date-codes'
import type { LetterResult } from './letter-codes'
import { readCapacitanceCode, readResistanceCode } from './letter-codes'
import { readMicaDots } from './mica-dots'
import { isPreferred, preferredNote } from './preferred-values'
import type { Colour, ResistorReading } from './resistor-colours'
import { COLOURS, readBands, readBodyEndDot } from './resistor-colours'
import { readResistorDigits } from './resistor-digits'
import type { Tolerance } from './tolerance-letters'
import { symmetricPercent, toleranceWords } from './tolerance-letters'

/** The codes that are read, and their names for a person. */
export const MARKING_CODES = ['colours', 'mica-dots', 'letter', 'three-digits', 'old-number', 'plain', 'resistor-digits', 'date'] as const
export type MarkingCode = (typeof MARKING_CODES)[number]
export const MARKING_CODE_LABELS: Record<MarkingCode, string> = {
  'colours': 'Colour code of resistors',
  'mica-dots': 'Dots of old mica and paper capacitors',
  'letter': 'Letter-and-digit code',
  'three-digits': 'Three-digit code of capacitors',
  'old-number': 'Capacitance as a number',
  'plain': 'Resistance as a number',
  'resistor-digits': 'Resistance in figures only',
  'date': 'Date code',
}

export interface MarkingReading {
  code: MarkingCode
  kind: 'resistor' | 'capacitor' | 'date'
  /** Ohms or farads; null for a date. */
  value: number | null
  /** "4.7 kΩ", or the date in words. */
  valueText: string
  /** ± per cent; null where it is not marked, lopsided or in picofarads. */
  tolerancePercent: number | null
  /** The whole reading: "4.7 kΩ ±5 %". */
  words: string
  why: string
  notes: readonly string[]
  /** Whether the value is one of its series; null where no tolerance is known. */
  preferred: string | null
  /** The same capacitance as old circuits write it: "0.1 µF or 100 000 pF"; null where they would write it as `valueText` does. */
  oldText: string | null
  /** 0 to 3: how likely a marking of this look is of this code (common practice, no source). */
  likelihood: number
}

/** What a reader made of the text; a sentence where it is of the reader's code and still can't be. */
export interface Heard { readings: MarkingReading[], refused: string | null }
const NOTHING: Heard = { readings: [], refused: null }
const heard = (...readings: MarkingReading[]): Heard => ({ readings, refused: null })

type Valued = Pick<MarkingReading, 'code' | 'why' | 'likelihood'> & { kind: 'resistor' | 'capacitor', value: number, tolerance: Tolerance | null, more?: string, notes?: readonly string[] }

/** Old circuits have no nanofarads (common practice, no source). */
function inOldUnits(farads: number): string | null {
  if (farads < 1e-9 * (1 - 1e-9) || farads >= 1e-6 * (1 - 1e-9)) return null
  const inUnit = (power: number): string => writeDecimal(fromNumber(Number((farads / 10 ** power).toPrecision(12))), NARROW_SPACE)
  return `${inUnit(-6)}${NARROW_SPACE}µF or ${inUnit(-12)}${NARROW_SPACE}pF`
}

function valued({ code, kind, value, tolerance, why, likelihood, more = '', notes = [] }: Valued): MarkingReading {
  const quantity = kind === 'resistor' ? 'resistance' : 'capacitance'
  const valueText = formatAmount(value, quantity)
  const tolerancePercent = symmetricPercent(tolerance)
  return {
    code, kind, value, valueText, tolerancePercent, why, notes, likelihood,
    words: `${valueText}${tolerance ? ` ${toleranceWords(tolerance)}` : ''}${more}`,
    preferred: tolerancePercent === null ? null : preferredNote(value, tolerancePercent, quantity).sentence,
    oldText: kind === 'capacitor' ? inOldUnits(value) : null,
  }
}

const percent = (size: number): Tolerance => ({ unit: '%', minus: size, plus: size })
const coefficient = (ppm: number | null): string => ppm === null ? '' : `, ${ppm}${NARROW_SPACE}ppm/K`

const OTHER_NAMES: Readonly<Record<string, Colour>> = { gray: 'grey', purple: 'violet' }

/** Names of colours with anything between them; null where another word is among them. */
export function coloursIn(text: string): readonly Colour[] | null {
  const names = text.toLowerCase().split(/[^a-z]+/).filter(Boolean)
  const colours = names.map(name => OTHER_NAMES[name] ?? COLOURS.find(colour => colour === name))
  return names.length > 0 && colours.every(colour => colour !== undefined) && !/\d/.test(text) ? colours : null
}

function bandReading(reading: ResistorReading, why: string, likelihood: number): MarkingReading {
  return valued({ code: 'colours', kind: 'resistor', value: reading.ohms, tolerance: percent(reading.tolerancePercent), more: coefficient(reading.ppmPerKelvin), why, notes: reading.notes, likelihood })
}

/** Close parts are often made in E24 values too. */
const isUsual = ({ preferred, ohms }: ResistorReading): boolean => preferred.isPreferred || isPreferred(ohms, 'E24')

/** The bands in the order given, and from the other end where that reads too. */
export function hearBands(colours: readonly Colour[]): Heard {
  const read = readBands(colours)
  const turned = read.otherEnd ? [bandReading(read.otherEnd, `${read.otherEnd.bands.join(', ')}: the bands from the other end.`, isUsual(read.otherEnd) ? 2 : 1)] : []
  if (!read.ok) return { readings: turned, refused: read.sentence }
  return heard(bandReading(read.reading, `${colours.join(', ')}: the bands in the order given.`, isUsual(read.reading) ? 3 : 1), ...turned)
}

/** Body, end, dot, and the other end where it has a colour of its own. */
export function hearBodyEndDot([body, end, dot, otherEnd]: readonly Colour[]): Heard {
  if (!body || !end || !dot) return { readings: [], refused: 'Give the colours of the body, the end and the dot.' }
  const read = readBodyEndDot(body, end, dot, otherEnd ?? null)
  return read.ok ? heard(bandReading(read.reading, 'Body, end, dot: the old marking, read in that order.', 3)) : { readings: [], refused: read.sentence }
}

/** The dots of an old capacitor in the order of reading. */
export function hearDots(colours: readonly Colour[]): Heard {
  const read = readMicaDots(colours)
  if (!read.ok) return { readings: [], refused: read.sentence }
  return heard(...read.readings.map(({ farads, tolerancePercent, volts, dielectric, why, notes }, index) => valued({
    code: 'mica-dots', kind: 'capacitor', value: farads, tolerance: tolerancePercent === null ? null : percent(tolerancePercent), why, likelihood: 2 - index, notes,
    more: [volts === null ? '' : `, ${volts}${NARROW_SPACE}V`, dielectric ? `, ${dielectric}` : ''].join(''),
  })))
}

const hearNamed = (text: string, hear: (colours: readonly Colour[]) => Heard): Heard => {
  const colours = coloursIn(text)
  return colours ? hear(colours) : NOTHING
}
/** Names of colours as the bands of a resistor. */
export const hearColours = (text: string): Heard => hearNamed(text, hearBands)
/** Names of colours as the dots of an old capacitor. */
export const hearMicaDots = (text: string): Heard => hearNamed(text, hearDots)

function hearLetters(result: LetterResult, why: string, likelihoodOf: (value: number) => number): Heard {
  if (!result.ok) return { readings: [], refused: result.isOther ? null : result.sentence }
  const { kind, value, tolerance, ppmPerKelvin, notes } = result.reading
  return heard(valued({ code: 'letter', kind, value, tolerance, more: coefficient(ppmPerKelvin), why, notes, likelihood: likelihoodOf(value) }))
}

/** 104K is 104 kΩ in this code, and 100 nF on a capacitor: an odd value is less likely. */
export const hearResistanceCode = (text: string): Heard =>
  hearLetters(readResistanceCode(text), 'The letter stands where the point would be: R ohms, K kilohms, M megohms.', value => isPreferred(value, 'E24') || !/^\d{3}[A-Z]$/i.test(text) ? 3 : 1)
/** 4n7, 47p, 2µ2. */
export const hearCapacitanceCode = (text: string): Heard => hearLetters(readCapacitanceCode(text), 'The letter stands where the point would be: p, n or µ.', () => 3)

const numbered = (code: 'three-digits' | 'old-number', { farads, tolerance, notes, takenIn }: CapacitorReading, likelihood: number): MarkingReading =>
  valued({ code, kind: 'capacitor', value: farads, tolerance, why: code === 'old-number' ? `A number in ${takenIn}.` : 'Two figures, then the power of ten.', notes, likelihood })

/** 104, 104K; a third digit 0 is likelier to be a plain number. */
export function hearThreeDigits(text: string): Heard {
  const read = readThreeDigits(text)
  if (!read.ok) return { readings: [], refused: read.isOther ? null : read.sentence }
  return heard(numbered('three-digits', read.reading, /R/i.test(text) ? 1 : text.trim().charAt(2) === '0' ? 2 : 3))
}

/** How likely a bare number is a capacitance: with a unit or below 1 surely, a round one perhaps. */
function numberLikelihood(text: string, { notes }: CapacitorReading, index: number): number {
  if (/[a-zµμ]/i.test(text) || /^0?[.,]/.test(text) || notes.length === 0) return 3
  return /^\d+0$/.test(text.trim()) && index === 0 ? 2 : 1
}

/** .01 MFD, 250 MMF, 470. */
export const hearOldNumber = (text: string): Heard => heard(...readBareCapacitance(text).map((reading, index) => numbered('old-number', reading, numberLikelihood(text, reading, index))))

/** "4.7 kohm 10 %": a number with its unit. What is in the letter code is left to it. */
export function hearPlainResistance(text: string): Heard {
  const [, number = '', size] = /^(.*?[a-zΩω\u2126])(?:\s*[±+/-]*\s*(\d{1,2}(?:\.\d)?)\s*%)?$/i.exec(text.trim()) ?? []
  const read = parseReading(number, 'resistance')
  if (!read.ok || read.unitAssumed || read.value === 0 || readResistanceCode(number).ok) return NOTHING
  return heard(valued({ code: 'plain', kind: 'resistor', value: read.value, tolerance: size === undefined ? null : percent(Number(size)), why: 'A number with its unit.', likelihood: 3 }))
}

/** 103 as 10 kΩ. */
export function hearResistorDigits(text: string): Heard {
  const ohms = readResistorDigits(text)
  return ohms === null ? NOTHING : heard(valued({ code: 'resistor-digits', kind: 'resistor', value: ohms, tolerance: null, why: 'Figures, then the power of ten in ohms, as on networks and trimmers.', likelihood: 1 }))
}

/** How likely figures of this look are a date; an agreement with the set's years makes it likelier. */
function dateLikelihood(text: string, isDoubtful: boolean, agreesWithSet: boolean | null): number {
  if (isDoubtful) return 0
  return (/^\d{3,4}-\d{3,4}$|^\d{6,8}$/.test(text) ? 2 : /^\d\d\D?\d\d$/.test(text) ? 1.5 : 0.5) + (agreesWithSet ? 1 : 0)
}

/** Date codes, as `readDateCode` reads them. */
export function hearDate(text: string, options: DateCodeOptions): Heard {
  const read = readDateCode(text, options)
  if (!read.ok) return { readings: [], refused: read.isOther ? null : read.sentence }
  return heard(...read.readings.map(({ words, why, isDoubtful, agreesWithSet }): MarkingReading => ({
    code: 'date', kind: 'date', value: null, valueText: words, tolerancePercent: null, words, why, notes: [], preferred: null, oldText: null, likelihood: dateLikelihood(text.trim(), isDoubtful, agreesWithSet),
  })))
}
