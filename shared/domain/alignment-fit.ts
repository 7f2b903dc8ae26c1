/**
 * How the dial errors of one LC-tuned band lie: fitted as a wrong inductance and a wrong trimmer, and as a slipped pointer.
 *
 * f = 1/(2π√(LC)). With L changed by a share λ, and the trimmer by a capacitance that is a share γ of the whole at the top of
 * the band, and the whole capacitance going as 1/f² along the dial, (f_dial/f_read)² = (1 + λ)(1 + γ·x) with x = (f/f_top)²:
 * exactly a straight line p + q·x, with λ = p − 1 and γ = q/p. To first order the error is e = a + b·x, a = −λ/2, b = −γ/2.
 * A pointer slipped by δ on an evenly divided dial gives f_read/f_dial = k + δ/f_dial, a straight line in 1/f_dial.
 * Least squares as in any textbook, weighted by 1/u² where every point brings its standard uncertainty.
 */
import { coverageFactor } from './statistics'

/** A point of one band, in hertz: setting, reading and, where known, the standard uncertainty of the error. */
export interface BandPoint { settingHz: number, readingHz: number, uncertaintyHz?: number }

/** What the errors are put down to. */
export type AlignmentParts = 'both' | 'inductance' | 'trimmer'

export interface AlignmentFit {
  parts: AlignmentParts
  /** ΔL/L: positive where the inductance is too large for its dial (it reads low). */
  inductance: number
  /** ΔC/C at the top of the band: positive where the trimmer is too large. */
  trimmer: number
  /** Error in per cent due to the inductance, the same all over the band: `a`, and its share at the top. */
  inductancePercent: number
  /** What the trimmer adds at the top of the band, in per cent: `b`. Both together are the fitted error there. */
  trimmerPercent: number
  /** What stays of each error in per cent with both put right, in the order of the points, and its root mean square. */
  residuals: { settingHz: number, percent: number }[]
  residualRmsPercent: number
  /** The largest error in per cent that would remain with both put right. */
  remainingPercent: number
  /** The largest error in per cent as read. */
  worstPercent: number
  /** Share of the errors’ squares, about nought, that is explained: 0 … 1. Alike to R², but a shift of the whole band counts. */
  determination: number
  /** How what is explained stands to what is not, each by its degrees of freedom: F with `parts` and n − `parts` of them. */
  fRatio: number
  /** χ² of what is explained against the stated uncertainties; null where they are not all stated. */
  explainedChiSquare: number | null
}

/** A point made ready: x = (f/f_top)², y = (f_dial/f_read)², relative error, weights for y and for the error (mean near 1). */
interface Ready { settingHz: number, x: number, y: number, error: number, weight: number, errorWeight: number }

/** Relative rounding below which a residual means nothing: a tenth of a hertz in 100 Mc. */
const FINEST = 1e-9
/** Chance that a part of the fit is believed although scatter alone made it. */
const PART_SIGNIFICANCE = 0.01

const isAbove = (value: number | undefined): value is number => value !== undefined && value > 0 && Number.isFinite(value)

/** The points that can be reckoned with: setting and reading above nought and finite. */
export function usablePoints(points: readonly BandPoint[]): BandPoint[] {
  return points.filter(({ settingHz, readingHz }) => isAbove(settingHz) && isAbove(readingHz))
}

/** Standard uncertainties of the relative errors, or null unless every point states one above nought. */
function relativeUncertainties(points: readonly BandPoint[]): number[] | null {
  const stated = points.flatMap(({ settingHz, uncertaintyHz }) => isAbove(uncertaintyHz) ? [uncertaintyHz / settingHz] : [])
  return stated.length === points.length ? stated : null
}

