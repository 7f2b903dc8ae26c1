/**
 * What to turn on an LC-tuned band whose dial is off, and which way, where the readings say so, and only there.
 *
 * The physics and the fit are `alignment-fit`'s. That the inductance is set at the low end and the trimmer at the high end,
 * in turns because each moves the other, is common practice, no source; so is leaving alone what is within its tolerance,
 * which service writers ask for. The levels of significance are ours.
 */
import type { AlignmentFit, BandPoint } from './alignment-fit'
import { fitAlignment, provedParts, slippedPointer, usablePoints } from './alignment-fit'
import { formatFrequency } from './frequency'
import { formatPercent } from './percent'

export { fitAlignment }
export type { AlignmentFit, BandPoint }

/** `fit` is of the parts advised on, or of both where nothing is advised; null where the points can't carry one. */
export type AlignmentAdvice = { kind: 'advice', fit: AlignmentFit, sentences: string[] } | { kind: 'no_advice', fit: AlignmentFit | null, sentence: string }

/**
 * Different settings of a band below which nothing is advised. Three leave one degree of freedom to two parameters: at 0.1 %
 * F would have to pass 500 000, so three readings could never prove anything that a person should turn a core for.
 */
export const LEAST_POINTS = 4
/** The highest setting must be at least this much above the lowest, or a wrong trimmer looks like a wrong inductance. */
const LEAST_SPAN = 1.2
/** Chance that scatter alone is taken for a fault of inductance or trimmer. */
const SIGNIFICANCE = 0.001
/** F above which the fit of both is believed: the tail of F(2, ν) is (1 + 2F/ν)^(−ν/2), solved for F. */
const believedF = (degrees: number): number => (degrees / 2) * (SIGNIFICANCE ** (-2 / degrees) - 1)
/** χ² above which the errors are more than their own uncertainties: its tail with two degrees of freedom is e^(−χ²/2). */
const BELIEVED_CHI_SQUARE = -2 * Math.log(SIGNIFICANCE)
/** What is put right must leave at most this share of the worst error, else something else is wrong as well. */
const REMAINS_AT_MOST = 0.35
/** Where a trimmer is to be turned, the readings must be this many times likelier by inductance and trimmer than by a slipped pointer. */
const CLEARLY_LIKELIER = 20
/** A part of the error that is not worth a turn, as a share of the tolerance. */
const NOT_WORTH = 0.15

const SCATTER = 'No turn of core or trimmer explains these errors: they scatter. Look at the pointer, the cord and the dial’s end stops, and read the points again, before anything is turned.'
const UNDECIDED = 'A slipped pointer explains these errors about as well as core and trimmer do. Look at the pointer and the cord, and read more points of the band, before anything is turned.'
const UNCERTAIN = 'These errors are no more than the uncertainty of their readings. Measure with a better instrument before anything is turned.'

const none = (sentence: string, fit: AlignmentFit | null = null): AlignmentAdvice => ({ kind: 'no_advice', fit, sentence })

/** Why these points can't carry advice at all, in a sentence; null when they can. */
function pointsProblem(usable: readonly BandPoint[], tolerancePercent: number): string | null {
  const settings = [...new Set(usable.map(({ settingHz }) => settingHz))].sort((a, b) => a - b)
  if (settings.length < LEAST_POINTS) return `Read at least ${LEAST_POINTS} points of the band: with fewer, anything fits and nothing is proved.`
  if ((settings.at(-1) ?? 0) < LEAST_SPAN * (settings[0] ?? 0)) return 'These points lie too close together to tell an inductance from a trimmer. Read the ends of the band as well.'
  return tolerancePercent > 0 ? null : 'Without the dial’s tolerance it can’t be said whether anything is out. Enter it with the model’s bands.'
}

const slipped = (hz: number): string => {
  const size = formatFrequency(Number(Math.abs(hz).toPrecision(2)))
  return `A pointer slipped by about ${size} (it reads ${hz > 0 ? 'high' : 'low'}) explains these errors better than any turn of core or trimmer. Look at the pointer and the cord, set them right, and read the points again, before anything is turned.`
}

