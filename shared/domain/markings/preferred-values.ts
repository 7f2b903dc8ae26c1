/**
 * Preferred values of resistors and capacitors: IEC 60063. E3 to E24 are a published list (eight of its values are not what
 * rounding gives); E48, E96 and E192 are 10^(n/N) rounded to three figures, but for 9.20 in E192, where rounding gives 9.19.
 */
import { formatAmount } from '../amount'
import { NARROW_SPACE } from '../frequency'

/** The series of IEC 60063, coarsest first. */
export const SERIES = ['E3', 'E6', 'E12', 'E24', 'E48', 'E96', 'E192'] as const
export type Series = (typeof SERIES)[number]

/** The lowest and highest values that are compared, in ohms or farads: far outside what is made. */
const LEAST = 1e-18
const MOST = 1e18

const E24 = [10, 11, 12, 13, 15, 16, 18, 20, 22, 24, 27, 30, 33, 36, 39, 43, 47, 51, 56, 62, 68, 75, 82, 91] as const

const every = (step: number): number[] => E24.filter((_, index) => index % step === 0)
/** IEC 60063 has 920 in E192 where rounding gives 919. */
const byRounding = (count: number): number[] =>
  Array.from({ length: count }, (_, n) => Math.round(100 * 10 ** (n / count))).map(value => value === 919 ? 920 : value)

/** One decade of each series: two figures (10 to 91) as far as E24, three (100 to 988) from E48 on. */
export const SERIES_VALUES: Readonly<Record<Series, readonly number[]>> = {
  E3: every(8), E6: every(4), E12: every(2), E24, E48: byRounding(48), E96: byRounding(96), E192: byRounding(192),
}

const same = (a: number, b: number): boolean => Math.abs(a - b) <= 1e-9 * Math.abs(b)

export interface NearestPreferred {
  /** The preferred value, in the unit of the value asked for. */
  value: number
  /** How far it is from the value asked for, in per cent of that value: above is positive. */
  errorPercent: number
}

/** The value of a series nearest to another, in the same unit. Null for nought, negatives and what is no size of a part. */
export function nearestPreferred(value: number, series: Series): NearestPreferred | null {
  if (!(value >= LEAST && value <= MOST)) return null
  const figures = series === 'E48' || series === 'E96' || series === 'E192' ? 2 : 1
  const decade = Math.floor(Math.log10(value)) - figures
  const candidates = [decade - 1, decade, decade + 1].flatMap(power => SERIES_VALUES[series].map(figure => Number(`${figure}e${power}`)))
  const nearest = candidates.reduce((best, candidate) => Math.abs(candidate - value) < Math.abs(best - value) ? candidate : best)
  return { value: nearest, errorPercent: same(nearest, value) ? 0 : (nearest - value) / value * 100 }
}

/** Whether a value stands in a series, in any decade. */
export function isPreferred(value: number, series: Series): boolean {
  return nearestPreferred(value, series)?.errorPercent === 0
}

const BY_TOLERANCE: readonly [least: number, series: Series][] = [[30, 'E3'], [20, 'E6'], [10, 'E12'], [5, 'E24'], [2, 'E48'], [1, 'E96'], [0, 'E192']]

/** The series that parts of a tolerance (± per cent) are made in: E6 ±20 %, E12 ±10 %, E24 ±5 %, E48 ±2 %, E96 ±1 %, E192 closer. */
export function seriesOfTolerance(tolerancePercent: number): Series {
  return BY_TOLERANCE.find(([least]) => tolerancePercent >= least)?.[1] ?? 'E192'
}

export interface PreferredNote {
  /** Whether the value stands in the series of its tolerance. */
  isPreferred: boolean
  series: Series
  sentence: string
}

const percentWords = (percent: number): string => `${percent > 0 ? '+' : '\u2212'}${Number(Math.abs(percent).toPrecision(2))}${NARROW_SPACE}%`

function outsideSentence(shown: string, value: number, own: Series, quantity: 'resistance' | 'capacitance', closeness: string): string {
  // 1 % parts are commonly made in E24 values too (common practice, no source).
  if (SERIES.indexOf(own) > SERIES.indexOf('E24') && isPreferred(value, 'E24')) {
    return `${shown} is in E24, not in ${own}, the series of ${closeness}. Close parts are often made in E24 values too.`
  }
  const finer = SERIES.slice(SERIES.indexOf(own) + 1).find(series => isPreferred(value, series))
  if (finer) return `${shown} is not in ${own}, the series of ${closeness}, but in ${finer}.`
  const nearest = nearestPreferred(value, own)
  if (!nearest) return `${shown} is in no series of preferred values.`
  // Values before about 1950 were round ones: 5 k, 50 k, 8 µF, 16 µF (common practice, no source).
  return `${shown} is not a preferred value of ${own}, the series of ${closeness}: the nearest is ${formatAmount(nearest.value, quantity)} (${percentWords(nearest.errorPercent)}). Parts made before about 1950 often have other values.`
}

/**
 * Whether a value (ohms or farads) stands in the series of its tolerance (± per cent), in a sentence. A value outside is never
 * wrong for that: old parts have round values.
 */
export function preferredNote(value: number, tolerancePercent: number, quantity: 'resistance' | 'capacitance'): PreferredNote {
  const series = seriesOfTolerance(tolerancePercent)
  const shown = formatAmount(value, quantity)
  const closeness = `±${tolerancePercent}${NARROW_SPACE}%`
  return isPreferred(value, series)
    ? { isPreferred: true, series, sentence: `${shown} is a preferred value of ${series}, the series of ${closeness}.` }
    : { isPreferred: false, series, sentence: outsideSentence(shown, value, series, quantity, closeness) }
}
