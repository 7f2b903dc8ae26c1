/**
 * The normal and the t distribution, as far as stating an uncertainty needs them. Dimensionless throughout.
 * Source of the definitions: JCGM 100:2008 (GUM), annexes C and G.
 */

/** Below this the series converges at once; above it the continued fraction does. */
const SERIES_UP_TO = 3
const MOST_TERMS = 400
const CLOSE_ENOUGH = 1e-17

/** The error function by its series (Maclaurin, all terms of one sign), for small |x|. */
function erfSeries(x: number): number {
  let term = x
  let sum = x
  for (let n = 1; n < MOST_TERMS && Math.abs(term) > CLOSE_ENOUGH * Math.abs(sum); n += 1) {
    term *= 2 * x * x / (2 * n + 1)
    sum += term
  }
  return 2 / Math.sqrt(Math.PI) * Math.exp(-x * x) * sum
}

/** The complementary error function by its continued fraction, for x above 3; keeps its figures far out in the tail. */
function erfcFraction(x: number): number {
  let fraction = 0
  for (let n = 60; n >= 1; n -= 1) fraction = n / 2 / (x + fraction)
  return Math.exp(-x * x) / Math.sqrt(Math.PI) / (x + fraction)
}

/** The probability that a standard normal variable is no more than `z`. */
export function normalCdf(z: number): number {
  if (Number.isNaN(z)) return Number.NaN
  const x = Math.abs(z) / Math.SQRT2
  const tail = x > SERIES_UP_TO ? erfcFraction(x) / 2 : (1 - erfSeries(x)) / 2
  return z > 0 ? 1 - tail : tail
}

/** The logarithm of the gamma function for x above 0, by Stirling's series after shifting x beyond 8. */
function logGamma(x: number): number {
  let shift = 0
  let at = x
  while (at < 8) {
    shift -= Math.log(at)
    at += 1
  }
  const square = 1 / (at * at)
  const series = (1 / 12 - square * (1 / 360 - square * (1 / 1260 - square * (1 / 1680 - square / 1188)))) / at
  return shift + (at - 0.5) * Math.log(at) - at + Math.log(2 * Math.PI) / 2 + series
}

/** The continued fraction of the incomplete beta function (Lentz's method). */
function betaFraction(x: number, a: number, b: number): number {
  const tiny = 1e-300
  const guarded = (value: number) => Math.abs(value) < tiny ? tiny : value
  let c = 1
  let d = 1 / guarded(1 - (a + b) * x / (a + 1))
  let fraction = d
  for (let m = 1; m < MOST_TERMS; m += 1) {
    const even = m * (b - m) * x / ((a + 2 * m - 1) * (a + 2 * m))
    d = 1 / guarded(1 + even * d)
    c = guarded(1 + even / c)
    fraction *= d * c
    const odd = -(a + m) * (a + b + m) * x / ((a + 2 * m) * (a + 2 * m + 1))
    d = 1 / guarded(1 + odd * d)
    c = guarded(1 + odd / c)
    const step = d * c
    fraction *= step
    if (Math.abs(step - 1) < CLOSE_ENOUGH) break
  }
  return fraction
}

/** The regularised incomplete beta function I_x(a, b), 0 ≤ x ≤ 1. */
function incompleteBeta(x: number, a: number, b: number): number {
  if (x <= 0) return 0
  if (x >= 1) return 1
  const front = Math.exp(logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log1p(-x))
  return x < (a + 1) / (a + b + 2)
    ? front * betaFraction(x, a, b) / a
    : 1 - front * betaFraction(1 - x, b, a) / b
}

/** From here on t is the normal distribution to seven figures, while the gamma functions lose theirs in each other's difference. */
const AS_GOOD_AS_NORMAL = 1e7

/** The probability that a variable of the t distribution with `degrees` degrees of freedom lies within ±`t`. */
export function withinT(t: number, degrees: number): number {
  if (degrees > AS_GOOD_AS_NORMAL) return 1 - 2 * normalCdf(-Math.abs(t))
  return 1 - incompleteBeta(degrees / (degrees + t * t), degrees / 2, 0.5)
}

/**
 * The coverage factor t_p(ν): the half-width, in standard uncertainties, that holds `probability` of the t distribution
 * with `degrees` degrees of freedom (`Infinity`: the normal one). Tabled in JCGM 100:2008, table G.2.
 * Throws a RangeError for fewer than one degree of freedom or a probability that is not between 0 and 1.
 */
export function coverageFactor(probability: number, degrees: number): number {
  if (!(degrees >= 1)) throw new RangeError('A coverage factor needs at least one degree of freedom')
  if (!(probability > 0 && probability < 1)) throw new RangeError('A coverage probability lies between 0 and 1')
  let low = 0
  let high = 1
  while (withinT(high, degrees) < probability) high *= 2
  for (let step = 0; step < 200 && high - low > 1e-13 * high; step += 1) {
    const middle = (low + high) / 2
    if (withinT(middle, degrees) < probability) low = middle
    else high = middle
  }
  return (low + high) / 2
}

/** Mean of some values; NaN of none. */
export function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length
}

/** Experimental standard deviation of single values (GUM 4.2.2), in their unit; 0 of fewer than two. */
export function standardDeviation(values: readonly number[]): number {
  if (values.length < 2) return 0
  const centre = mean(values)
  return Math.sqrt(values.reduce((sum, value) => sum + (value - centre) ** 2, 0) / (values.length - 1))
}
