/**
 * How a piece drifts while it warms up, from readings of one value against time, and when it has settled. Minutes count
 * from power on. What "settled" means is chosen by who asks; warm-up times are common practice, no source.
 */
import { NARROW_SPACE } from './frequency'

export interface TimedReading { minutes: number, value: number }

export interface DriftPoint extends TimedReading {
  /** How far from the last reading, in per cent of the nominal value, or of the last reading where none is given. */
  driftPercent: number
  /** The same in parts per million. */
  driftPpm: number
}

export type WarmUp
  = | { kind: 'too_few', sentence: string }
    | { kind: 'out_of_order', sentence: string }
    /** Something in the readings can't be reckoned with: not a number, or nought where a share is to be taken of it. */
    | { kind: 'refused', sentence: string }
    /** `totalPercent` from first to last, upwards positive. `settledAt` null: it was still moving when the last reading was taken. */
    | { kind: 'drift', points: DriftPoint[], totalPercent: number, settledAt: number | null, sentence: string }

const LEAST_READINGS = 3
/** A piece counts as settled when it stays within this of where it ends, per cent, unless told otherwise. */
export const SETTLED_WITHIN_PERCENT = 0.1
/** Shares smaller than this many per cent are written in parts per million. */
const IN_PPM_BELOW = 0.01

/** A number as people write it: never with a power of ten, rounded to two figures. */
const figure = (size: number): string => size >= 100 ? String(Math.round(size)) : String(Number(size.toPrecision(2)))

/** A share to two figures, in ppm where a per cent is too coarse: "−0.99 %", "12 ppm". Below a hundredth of a ppm it is nought. */
function share(value: number): string {
  const size = Math.abs(value)
  const sign = value < 0 ? '\u2212' : ''
  if (size < 1e-6) return `0${NARROW_SPACE}%`
  return size < IN_PPM_BELOW ? `${sign}${figure(size * 1e4)}${NARROW_SPACE}ppm` : `${sign}${figure(size)}${NARROW_SPACE}%`
}

const minutesInWords = (minutes: number): string => `${Number(minutes.toFixed(1))} ${Number(minutes.toFixed(1)) === 1 ? 'minute' : 'minutes'}`

type Problem = Extract<WarmUp, { kind: 'too_few' | 'out_of_order' | 'refused' }>

function orderProblem(readings: readonly TimedReading[]): Problem | null {
  if (readings.some(({ minutes }) => minutes < 0)) return { kind: 'out_of_order', sentence: 'Minutes count from power on, and none comes before it. Correct the times below nought.' }
  const bad = readings.find(({ minutes }, index) => index > 0 && minutes <= (readings[index - 1]?.minutes ?? 0))
  if (!bad) return null
  const isTwice = readings.filter(({ minutes }) => minutes === bad.minutes).length > 1
  return {
    kind: 'out_of_order',
    sentence: isTwice
      ? `There are two readings at ${minutesInWords(bad.minutes)}. Keep one of them, or correct its time.`
      : `The reading at ${minutesInWords(bad.minutes)} comes after a later one. The minutes must rise from one reading to the next.`,
  }
}

function problemOf(readings: readonly TimedReading[], base: number, within: number): Problem | null {
  if (readings.some(({ minutes, value }) => !Number.isFinite(minutes) || !Number.isFinite(value))) return { kind: 'refused', sentence: 'Every reading needs its minutes and its value as numbers.' }
  if (readings.length < LEAST_READINGS) return { kind: 'too_few', sentence: `Take at least ${LEAST_READINGS} readings, minutes apart, to see it drift.` }
  if (!(within > 0) || !Number.isFinite(within)) return { kind: 'refused', sentence: 'Say within how many per cent it counts as settled: more than nought.' }
  if (base === 0 || !Number.isFinite(base)) return { kind: 'refused', sentence: 'A drift in per cent can’t be taken of nought.' }
  return orderProblem(readings)
}

/**
 * Drift relative to the last reading, in per cent of `nominal` (of the last reading without one). It has settled at the first
 * reading from which on every reading stays within ±`within` per cent of the last; the last reading alone proves nothing, so
 * one more must follow, and while the last two still differ by more it is not settled.
 */
export function warmUpOf(readings: readonly TimedReading[], within = SETTLED_WITHIN_PERCENT, nominal: number | null = null): WarmUp {
  const last = readings.at(-1)?.value ?? 0
  const base = Math.abs(nominal ?? last)
  const problem = problemOf(readings, readings.length < LEAST_READINGS ? 1 : base, within)
  if (problem) return problem
  const points = readings.map(({ minutes, value }): DriftPoint => {
    const driftPercent = (value - last) * 100 / base
    return { minutes, value, driftPercent, driftPpm: driftPercent * 1e4 }
  })
  const totalPercent = 0 - (points[0]?.driftPercent ?? 0)
  const lastAway = points.findLastIndex(({ driftPercent }) => Math.abs(driftPercent) > within * (1 + 1e-9))
  const settled = lastAway + 1 < points.length - 1 ? points[lastAway + 1] : undefined
  const settledAt = settled?.minutes ?? null
  return { kind: 'drift', points, totalPercent, settledAt, sentence: inWords(points, totalPercent, settledAt, within) }
}

function inWords(points: readonly DriftPoint[], totalPercent: number, settledAt: number | null, within: number): string {
  const [start, end] = [points[0]?.minutes ?? 0, points.at(-1)?.minutes ?? 0]
  const moved = `It moved ${share(totalPercent)} in ${minutesInWords(end - start)}.`
  if (settledAt === null) return `${moved} It had not settled to ±${share(within)} after ${minutesInWords(end)}: leave it longer, or take readings further apart.`
  return settledAt === start
    ? `${moved} It stayed within ±${share(within)} from the first reading on.`
    : `${moved} From ${minutesInWords(settledAt)} on it stayed within ±${share(within)}: warm it up at least so long before measuring.`
}
