/** A frequency or a range of frequencies in one piece of text: "455 kc", "88-108 Mc", "20-20k", "200 to 550 metres". */
import type { Interval } from './coverage'
import { parseDecimal, toNumber } from './decimal'
import { formatFrequencyRange, parseFrequency } from './frequency'
import type { FrequencyProblem, FrequencyReading } from './frequency'
import { FREQUENCY_UNIT_PATTERN, frequencyUnit } from './frequency-units'

export type RangeReading
  = | { ok: true, range: Interval, unitAssumed: boolean }
    | { ok: false, reason: FrequencyProblem | 'backwards', sentence: string }

/** A number as it is written in running text. */
const NUMBER = String.raw`[-\u2212]?(?:\d{1,3}(?:[ \u00A0\u202F]\d{3})+(?!\d)|\d[\d.,]*?)(?:[.,]\d+)?(?:e[+-]?\d+)?`

/** Regular expression source for one frequency, with or without a unit, or DC. */
export const ONE_FREQUENCY = String.raw`(?:DC(?![a-z0-9])|${NUMBER}\s*(?:(?:${FREQUENCY_UNIT_PATTERN})(?![a-z0-9/]))?)`

/** Regular expression source for what stands between the ends of a range. */
export const RANGE_SEPARATOR = String.raw`\s*(?:-|\u2013|\u2014|\u2212|\.\.\.?|\u2026|(?<=\s)to(?=\s)|(?<=\s)and(?=\s))\s*`

const ENDS = new RegExp(`^(${ONE_FREQUENCY})${RANGE_SEPARATOR}(${ONE_FREQUENCY})$`, 'i')

/** The next smaller unit, for "20-20k" and its like. */
const SMALLER: Record<number, string> = { 3: 'Hz', 6: 'kHz', 9: 'MHz', 12: 'GHz' }

function split(text: string): { number: string, unit: string } {
  const parts = /^(.*?\d)\s*((?:[a-z~][a-z/~\s.]*)?)$/i.exec(text.trim().replace(/(\d)e([+-]?\d)/i, '$1E$2'))
  return { number: parts?.[1] ?? text.trim(), unit: parts?.[2]?.trim() ?? '' }
}

function numberIn(text: string): number | null {
  const reading = parseDecimal(text)
  return reading.ok ? toNumber(reading.decimal) : null
}

/**
 * The unit of a range in which neither end has one, by what people mean: 10 000 and above Hz (20-20000), hundreds to
 * thousands kHz (540-1600), a few up to thousands Hz (50-5000), else MHz (88-108). Common practice, no source.
 */
function conventionalUnit(lower: number, upper: number): string {
  if (upper >= 10_000) return 'Hz'
  if (upper > 1000) return lower >= 100 ? 'kHz' : 'Hz'
  return 'MHz'
}

/** The unit of a lower end that has none: the upper end's, or the next smaller where that alone makes sense. */
function inheritedUnit(lower: number, upper: number, unit: string): string {
  const meaning = frequencyUnit(unit)
  if (meaning?.kind !== 'hertz') return unit
  const bareLetter = /^[kmg]$/i.test(unit)
  const smaller = SMALLER[meaning.power]
  return smaller && (lower === upper || (lower > upper && bareLetter)) ? smaller : unit
}

/** One frequency as a range of one hertz. `assume` is the unit of a number without one. */
export function readOne(text: string, assume?: string): RangeReading {
  const reading = parseFrequency(text, { assume })
  return reading.ok ? { ok: true, range: { lowerHz: reading.hz, upperHz: reading.hz }, unitAssumed: false } : reading
}

function readEnds(low: string, high: string, assume: string | undefined): { lower: FrequencyReading, upper: FrequencyReading, unitAssumed: boolean } {
  const lowerParts = split(low)
  const upperParts = split(high)
  const lowerNumber = numberIn(lowerParts.number)
  const upperNumber = numberIn(upperParts.number)
  const read = (text: string, unit: string): FrequencyReading => parseFrequency(text, { assume: unit, allowDc: text === low })
  if (lowerNumber === null || upperNumber === null) {
    const unit = upperParts.unit || assume || 'MHz'
    return { lower: read(low, unit), upper: read(high, unit), unitAssumed: upperParts.unit === '' && assume === undefined }
  }
  if (lowerParts.unit === '' && upperParts.unit === '') {
    const unit = assume ?? conventionalUnit(lowerNumber, upperNumber)
    return { lower: read(low, unit), upper: read(high, unit), unitAssumed: assume === undefined }
  }
  const upperUnit = upperParts.unit || lowerParts.unit
  const lowerUnit = lowerParts.unit || inheritedUnit(lowerNumber, upperNumber, upperUnit)
  return { lower: read(low, lowerUnit), upper: read(high, upperUnit), unitAssumed: false }
}

function isInMetres(text: string): boolean {
  return frequencyUnit(split(text).unit)?.kind === 'metres'
}

/**
 * Reads a range. An end without a unit takes the other's; "20-20k" is 20 Hz to 20 kHz; without any unit it goes by
 * `assume` or else by convention. In metres the larger number is the lower frequency, and either order is right. A
 * range of frequencies that runs backwards is refused.
 */
export function readRange(text: string, assume?: string): RangeReading {
  const ends = ENDS.exec(text.trim())
  const [low, high] = [ends?.[1], ends?.[2]]
  if (low === undefined || high === undefined) {
    return { ok: false, reason: 'not-a-frequency', sentence: `"${text.trim().slice(0, 40)}" is not a range of frequencies. Write it like 88-108 MHz.` }
  }
  const { lower, upper, unitAssumed } = readEnds(low, high, assume)
  if (!lower.ok) return lower
  if (!upper.ok) return upper
  if (upper.hz === 0) return { ok: false, reason: 'zero', sentence: 'A range from DC must end above zero.' }
  const rising = lower.hz <= upper.hz
  if (rising || isInMetres(high)) {
    return { ok: true, range: { lowerHz: Math.min(lower.hz, upper.hz), upperHz: Math.max(lower.hz, upper.hz) }, unitAssumed }
  }
  return {
    ok: false,
    reason: 'backwards',
    sentence: `${text.trim()} runs backwards. Write the lower frequency first: ${formatFrequencyRange(upper.hz, lower.hz)}.`,
  }
}
