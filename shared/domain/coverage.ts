/**
 * Coverage: the frequencies that a unit's bands reach, as disjoint intervals of whole hertz, kept per function.
 * Intervals include both ends. 100–320 kHz and 320 001 Hz–1 MHz join, because no whole hertz lies between;
 * where one does, it is a gap, and a gap is not covered.
 */
import { FUNCTIONS, FUNCTION_LABELS } from './functions'
import type { CoverageFunction } from './functions'
import { formatFrequency, formatFrequencyRange } from './frequency'

export { FUNCTIONS, FUNCTION_LABELS }
export type { CoverageFunction }

/** Whole hertz, both ends included. 0 is DC; a spot frequency has both ends the same. */
export interface Interval {
  lowerHz: number
  upperHz: number
}

/** What coverage needs to know of a band. */
export interface CoverageBand extends Interval {
  function: CoverageFunction
}

export type Coverage = Record<CoverageFunction, Interval[]>

/** Whether both ends are whole hertz from 0 up and in order. */
export function isInterval(interval: Interval): boolean {
  const { lowerHz, upperHz } = interval
  return Number.isSafeInteger(lowerHz) && Number.isSafeInteger(upperHz) && lowerHz >= 0 && lowerHz <= upperHz
}

/** The union as disjoint intervals in rising order; neighbours without a whole hertz between them are joined. */
export function unionOf(intervals: readonly Interval[]): Interval[] {
  const union: Interval[] = []
  const rising = [...intervals].sort((a, b) => a.lowerHz - b.lowerHz)
  for (const { lowerHz, upperHz } of rising) {
    const last = union.at(-1)
    if (last && lowerHz <= last.upperHz + 1) last.upperHz = Math.max(last.upperHz, upperHz)
    else union.push({ lowerHz, upperHz })
  }
  return union
}

/** The coverage of a set of bands, each function by itself. */
export function coverageOf(bands: readonly CoverageBand[]): Coverage {
  const of = (wanted: CoverageFunction): Interval[] => unionOf(bands.filter(band => band.function === wanted))
  return {
    generates: of('generates'),
    tunes: of('tunes'),
    measures: of('measures'),
    passes: of('passes'),
    transmits: of('transmits'),
  }
}

/** Whether every whole hertz of `range` is covered. */
export function covers(intervals: readonly Interval[], range: Interval): boolean {
  return unionOf(intervals).some(interval => interval.lowerHz <= range.lowerHz && interval.upperHz >= range.upperHz)
}

/** Whether any whole hertz of `range` is covered. */
export function overlaps(intervals: readonly Interval[], range: Interval): boolean {
  return intervals.some(interval => interval.lowerHz <= range.upperHz && interval.upperHz >= range.lowerHz)
}

/** The parts of `range` that are not covered, in rising order, including what is missing at either end. */
export function gapsWithin(intervals: readonly Interval[], range: Interval): Interval[] {
  const gaps: Interval[] = []
  let next = range.lowerHz
  for (const { lowerHz, upperHz } of unionOf(intervals)) {
    if (upperHz < next) continue
    if (lowerHz > range.upperHz) break
    if (lowerHz > next) gaps.push({ lowerHz: next, upperHz: lowerHz - 1 })
    next = upperHz + 1
  }
  if (next <= range.upperHz) gaps.push({ lowerHz: next, upperHz: range.upperHz })
  return gaps
}

/** A gap between two bands, named by the edges of what is covered on either side. */
function nameGap(gap: Interval): string {
  return formatFrequencyRange(gap.lowerHz - 1, gap.upperHz + 1)
}

function missesAltogether(union: readonly Interval[], range: Interval): string {
  const below = union.filter(interval => interval.upperHz < range.lowerHz).at(-1)
  const above = union.find(interval => interval.lowerHz > range.upperHz)
  const nearest = [
    below ? `stops at ${formatFrequency(below.upperHz)}` : null,
    above ? `starts${below ? ' again' : ''} at ${formatFrequency(above.lowerHz)}` : null,
  ].filter(part => part !== null)
  return nearest.length > 0 ? nearest.join(' · ') : 'no coverage recorded'
}

/**
 * How a coverage misses a range, in words, or null when it covers it wholly:
 * "starts at 100 kHz, 50 kHz short · gap 300–400 kHz · stops at 22 MHz, 8 MHz short".
 */
