/**
 * How a piece drifts while it warms up, from readings of one value against time, and when it has settled. Minutes count
 * from power on. What "settled" means is chosen by who asks; warm-up times are common practice, no source.
 */
export interface TimedReading { minutes: number, value: number }

export interface DriftPoint extends TimedReading {
  /** Per cent of the last reading. */
  driftPercent: number
}

export type WarmUp
  = | { kind: 'too_few', sentence: string }
    | { kind: 'out_of_order', sentence: string }
    /** `settledAt` null: it was still moving when the last reading was taken. */
    | { kind: 'drift', points: DriftPoint[], totalPercent: number, settledAt: number | null, sentence: string }

const LEAST_READINGS = 3
/** A piece counts as settled when it stays within this of where it ends, per cent, unless told otherwise. */
export const SETTLED_WITHIN_PERCENT = 0.1

const percent = (value: number): string => `${value < 0 ? '\u2212' : ''}${Number(Math.abs(value).toPrecision(2))}\u202F%`

/**
 * Drift relative to the last reading. It has settled at the first reading from which on every reading stays within
 * ±`within` per cent of the last one; the last reading alone proves nothing, so it must be followed by at least one more.
 */
export function warmUpOf(readings: readonly TimedReading[], within = SETTLED_WITHIN_PERCENT): WarmUp {
  if (readings.length < LEAST_READINGS) return { kind: 'too_few', sentence: `Take at least ${LEAST_READINGS} readings, minutes apart, to see it drift.` }
  const isOrdered = readings.every((reading, index) => index === 0 || reading.minutes > (readings[index - 1]?.minutes ?? 0))
  if (!isOrdered) return { kind: 'out_of_order', sentence: 'The minutes must rise from one reading to the next. Put them in order, each once.' }
  const last = readings.at(-1)?.value ?? 0
  if (last === 0) return { kind: 'too_few', sentence: 'A drift in per cent can’t be taken of nought.' }
  const points = readings.map(({ minutes, value }): DriftPoint => ({ minutes, value, driftPercent: (value - last) * 100 / Math.abs(last) }))
  const totalPercent = -(points[0]?.driftPercent ?? 0)
  const lastAway = points.findLastIndex(({ driftPercent }) => Math.abs(driftPercent) > within)
  const settled = points[lastAway + 1]
  const settledAt = settled && lastAway + 1 < points.length - 1 ? settled.minutes : null
  return { kind: 'drift', points, totalPercent, settledAt, sentence: inWords(points, totalPercent, settledAt, within) }
}

function inWords(points: readonly DriftPoint[], totalPercent: number, settledAt: number | null, within: number): string {
  const end = points.at(-1)?.minutes ?? 0
  const moved = `It moved ${percent(totalPercent)} in ${end - (points[0]?.minutes ?? 0)} minutes.`
  if (settledAt === null) return `${moved} It had not settled to ±${percent(within)} after ${end} minutes: leave it longer, or take readings further apart.`
  return settledAt === points[0]?.minutes
    ? `${moved} It stayed within ±${percent(within)} from the first reading on.`
    : `${moved} From ${settledAt} minutes on it stayed within ±${percent(within)}: warm it up at least so long before measuring.`
}