function makeReady(points: readonly BandPoint[]): { ready: Ready[], scale: number | null } {
  const top = points.reduce((most, { settingHz }) => Math.max(most, settingHz), 0)
  const uncertainties = relativeUncertainties(points)
  const inverse = points.map((_, index) => 1 / (uncertainties?.[index] ?? 1) ** 2)
  const scale = inverse.reduce((sum, each) => sum + each, 0) / points.length
  const ready = points.map(({ settingHz, readingHz }, index) => {
    const y = (settingHz / readingHz) ** 2
    const errorWeight = (inverse[index] ?? 1) / scale
    // u(y) = 2·y^1.5·u(e). Without uncertainties every y counts alike.
    return { settingHz, x: (settingHz / top) ** 2, y, error: readingHz / settingHz - 1, errorWeight, weight: uncertainties ? errorWeight / (4 * y ** 3) : 1 }
  })
  return { ready, scale: uncertainties ? scale : null }
}

const sumOf = <T>(list: readonly T[], value: (item: T) => number): number => list.reduce((sum, item) => sum + value(item), 0)

interface Line { p: number, q: number }

/** Weighted least squares of y = p + q·x; null where the x lie too close together. */
function fitLine(points: readonly { x: number, y: number, weight: number }[]): Line | null {
  const whole = sumOf(points, ({ weight }) => weight)
  const [meanX, meanY] = [sumOf(points, ({ x, weight }) => weight * x) / whole, sumOf(points, ({ y, weight }) => weight * y) / whole]
  const spread = sumOf(points, ({ x, weight }) => weight * (x - meanX) ** 2)
  if (!(spread > 1e-12 * whole)) return null
  const q = sumOf(points, ({ x, y, weight }) => weight * (x - meanX) * (y - meanY)) / spread
  return { p: meanY - q * meanX, q }
}

function lineFor(ready: readonly Ready[], parts: AlignmentParts): Line | null {
  if (parts === 'both') return fitLine(ready)
  if (parts === 'inductance') return { p: sumOf(ready, ({ y, weight }) => weight * y) / sumOf(ready, ({ weight }) => weight), q: 0 }
  return { p: 1, q: sumOf(ready, ({ x, y, weight }) => weight * x * (y - 1)) / sumOf(ready, ({ x, weight }) => weight * x * x) }
}

const unexplainedBy = (ready: readonly Ready[], { p, q }: Line): number => sumOf(ready, ({ x, y, weight }) => weight * (y - p - q * x) ** 2)

/**
 * The fit of a band's errors, or null where its points can't carry one (fewer than three, too close together, or errors so
 * large that no inductance or capacitance makes them). `parts` leaves the other part at nought.
 */
export function fitAlignment(points: readonly BandPoint[], parts: AlignmentParts = 'both'): AlignmentFit | null {
  const { ready, scale } = makeReady(usablePoints(points))
  const line = ready.length < 3 ? null : lineFor(ready, parts)
  if (!line || !(line.p > 0) || !(line.p + line.q > 0)) return null
  return describeFit(ready, scale, line, parts)
}

function describeFit(ready: readonly Ready[], scale: number | null, line: Line, parts: AlignmentParts): AlignmentFit {
  const { p, q } = line
  const explained = sumOf(ready, ({ x, weight }) => weight * (p + q * x - 1) ** 2)
  const unexplained = unexplainedBy(ready, line)
  const count = parts === 'both' ? 2 : 1
  const residuals = ready.map(({ settingHz, x, y }) => ({ settingHz, percent: (Math.sqrt((p + q * x) / y) - 1) * 100 }))
  const whole = explained + unexplained
  return {
    parts,
    inductance: p - 1,
    trimmer: q / p,
    inductancePercent: (1 / Math.sqrt(p) - 1) * 100,
    trimmerPercent: (1 / Math.sqrt(p + q) - 1 / Math.sqrt(p)) * 100,
    residuals,
    residualRmsPercent: Math.sqrt(sumOf(residuals, ({ percent }) => percent ** 2) / residuals.length),
    remainingPercent: residuals.reduce((most, { percent }) => Math.max(most, Math.abs(percent)), 0),
    worstPercent: ready.reduce((most, { error }) => Math.max(most, Math.abs(error)), 0) * 100,
    determination: whole === 0 ? 0 : explained / whole,
    fRatio: ratio(explained / count, unexplained / (ready.length - count)),
    explainedChiSquare: scale === null ? null : explained * scale,
  }
}