export function shortfall(intervals: readonly Interval[], range: Interval): string | null {
  const union = unionOf(intervals)
  const gaps = gapsWithin(union, range)
  if (gaps.length === 0) return null
  if (!overlaps(union, range)) return missesAltogether(union, range)
  const says = gaps.map((gap) => {
    if (gap.lowerHz === range.lowerHz) {
      const start = gap.upperHz + 1
      return `starts at ${formatFrequency(start)}, ${formatFrequency(start - range.lowerHz)} short`
    }
    if (gap.upperHz === range.upperHz) {
      const stop = gap.lowerHz - 1
      return `stops at ${formatFrequency(stop)}, ${formatFrequency(range.upperHz - stop)} short`
    }
    return `gap ${nameGap(gap)}`
  })
  return says.sort((a, b) => Number(a.startsWith('gap')) - Number(b.startsWith('gap'))).join(' · ')
}

/** PostgreSQL's text for an `int8multirange`, in its canonical half-open form: `{[100000,320001)}`. */
export function formatMultirange(intervals: readonly Interval[]): string {
  return `{${unionOf(intervals).map(({ lowerHz, upperHz }) => `[${lowerHz},${upperHz + 1})`).join(',')}}`
}

/**
 * Reads PostgreSQL's text for an `int8multirange`. Throws a RangeError for anything else, and for a range
 * without an end, which a coverage never has.
 */
export function parseMultirange(text: string): Interval[] {
  const range = String.raw`[[(]\s*\d+\s*,\s*\d+\s*[\])]`
  const whole = new RegExp(String.raw`^\{\s*(?:(?:${range}|empty)(?:\s*,\s*(?:${range}|empty))*)?\s*\}$`)
  if (!whole.test(text.trim())) throw new RangeError(`${text.slice(0, 80)} is not a multirange of whole hertz`)
  const ranges = [...text.matchAll(/([[(])\s*(\d+)\s*,\s*(\d+)\s*([\])])/g)].map(([, opens, lower, upper, closes]) => ({
    lowerHz: Number(lower) + (opens === '(' ? 1 : 0),
    upperHz: Number(upper) - (closes === ')' ? 1 : 0),
  }))
  return unionOf(ranges.filter(({ lowerHz, upperHz }) => lowerHz <= upperHz))
}

const NUMBER_WORDS = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten', 'eleven', 'twelve']

function countBands(count: number): string {
  return `${NUMBER_WORDS[count] ?? count} ${count === 1 ? 'band' : 'bands'}`
}

function describeGaps(gaps: readonly Interval[]): string {
  if (gaps.length === 0) return 'no gaps'
  if (gaps.length > 3) return `${NUMBER_WORDS[gaps.length] ?? gaps.length} gaps`
  const named = gaps.map(nameGap)
  const last = named.pop() ?? ''
  return named.length === 0 ? `a gap at ${last}` : `gaps at ${named.join(', ')} and ${last}`
}

function describeOne(bands: readonly Interval[]): string {
  const union = unionOf(bands)
  const first = union[0]
  const last = union.at(-1)
  if (!first || !last) return 'No coverage recorded'
  if (bands.every(band => band.lowerHz === band.upperHz)) {
    return union.length === 1 && first.lowerHz === first.upperHz
      ? `${formatFrequency(first.lowerHz)} only`
      : `${bands.length} spot frequencies from ${formatFrequency(first.lowerHz)} to ${formatFrequency(last.upperHz)}`
  }
  const span = { lowerHz: first.lowerHz, upperHz: last.upperHz }
  const words = `${formatFrequency(span.lowerHz)} to ${formatFrequency(span.upperHz)} in ${countBands(bands.length)}`
  return bands.length === 1 ? words : `${words}, ${describeGaps(gapsWithin(union, span))}`
}

/**
 * The coverage of a set of bands in plain words: "100 kHz to 32 MHz in five bands, no gaps".
 * With more than one function each is named: "Generates …; measures …".
 */
export function describeCoverage(bands: readonly CoverageBand[]): string {
  const used = FUNCTIONS.filter(name => bands.some(band => band.function === name))
  if (used.length < 2) return describeOne(bands)
  return used
    .map((name, index) => {
      const label = FUNCTION_LABELS[name]
      return `${index === 0 ? label : label.toLowerCase()} ${describeOne(bands.filter(band => band.function === name))}`
    })
    .join('; ')
}

/** Every band by name and edges, for those who can't see the drawing: "Generates: A 100–320 kHz, B 320 kHz–1 MHz." */
export function describeBands(bands: readonly (CoverageBand & { label: string })[]): string {
  return FUNCTIONS
    .map(name => bands.filter(band => band.function === name))
    .flatMap(([first, ...others]) => first === undefined
      ? []
      : [`${FUNCTION_LABELS[first.function]}: ${[first, ...others].map(band => `${band.label} ${formatFrequencyRange(band.lowerHz, band.upperHz)}`).join(', ')}.`])
    .join(' ')
}
