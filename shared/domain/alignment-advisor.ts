/**
 * What to turn on an LC-tuned band whose dial is off, and which way, where the readings say so.
 *
 * f = 1/(2π√(LC)). With L changed by a share λ and the trimmer by a capacitance that is a share γ of the whole at the top of
 * the band, and the whole capacitance going as 1/f² along the dial, (f_dial/f_read)² = (1 + λ)(1 + γ·x) with x = (f/f_top)²:
 * a straight line in f², fitted by least squares. To first order the error is e = a + b·f² with a = −λ/2 and, at the top,
 * b = −γ/2. That the inductance is set at the low end and the trimmer at the high end, in turns, is common practice, no
 * source; so is leaving alone what is within its tolerance.
 */
import { formatPercent } from './percent'

/** A point of one band: setting and reading in hertz. */
export interface BandPoint { settingHz: number, readingHz: number }

export interface AlignmentFit {
  /** ΔL/L: positive where the inductance is too large for its dial (it reads low). */
  inductance: number
  /** ΔC/C at the top of the band: positive where the trimmer is too large. */
  trimmer: number
  /** Error in per cent at the top of the band due to each. */
  inductancePercent: number
  trimmerPercent: number
  /** The largest error in per cent that would remain with both put right. */
  remainingPercent: number
  /** The largest error in per cent as read. */
  worstPercent: number
  /** How the band's spread about nought that is explained stands to what is not (F with 2 and n − 2 degrees of freedom). */
  fRatio: number
}

export type AlignmentAdvice = { kind: 'advice', fit: AlignmentFit, sentences: string[] } | { kind: 'no_advice', fit: AlignmentFit | null, sentence: string }

/** Points of a band below which nothing is advised. */
export const LEAST_POINTS = 4
/** Chance that scatter alone is taken for a fault of inductance or trimmer. */
const SIGNIFICANCE = 0.001
/** F above which the fit is believed: with two parameters the tail of F(2, ν) is (1 + 2F/ν)^(−ν/2), solved for F. */
const believedF = (degrees: number): number => (degrees / 2) * (SIGNIFICANCE ** (-2 / degrees) - 1)
/** Both put right must leave at most this share of the worst error, else something else is wrong as well. */
const REMAINS_AT_MOST = 0.35

/** Fits y = (f_dial/f_read)² = p + q·x by least squares, x = (f/f_top)². */
function fitLine(points: readonly { x: number, y: number }[]): { p: number, q: number } | null {
  const n = points.length
  const [meanX, meanY] = [points.reduce((sum, { x }) => sum + x, 0) / n, points.reduce((sum, { y }) => sum + y, 0) / n]
  const spread = points.reduce((sum, { x }) => sum + (x - meanX) ** 2, 0)
  if (!(spread > 1e-12)) return null
  const q = points.reduce((sum, { x, y }) => sum + (x - meanX) * (y - meanY), 0) / spread
  return { p: meanY - q * meanX, q }
}

/** The fit of a band's errors, or null where its points can't carry one (too few apart, or nonsense). */
export function fitAlignment(points: readonly BandPoint[]): AlignmentFit | null {
  const usable = points.filter(({ settingHz, readingHz }) => settingHz > 0 && readingHz > 0)
  const top = usable.reduce((most, { settingHz }) => Math.max(most, settingHz), 0)
  const line = usable.map(({ settingHz, readingHz }) => ({ x: (settingHz / top) ** 2, y: (settingHz / readingHz) ** 2, error: readingHz / settingHz - 1 }))
  const fitted = line.length < 3 ? null : fitLine(line)
  if (!fitted || !(fitted.p > 0) || !(fitted.p + fitted.q > 0)) return null
  const { p, q } = fitted
  const explained = line.reduce((sum, { x }) => sum + (p + q * x - 1) ** 2, 0)
  const unexplained = line.reduce((sum, { x, y }) => sum + (y - p - q * x) ** 2, 0)
  const degrees = line.length - 2
  const worst = line.reduce((most, { error }) => Math.max(most, Math.abs(error)), 0)
  return {
    inductance: p - 1,
    trimmer: q / p,
    inductancePercent: (1 / Math.sqrt(p) - 1) * 100,
    trimmerPercent: (Math.sqrt(p / (p + q)) - 1) * 100,
    remainingPercent: line.reduce((most, { x, y }) => Math.max(most, Math.abs(Math.sqrt((p + q * x) / y) - 1)), 0) * 100,
    worstPercent: worst * 100,
    fRatio: unexplained === 0 ? (explained === 0 ? 0 : Number.POSITIVE_INFINITY) : (explained / 2) / (unexplained / degrees),
  }
}

const none = (sentence: string, fit: AlignmentFit | null = null): AlignmentAdvice => ({ kind: 'no_advice', fit, sentence })

/** Advice for one band. It is given only where an inductance and a trimmer explain the readings, and something is out. */
export function adviseAlignment(points: readonly BandPoint[], tolerancePercent: number): AlignmentAdvice {
  if (points.length < LEAST_POINTS) return none(`Read at least ${LEAST_POINTS} points of the band: with fewer, anything fits and nothing is proved.`)
  const fit = fitAlignment(points)
  if (!fit) return none('These points lie too close together to tell an inductance from a trimmer. Read the ends of the band as well.')
  if (fit.worstPercent <= tolerancePercent) return none('Every point is within the tolerance: leave it alone. Turning what is right makes things worse.', fit)
  const isExplained = fit.fRatio >= believedF(points.length - 2) && fit.remainingPercent <= REMAINS_AT_MOST * fit.worstPercent
  if (!isExplained) return none('No turn of core or trimmer explains these errors: they scatter. Look at the pointer, the cord and the dial’s end stops, and read the points again, before anything is turned.', fit)
  return { kind: 'advice', fit, sentences: inWords(fit, tolerancePercent) }
}

/** A part of the error that is not worth a turn, as a share of the tolerance. */
const NOT_WORTH = 0.15

function inWords(fit: AlignmentFit, tolerancePercent: number): string[] {
  const share = (value: number) => formatPercent(value, 2)
  const isWorth = (value: number) => Math.abs(value) > NOT_WORTH * tolerancePercent
  const core = isWorth(fit.inductancePercent)
    ? `First, at the low end: the whole band reads ${share(Math.abs(fit.inductancePercent))} ${fit.inductancePercent > 0 ? 'high: a little more inductance (an iron core in, a brass core out)' : 'low: a little less inductance (an iron core out, a brass core in)'}.`
    : 'Leave the core alone: the low end is right.'
  const trimmer = isWorth(fit.trimmerPercent)
    ? `${isWorth(fit.inductancePercent) ? 'Then' : 'Only'}, at the high end: the top reads a further ${share(Math.abs(fit.trimmerPercent))} ${fit.trimmerPercent > 0 ? 'high: more trimmer capacitance' : 'low: less trimmer capacitance'}.`
    : 'Leave the trimmer alone: the high end goes with the low.'
  return [
    core, trimmer,
    'Go back to the low end and on again until neither moves the other; each turn changes both.',
    fit.remainingPercent > tolerancePercent
      ? `Even so about ${share(fit.remainingPercent)} would remain, more than the tolerance: the dial or the gang is off as well.`
      : `About ${share(fit.remainingPercent)} should remain.`,
  ]
}
