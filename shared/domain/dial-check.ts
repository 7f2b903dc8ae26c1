/**
 * Checking a dial against a frequency meter: where to check, and how far off it reads.
 * That a service-grade generator is checked low, middle and high on each band, and that 2 % of the
 * setting is the usual tolerance, is common practice without a published source.
 */
import type { Checkpoint } from './checkpoint'
import type { Interval } from './coverage'
import type { CoverageFunction } from './functions'
import { nearestMark } from './log-scale'

export const DIAL_POSITIONS = ['low', 'middle', 'high'] as const
export type DialPosition = (typeof DIAL_POSITIONS)[number]

export const DIAL_POSITION_LABELS: Record<DialPosition, string> = { low: 'Low', middle: 'Middle', high: 'High' }

/** One setting of the dial to be read. */
export interface DialCheckpoint {
  position: DialPosition
  settingHz: number
}

/** The figures within which a mark is looked for; a dial has no finer ones. */
const MOST_FIGURES = 15

/** The mark with the fewest figures nearest to a frequency in Hz that lies between two edges, neither included; null where none does. */
export function markWithin(hz: number, lowerHz: number, upperHz: number): number | null {
  for (let figures = 2; figures <= MOST_FIGURES; figures += 1) {
    const mark = nearestMark(hz, figures)
    if (mark > lowerHz && mark < upperHz) return mark
  }
  return null
}

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
  return markWithin(mean, lowerHz, upperHz) ?? Math.round((lowerHz + upperHz) / 2)
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

/** Room for the last bit of binary arithmetic, so that an error exactly on the tolerance counts as within it. */
const ROUNDING = 1 + 1e-12

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

/** What a band tells of its dial. */
export interface DialBand extends Interval { label: string, function: CoverageFunction, dialTolerancePercent: number | null }

/** The functions that a dial sets; what a piece measures or passes is not set by a dial. */
const SET_BY_DIAL: readonly CoverageFunction[] = ['generates', 'tunes', 'transmits']

/** Whether a dial sets the frequency of a band. */
export const isSetByDial = (band: Pick<DialBand, 'function'>): boolean => SET_BY_DIAL.includes(band.function)

/** A setting of the dial as a checkpoint: read in hertz, within ± per cent of the setting. */
export function dialCheckpoint(bandLabel: string, settingHz: number, tolerancePercent: number): Checkpoint {
  return {
    section: 'dial', bandLabel, label: '', quantity: 'frequency', atHz: settingHz, nominal: settingHz, span: null,
    limit: { kind: 'percent_of_setting', amount: tolerancePercent },
  }
}

/**
 * The dial checkpoints of a model, band by band: low, middle and high of each band that a dial sets and for which a
 * tolerance is known (the band's own, else the model's). Without a tolerance there is nothing to judge by, so none.
 */
export function modelCheckpoints(bands: readonly DialBand[], modelTolerancePercent: number | null): Checkpoint[] {
  return bands.flatMap((band) => {
    const tolerancePercent = band.dialTolerancePercent ?? modelTolerancePercent
    if (tolerancePercent === null || !isSetByDial(band)) return []
    return dialCheckpoints(band).map(({ settingHz }) => dialCheckpoint(band.label, settingHz, tolerancePercent))
  })
}
