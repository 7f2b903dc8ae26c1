/**
 * The uncertainty of one reading by the "Guide to the expression of uncertainty in measurement" (JCGM 100:2008, "GUM"):
 * components, their root sum of squares, effective degrees of freedom, coverage factor, and rounding.
 */
import { coverageFactor } from './statistics'

/** How a component was come by: from repeated readings (Type A), or from anything else that is known (Type B). */
export type Evaluation = 'A' | 'B'
export const SHAPES = ['normal', 'rectangular', 'triangular', 'u_shaped'] as const
/** The shape assumed for what lies within ± a half-width. */
export type Shape = (typeof SHAPES)[number]

/** What divides a half-width to make a standard uncertainty (GUM 4.3.7 and 4.3.9; U-shaped: H.1.3.4). Normal: it is one already. */
const DIVISORS: Record<Shape, number> = { normal: 1, rectangular: Math.sqrt(3), triangular: Math.sqrt(6), u_shaped: Math.SQRT2 }

/** One source of doubt, already multiplied by its sensitivity: `standard` is in the unit of the result. */
export interface Component {
  /** What it is: "time base, ±1 ppm". */
  label: string
  evaluation: Evaluation
  shape: Shape
  standard: number
  /** Degrees of freedom; null where nothing limits them, as of a limit taken as certain (GUM G.4.2). */
  degrees: number | null
}

/** A component known only to lie within ± `halfWidth` (in the unit of the result). */
export function within(label: string, halfWidth: number, shape: Shape = 'rectangular', degrees: number | null = null): Component {
  return { label, evaluation: 'B', shape, standard: Math.abs(halfWidth) / DIVISORS[shape], degrees }
}

/** The component of a display that steps by `step`: step/√12 (GUM F.2.2.1). */
export function resolution(label: string, step: number): Component {
  return within(label, step / 2)
}

/** The component of a mean of repeated readings: s/√n with n − 1 degrees of freedom (GUM 4.2.3). */
export function repeats(label: string, deviation: number, count: number): Component {
  return { label, evaluation: 'A', shape: 'normal', standard: deviation / Math.sqrt(count), degrees: count - 1 }
}

/** Root sum of squares of independent components (GUM 5.1.2), in their unit. */
export function combine(components: readonly Component[]): number {
  return Math.hypot(...components.map(({ standard }) => standard))
}

/**
 * Effective degrees of freedom by Welch-Satterthwaite (GUM G.4.1): u⁴ / Σ(uᵢ⁴/νᵢ). `Infinity` where nothing limits them.
 * A component with no degrees of freedom at all (a single reading called repeated) is left out: it says nothing.
 */
export function effectiveDegrees(components: readonly Component[]): number {
  const combined = combine(components)
  // As shares of the whole, so that no unit is too large or too small for a fourth power.
  const share = (standard: number) => standard === 0 ? 0 : standard / combined
  const doubt = components.reduce((sum, { standard, degrees }) => degrees !== null && degrees > 0 ? sum + share(standard) ** 4 / degrees : sum, 0)
  return 1 / doubt
}

/** The probability that the stated interval covers the value, near 95 %: that of k = 2 for a normal result. */
export const COVERAGE_PROBABILITY = 0.9545
/** Where one rectangular component outweighs all else, 95 % of it lies within 1.65 of its standard uncertainties (0.95·√3). */
export const RECTANGULAR_FACTOR = 1.65
/** The rest may be this much of the one that dominates (EA-4/02, example S9; figure from memory). */
const REST_AT_MOST = 0.3

/** Figures beyond which binary arithmetic, not the measurement, speaks. */
const NOISE = 1e-9

/** The component that outweighs all the others together, if one does and it is rectangular. */
function dominantRectangle(components: readonly Component[]): Component | null {
  const largest = components.reduce<Component | null>((most, each) => !most || each.standard > most.standard ? each : most, null)
  if (!largest || largest.shape !== 'rectangular') return null
  const rest = combine(components.filter(each => each !== largest))
  return rest <= REST_AT_MOST * largest.standard ? largest : null
}

export interface Uncertainty {
  components: Component[]
  /** Combined standard uncertainty u, in the unit of the reading. */
  standard: number
  /** Effective degrees of freedom, null where nothing limits them. Plain data: a signed sheet keeps it as JSON. */
  degrees: number | null
  /** Coverage factor k. */
  factor: number
  /** Expanded uncertainty U = k·u. */
  expanded: number
  /** "k = 2.00, normal", "k = 1.65, one rectangular component dominates". */
  coverage: string
}

/**
 * The expanded uncertainty of a result. Effective degrees of freedom are cut to a whole number before t is taken (GUM
 * G.4.1); below one, one is taken. Null of no components: then nothing is known, which is not the same as nought.
 */
export function evaluate(components: readonly Component[]): Uncertainty | null {
  if (components.length === 0 || components.some(({ standard }) => !Number.isFinite(standard))) return null
  const standard = combine(components)
  const degrees = effectiveDegrees(components)
  const { factor, coverage } = coverageOf(components, degrees)
  return { components: [...components], standard, degrees: Number.isFinite(degrees) ? degrees : null, factor, expanded: factor * standard, coverage }
}

function coverageOf(components: readonly Component[], degrees: number): { factor: number, coverage: string } {
  const dominant = dominantRectangle(components)
  if (dominant) return { factor: RECTANGULAR_FACTOR, coverage: `k = ${RECTANGULAR_FACTOR}, about 95 %: one rectangular component outweighs the rest (${dominant.label})` }
  if (degrees === Number.POSITIVE_INFINITY) return { factor: coverageFactor(COVERAGE_PROBABILITY, degrees), coverage: 'k = 2.00, about 95 %' }
  const whole = Math.max(1, Math.floor(degrees + NOISE))
  const factor = coverageFactor(COVERAGE_PROBABILITY, whole)
  return { factor, coverage: `k = ${factor.toFixed(2)}, about 95 %, from ${whole} effective degrees of freedom` }
}

/** How a stated uncertainty is rounded: two significant figures (GUM 7.2.6), upwards, so that it is never understated. */
export interface Rounded {
  /** Rounded up to two significant figures, in the same unit. */
  uncertainty: number
  /** The decimal place of its last figure as a power of ten: −3 for 0.012. The estimate is given to the same place. */
  place: number
}

/** Rounds an expanded uncertainty as it is stated. A nought or an infinity stays as it is, at place 0. */
export function roundUncertainty(expanded: number): Rounded {
  if (!(expanded > 0) || !Number.isFinite(expanded)) return { uncertainty: expanded, place: 0 }
  const place = Math.floor(Math.log10(expanded)) - 1
  const steps = Math.ceil(expanded / 10 ** place - NOISE)
  return steps >= 100
    ? { uncertainty: Number(`${steps / 10}e${place + 1}`), place: place + 1 }
    : { uncertainty: Number(`${steps}e${place}`), place }
}

/** A value rounded to a decimal place given as a power of ten; as it is where that place is finer than a number can carry. */
export function roundTo(value: number, place: number): number {
  const steps = Math.round(value / 10 ** place)
  return Number.isSafeInteger(steps) ? Number(`${steps}e${place}`) : value
}
