/**
 * The dots of old moulded mica and paper capacitors, as possible readings: makers used several codes, and the charts contradict each other.
 *
 * Six dots are read with the arrows pointing right: the upper row left to right (type or first figure, figure, figure), then the lower
 * row right to left (multiplier, tolerance, characteristic). Sources: US Army ordnance subcourse OD1647 for the order, the type dot and
 * the value; a chart of moulded-mica codes for three and five dots (500 V and ±20 % where no dot says otherwise); the RMA code of three
 * figures in the upper row from memory.
 */
import { NARROW_SPACE } from '../frequency'
import type { Colour } from './resistor-colours'
import { COLOUR_MEANINGS } from './resistor-colours'

export interface MicaReading {
  /** Which code it would be. */
  code: 'type-dot' | 'three-figures' | 'three-dots' | 'five-dots'
  /** What it is made of, where a dot says so. */
  dielectric: 'mica' | 'paper' | null
  farads: number
  /** ± per cent; null where a dot says it, and the charts contradict each other on the dot. */
  tolerancePercent: number | null
  /** Rated voltage; null where a dot says it or nothing does. */
  volts: number | null
  why: string
  notes: readonly string[]
}
export type MicaResult = { ok: true, readings: readonly MicaReading[] } | { ok: false, sentence: string }

/** Said beside every result. */
export const MICA_NOT_COVERED = 'Not read: the dots for tolerance, characteristic and voltage, on which the charts contradict each other, a first dot of the body’s own colour (paper), and capacitors with nine dots or bands. Measure the capacitor before you rely on the dots.'

/** The dots' value in farads: figures, then the multiplier; null where a colour stands for no figure. */
function valueOf(figures: readonly (Colour | undefined)[], multiplier: Colour | undefined): number | null {
  const digits = figures.map(colour => colour && COLOUR_MEANINGS[colour].figure)
  if (!multiplier || !digits[0] || digits.includes(undefined)) return null
  return Number(`${digits.join('')}e${COLOUR_MEANINGS[multiplier].power - 12}`)
}

const TYPES: Partial<Record<Colour, { dielectric: 'mica' | 'paper', why: string }>> = {
  black: { dielectric: 'mica', why: 'The first dot is black: the joint-services code for mica, with two figures.' },
  white: { dielectric: 'mica', why: 'The first dot is white: a later code for mica, with two figures.' },
  silver: { dielectric: 'paper', why: 'The first dot is silver: the joint-services code for paper, with two figures.' },
}

/** Six dots in the order of reading: upper row left to right, lower row right to left. */
function sixDots(dots: readonly Colour[]): MicaReading[] {
  const [first, second, third, multiplier] = dots
  const type = first && TYPES[first]
  const typed = type ? valueOf([second, third], multiplier) : null
  const plain = valueOf([first, second, third], multiplier)
  const unread = { tolerancePercent: null, volts: null, notes: [] }
  return [
    ...(type && typed !== null ? [{ code: 'type-dot' as const, farads: typed, ...type, ...unread }] : []),
    ...(plain === null ? [] : [{ code: 'three-figures' as const, dielectric: null, farads: plain, ...unread, why: 'The RMA code, with three figures in the upper row.', notes: ['This code could not be checked against a published chart.'] }]),
  ]
}

/** Three dots or five in one row; what the fourth and fifth say is not read. */
function oneRow(dots: readonly Colour[]): MicaReading[] {
  const [first, second, multiplier] = dots
  const farads = valueOf([first, second], multiplier)
  if (farads === null) return []
  if (dots.length === 3) return [{ code: 'three-dots', dielectric: null, farads, tolerancePercent: 20, volts: 500, why: `Two figures and a multiplier; without further dots it is ±20${NARROW_SPACE}% and 500${NARROW_SPACE}V.`, notes: [] }]
  return [{ code: 'five-dots', dielectric: null, farads, tolerancePercent: null, volts: null, why: 'Two figures, a multiplier, the voltage and the tolerance.', notes: [] }]
}

/**
 * Reads three, five or six dots, in the order of reading, as every value they may stand for in farads, the likelier first. Refused
 * with a sentence: another number of dots, a first figure of 0, a colour that is no figure where one must stand.
 */
export function readMicaDots(dots: readonly Colour[]): MicaResult {
  if (![3, 5, 6].includes(dots.length)) return { ok: false, sentence: `Three, five and six dots can be read, not ${dots.length}.` }
  const readings = dots.length === 6 ? sixDots(dots) : oneRow(dots)
  if (readings.length > 0) return { ok: true, readings }
  return { ok: false, sentence: 'These dots give no value: a first figure is never black, and gold and silver are no figures. Hold the capacitor so that the arrows or the maker’s name read from left to right, and try again.' }
}