const isExplained = ({ fRatio, explainedChiSquare }: AlignmentFit, count: number): boolean =>
  fRatio >= believedF(count - 2) && (explainedChiSquare === null || explainedChiSquare >= BELIEVED_CHI_SQUARE)

/**
 * Advice for one band, from its points as found (hertz) and the dial's tolerance in per cent. It is given only where something
 * is out, an inductance and a trimmer explain it (F test at 0.1 %; with stated uncertainties χ² as well), a slipped pointer
 * doesn’t explain it as well, and putting it right would leave at most a third or so of the worst error.
 */
export function adviseAlignment(points: readonly BandPoint[], tolerancePercent: number): AlignmentAdvice {
  const usable = usablePoints(points)
  const problem = pointsProblem(usable, tolerancePercent)
  if (problem) return none(problem)
  const worst = usable.reduce((most, { settingHz, readingHz }) => Math.max(most, Math.abs(readingHz / settingHz - 1)), 0) * 100
  const whole = fitAlignment(usable)
  if (worst <= tolerancePercent * (1 + 1e-12)) return none('Every point is within the tolerance: leave it alone. Turning what is right makes things worse.', whole)
  const slip = slippedPointer(usable)
  if (slip?.isProved && slip.advantage > 1) return none(slip.fRatio >= believedF(usable.length - 2) ? slipped(slip.hz) : SCATTER, whole)
  if (!whole || !isExplained(whole, usable.length)) return none(isUncertain(whole) ? UNCERTAIN : SCATTER, whole)
  const parts = provedParts(usable)
  if (parts !== 'inductance' && slip && slip.advantage ** (usable.length / 2) > 1 / CLEARLY_LIKELIER) return none(UNDECIDED, whole)
  const fit = fitAlignment(usable, parts)
  if (!fit || fit.remainingPercent > REMAINS_AT_MOST * fit.worstPercent) return none(SCATTER, whole)
  return { kind: 'advice', fit, sentences: inWords(fit, tolerancePercent) }
}

const isUncertain = (fit: AlignmentFit | null): boolean =>
  fit !== null && fit.explainedChiSquare !== null && fit.explainedChiSquare < BELIEVED_CHI_SQUARE

function coreInWords(percent: number, shown: string): string {
  const turn = percent > 0
    ? 'high: a little more inductance (an iron core in, a brass core out) or, where one is fitted, more padder'
    : 'low: a little less inductance (an iron core out, a brass core in) or, where one is fitted, less padder'
  return `First, at the low end: the whole band reads ${shown} ${turn}.`
}

function inWords(fit: AlignmentFit, tolerancePercent: number): string[] {
  const share = (value: number) => formatPercent(Math.abs(value), tolerancePercent < 0.1 ? 4 : 2)
  const isWorth = (value: number) => Math.abs(value) > NOT_WORTH * tolerancePercent
  const [hasCore, hasTrimmer] = [isWorth(fit.inductancePercent), isWorth(fit.trimmerPercent)]
  const trimmer = `${hasCore ? 'Then' : 'Only'}, at the high end: the top reads a further ${share(fit.trimmerPercent)} ${fit.trimmerPercent > 0 ? 'high: more trimmer capacitance' : 'low: less trimmer capacitance'}.`
  return [
    hasCore ? coreInWords(fit.inductancePercent, share(fit.inductancePercent)) : 'Leave the core alone: the low end is right.',
    hasTrimmer ? trimmer : 'Leave the trimmer alone: the high end goes with the low.',
    ...hasTrimmer ? [] : ['On a dial divided by ratios a slipped pointer looks just the same: look at the pointer before the core is turned.'],
    'Go back to the low end and on again until neither moves the other; each turn changes both.',
    fit.remainingPercent > tolerancePercent
      ? `Even so about ${share(fit.remainingPercent)} would remain, more than the tolerance: the dial or the gang is off as well.`
      : `About ${share(fit.remainingPercent)} should remain.`,
  ]
}
