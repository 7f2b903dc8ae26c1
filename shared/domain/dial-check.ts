/**
 * Checking a dial against a frequency meter: where to check, how far off it reads, and the verdict.
 * That a service-grade generator is checked low, middle and high on each band, and that 2 % of the
 * setting is the usual tolerance, is common practice without a published source.
 */
import type { Interval } from './coverage'
import { nearestMark } from './log-scale'

export const DIAL_POSITIONS = ['low', 'middle', 'high'] as const
export type DialPosition = (typeof DIAL_POSITIONS)[number]

export const DIAL_POSITION_LABELS: Record<DialPosition, string> = { low: 'Low', middle: 'Middle', high: 'High' }

/** One setting of the dial to be read. */
export interface DialCheckpoint {
  position: DialPosition
  settingHz: number
}

/** How the verdict is reached; printed with every sheet. */
export const DIAL_DECISION_RULE = 'Simple acceptance (ILAC-G8:09/2019, guard band w = 0): in when the error is no more than the tolerance, the limit itself included. The uncertainty of the instrument is not taken off.'

/** The figures within which a mark is looked for; a dial has no finer ones. */
const MOST_FIGURES = 15

/**
 * The middle of a band in Hz: the geometric mean of its edges, rounded to a mark the dial is likely to carry.
 *
 * The rule: the nearest frequency of two significant figures (1.0, 1.1 … 9.9 and their tens) that lies between the
 * edges; if a band is so narrow that none does, of three figures, and so on. A spot frequency is its own middle.
 * A band from DC has no geometric mean: half its upper edge is taken.
 */
export function middleOfBand(lowerHz: number, upperHz: number): number {
  if (upperHz - lowerHz < 2) return upperHz
  const mean = lowerHz > 0 ? Math.sqrt(lowerHz) * Math.sqrt(upperHz) : upperHz / 2
  for (let figures = 2; figures <= MOST_FIGURES; figures += 1) {
    const mark = nearestMark(mean, figures)
    if (mark > lowerHz && mark < upperHz) return mark
  }
  return Math.round((lowerHz + upperHz) / 2)
}

/**
 * The settings at which a band is checked: its lower edge, its middle and its upper edge. A band from DC is checked at a
 * tenth of its upper edge instead of its lower; a spot frequency, once. No setting is given twice, none is 0.
 */
export function dialCheckpoints(band: Interval): DialCheckpoint[] {
  if (band.lowerHz === band.upperHz) return [{ position: 'middle', settingHz: band.upperHz }]
  const points: DialCheckpoint[] = [
    { position: 'low', settingHz: band.lowerHz > 0 ? band.lowerHz : nearestMark(band.upperHz / 10) },
    { position: 'middle', settingHz: middleOfBand(band.lowerHz, band.upperHz) },
    { position: 'high', settingHz: band.upperHz },
  ]
  return points.filter((point, index) =>
    point.settingHz > 0 && points.findLastIndex(other => other.settingHz === point.settingHz) === index)
}

/** The error of a reading in per cent of the setting (both in Hz), unrounded. Throws a RangeError for a setting not above 0. */
export function errorPercent(settingHz: number, readingHz: number): number {
  if (!(settingHz > 0)) throw new RangeError('A setting must be above zero to take a per cent of it')
  return (readingHz - settingHz) * 100 / settingHz
}

export interface DialVerdict {
  errorPercent: number
  within: boolean
  limitLowHz: number
  limitHighHz: number
}

/** Room for the last bit of binary arithmetic, so that a reading exactly on its limit counts as on it. */
const ROUNDING = 1 + 1e-12

/**
 * Judges a reading of a dial by `DIAL_DECISION_RULE`: within when it differs from the setting by no more than the
 * tolerance, in per cent of the setting. Hz may be fractional.
 */
export function judgeDial(settingHz: number, readingHz: number, tolerancePercent: number): DialVerdict {
  const error = errorPercent(settingHz, readingHz)
  return {
    errorPercent: error,
    within: Math.abs(readingHz - settingHz) * 100 <= tolerancePercent * settingHz * ROUNDING,
    limitLowHz: settingHz * (100 - tolerancePercent) / 100,
    limitHighHz: settingHz * (100 + tolerancePercent) / 100,
  }
}

/**
 * An error as it is shown: signed, two decimals, "−1.80 %". With the tolerance given, as many decimals more as it takes
 * for what is shown not to contradict the verdict: 2.004 % is out of 2 % and is not shown as 2.00 %.
 */
export function formatErrorPercent(error: number, tolerancePercent?: number): string {
  const size = Math.abs(error)
  const outside = tolerancePercent !== undefined && size > tolerancePercent * ROUNDING
  let decimals = 2
  while (outside && decimals < 9 && Number(size.toFixed(decimals)) <= tolerancePercent) decimals += 1
  const digits = size.toFixed(decimals)
  const sign = Number(digits) === 0 ? '' : error < 0 ? '\u2212' : '+'
  return `${sign}${digits}\u202F%`
}
