/**
 * The log-scaled ruler: where a frequency stands on it, its ticks, and the marks a dial would carry.
 * Pure numbers, used by drawings in the browser and on paper alike.
 */
import { NAMED_BANDS } from './band-names'
import { NARROW_SPACE } from './frequency'

/** A tick of the ruler: its frequency in Hz, its place from 0 (left) to 1 (right), and a label on decades only. */
export interface Tick {
  hz: number
  at: number
  label: string | null
}

/** The part of a named band that lies on the ruler, as places from 0 to 1. */
export interface BandSpan {
  name: string
  from: number
  to: number
  lowerHz: number
  upperHz: number
}

export interface LogScale {
  /** Left edge in Hz, a power of ten. */
  lowerHz: number
  /** Right edge in Hz, a power of ten. */
  upperHz: number
  /** Place of a frequency in Hz from 0 to 1; DC stands at the left edge, what lies outside at the nearer edge. */
  position: (hz: number) => number
  /** The frequency in Hz at a place, snapped to the nearest mark of two significant figures. */
  frequencyAt: (fraction: number) => number
  /** The decades, labelled. */
  decades: Tick[]
  /** The marks 2 … 9 between decades, without labels. */
  minorTicks: Tick[]
  /** The named bands, clipped to the ruler. */
  bands: BandSpan[]
}

const DECADE_SUFFIXES = ['', 'k', 'M', 'G', 'T']

/** 10^power exactly: Math.pow is not exact for every power. */
function tenTo(power: number): number {
  return Number(`1e${power}`)
}

/** The power of ten of the first digit of a positive number. */
function powerOf(value: number): number {
  return Number(value.toExponential().split('e')[1])
}

/** A decade's label: "10", "100", "1 k" … "1 G". */
export function decadeLabel(hz: number): string {
  const power = powerOf(hz)
  const step = Math.min(Math.max(Math.floor(power / 3), 0), DECADE_SUFFIXES.length - 1)
  const suffix = DECADE_SUFFIXES[step] ?? ''
  const digits = String(tenTo(power - 3 * step))
  return suffix ? `${digits}${NARROW_SPACE}${suffix}` : digits
}

/**
 * The nearest frequency in Hz that has at most `figures` significant figures: 178 885 Hz is 180 kHz to two.
 * Whole hertz; 0 stays 0.
 */
export function nearestMark(hz: number, figures = 2): number {
  if (!(hz > 0)) return 0
  return Math.max(1, Math.round(Number(hz.toExponential(Math.max(figures, 1) - 1))))
}

/** The next mark of two significant figures above or below, in whole hertz, never below 1 Hz. For steps by keyboard. */
export function nextMark(hz: number, direction: 'up' | 'down'): number {
  const from = Math.max(hz, 1)
  const size = tenTo(Math.max(powerOf(from) - 1, 0))
  if (direction === 'up') return (Math.floor(from / size) + 1) * size
  const below = (Math.ceil(from / size) - 1) * size
  const finer = tenTo(Math.max(powerOf(from) - 2, 0))
  return Math.max(1, below < size * 10 ? (Math.ceil(from / finer) - 1) * finer : below)
}

/**
 * The ruler from the lowest to the highest frequency in Hz, widened to whole decades (at least one).
 * DC has no place on a log scale: a lower end of 0 takes the left edge at 10 Hz or a decade below the upper end.
 */
export function logScale(lowestHz: number, highestHz: number): LogScale {
  const highest = Math.max(highestHz, 1)
  const lowest = lowestHz > 0 ? Math.min(lowestHz, highest) : Math.min(10, highest)
  const first = powerOf(lowest)
  const top = powerOf(highest)
  const last = Math.max(highest > tenTo(top) ? top + 1 : top, first + 1)
  const position = (hz: number): number =>
    hz > 0 ? Math.min(1, Math.max(0, (Math.log10(hz) - first) / (last - first))) : 0
  const frequencyAt = (fraction: number): number => {
    const held = Math.min(1, Math.max(0, fraction))
    return nearestMark(10 ** (first + held * (last - first)))
  }
  const powers = Array.from({ length: last - first + 1 }, (_, index) => first + index)
  const decades = powers.map(power => ({ hz: tenTo(power), at: position(tenTo(power)), label: decadeLabel(tenTo(power)) }))
  const minorTicks = powers.slice(0, -1).flatMap(power => [2, 3, 4, 5, 6, 7, 8, 9].map((digit) => {
    const hz = digit * tenTo(power)
    return { hz, at: position(hz), label: null }
  }))
  const lowerHz = tenTo(first)
  const upperHz = tenTo(last)
  const bands = NAMED_BANDS
    .filter(band => band.lowerHz < upperHz && band.upperHz > lowerHz)
    .map(band => ({
      name: band.name,
      from: position(band.lowerHz),
      to: position(band.upperHz),
      lowerHz: Math.max(band.lowerHz, lowerHz),
      upperHz: Math.min(band.upperHz, upperHz),
    }))
  return { lowerHz, upperHz, position, frequencyAt, decades, minorTicks, bands }
}

/** The ruler for everything in a list of intervals in Hz; 10 Hz to 1 GHz when the list is empty. */
export function logScaleFor(intervals: readonly { lowerHz: number, upperHz: number }[]): LogScale {
  const uppers = intervals.map(interval => interval.upperHz).filter(hz => hz > 0)
  if (uppers.length === 0) return logScale(10, 1e9)
  const lowers = intervals.map(interval => interval.lowerHz).filter(hz => hz > 0)
  const highest = uppers.reduce((a, b) => Math.max(a, b))
  return logScale(lowers.reduce((a, b) => Math.min(a, b), Math.min(highest, lowers.length > 0 ? highest : 10)), highest)
}