const ratio = (explained: number, unexplained: number): number =>
  unexplained > 0 ? explained / unexplained : explained > 0 ? Number.POSITIVE_INFINITY : 0

/** Whether a part earns its place: what leaving it out costs, against what is left anyway (F with 1 and `degrees`, the square of t). */
function isPartProved(without: number, withIt: number, degrees: number): boolean {
  return degrees > 0 && ratio(without - withIt, withIt / degrees) > coverageFactor(1 - PART_SIGNIFICANCE, degrees) ** 2
}

/**
 * The parts that the readings prove, each at 1 %: both where each is needed, else the one alone that leaves less unexplained.
 * What is not proved is not turned.
 */
export function provedParts(points: readonly BandPoint[]): AlignmentParts {
  const { ready } = makeReady(usablePoints(points))
  const left = (parts: AlignmentParts) => {
    const line = lineFor(ready, parts)
    return (line ? unexplainedBy(ready, line) : Number.POSITIVE_INFINITY) + ready.length * FINEST ** 2
  }
  const [both, inductance, trimmer] = [left('both'), left('inductance'), left('trimmer')]
  const degrees = ready.length - 2
  if (isPartProved(inductance, both, degrees) && isPartProved(trimmer, both, degrees)) return 'both'
  return inductance <= trimmer ? 'inductance' : 'trimmer'
}

export interface Slip {
  /** How far the dial's output is from its mark, in hertz, the same all along; positive: it reads high. */
  hz: number
  /** Whether the slip is more than scatter, at 1 %. */
  isProved: boolean
  /** How far the slip and a wrong scale explain the errors: F with 2 and n − 2. */
  fRatio: number
  /** The squares that inductance and trimmer leave, as a multiple of what the slip leaves: above 1, the slip is the better. */
  advantage: number
}

/** What inductance and trimmer leave of the errors themselves, by which they compare with the pointer. */
function leftByTuning(ready: readonly Ready[]): number {
  const line = lineFor(ready, 'both')
  if (!line) return Number.POSITIVE_INFINITY
  return sumOf(ready, ({ x, error, errorWeight }) => errorWeight * (1 / Math.sqrt(Math.max(line.p + line.q * x, FINEST)) - 1 - error) ** 2)
}

/**
 * The errors taken for a slipped pointer on an evenly divided dial, and how that compares with inductance and trimmer: both
 * are lines with two parameters. Null where the points lie too close together.
 */
export function slippedPointer(points: readonly BandPoint[]): Slip | null {
  const { ready } = makeReady(usablePoints(points))
  const top = ready.reduce((most, { settingHz }) => Math.max(most, settingHz), 0)
  const dial = ready.map(({ settingHz, error, errorWeight }) => ({ x: top / settingHz, y: error, weight: errorWeight }))
  const line = fitLine(dial)
  if (!line) return null
  const floor = ready.length * FINEST ** 2
  const left = sumOf(dial, ({ x, y, weight }) => weight * (y - line.p - line.q * x) ** 2) + floor
  const mean = sumOf(dial, ({ y, weight }) => weight * y) / sumOf(dial, ({ weight }) => weight)
  const withoutSlip = sumOf(dial, ({ y, weight }) => weight * (y - mean) ** 2) + floor
  const degrees = ready.length - 2
  return {
    hz: line.q * top,
    isProved: isPartProved(withoutSlip, left, degrees),
    fRatio: ratio(sumOf(dial, ({ x, weight }) => weight * (line.p + line.q * x) ** 2) / 2, left / degrees),
    advantage: (leftByTuning(ready) + floor) / left,
  }
}
