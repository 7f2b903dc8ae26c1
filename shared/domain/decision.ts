/**
 * From a reading, its limits and its uncertainty to a verdict, by a rule that is stated with it. Everything is in the
 * base unit of the reading.
 *
 * Sources: ILAC-G8:09/2019, 4.1 to 4.2.3 (guard band w, non-binary statements); JCGM 106:2012 (probability of
 * conformance); ANSI/NCSL Z540.3, 5.3 (test uncertainty ratio).
 */
import type { Bounds } from './limits'
import { normalCdf } from './statistics'
import type { Uncertainty } from './uncertainty'
import { roundUncertainty } from './uncertainty'

export const VERDICTS = ['pass', 'conditional_pass', 'conditional_fail', 'fail'] as const
export type Verdict = (typeof VERDICTS)[number]
export const VERDICT_LABELS: Record<Verdict, string> = {
  pass: 'Pass', conditional_pass: 'Conditional pass', conditional_fail: 'Conditional fail', fail: 'Fail',
}

export const DECISION_RULES = ['simple', 'guard_band'] as const
export type DecisionRuleName = (typeof DECISION_RULES)[number]
/** `factor` is r in w = r·U; it says nothing under simple acceptance. */
export interface DecisionRule { rule: DecisionRuleName, factor: number }

export const DECISION_RULE_LABELS: Record<DecisionRuleName, string> = { simple: 'Simple acceptance', guard_band: 'Guard band' }
/** The rule of a shop that has chosen none. */
export const DEFAULT_RULE: DecisionRule = { rule: 'guard_band', factor: 1 }
export const MOST_GUARD_FACTOR = 3

/** A risk below this is not told finer, in per cent: the shape of the far tail is an assumption. */
const LEAST_RISK_TOLD = 0.01

/** One-sided risk at the acceptance limit, 1 − Φ(2r), in per cent with two figures: upwards, since it is said to be less. */
const riskAtAcceptance = (factor: number): number => Math.max(LEAST_RISK_TOLD, roundUncertainty(100 * normalCdf(-2 * factor)).uncertainty)

/** The rule as it is printed with every result. */
export function decisionRuleInWords({ rule, factor }: DecisionRule): string {
  if (rule === 'simple') return 'Simple acceptance (ILAC-G8:09/2019, guard band w = 0): a pass when the reading is within the limits, the limit itself included. The uncertainty of the instrument is not taken off, so a pass at the very limit may be wrong up to one time in two.'
  return `Guard band (ILAC-G8:09/2019, w = ${factor} U): pass at least w inside the limits, conditional pass within them but nearer than w, conditional fail outside by no more than w, fail beyond. A reading on the limit itself counts as within. A pass is wrong less than ${riskAtAcceptance(factor)} times in a hundred, where the uncertainty is normal.`
}

export interface Judgement {
  verdict: Verdict
  /** Whether the reading itself lies within the limits, whatever its uncertainty. */
  within: boolean
  /** Probability that the value measured conforms (JCGM 106, normal); null where the uncertainty is not known. */
  conformance: number | null
  /** Test uncertainty ratio, (upper − lower)/2U; null with one limit only or no uncertainty. */
  ratio: number | null
  /** Guard band w, on each side; null where the uncertainty is not known. */
  guardBand: number | null
}

/** Room for the last bits of binary arithmetic, so that a reading exactly on its limit counts as on it. */
const ROUNDING = 1e-12

const roundingOf = (value: number, { lower, upper }: Bounds): number => ROUNDING * Math.max(Math.abs(value), Math.abs(lower ?? 0), Math.abs(upper ?? 0))

/** How far inside the nearer limit a value lies (negative: outside), `Infinity` where there is no limit. */
function margin(value: number, bounds: Bounds): number {
  const { lower, upper } = bounds
  const room = Math.min(lower === null ? Number.POSITIVE_INFINITY : value - lower, upper === null ? Number.POSITIVE_INFINITY : upper - value)
  return Math.abs(room) <= roundingOf(value, bounds) ? 0 : room
}

/** Whether a value lies within the limits, the limits themselves included. */
export const isWithin = (value: number, bounds: Bounds): boolean => margin(value, bounds) >= 0

/** Probability that a value read as `value` with standard uncertainty `standard` lies within the limits (JCGM 106:2012, 7). */
export function conformanceProbability(value: number, standard: number, { lower, upper }: Bounds): number {
  if (standard === 0) return margin(value, { lower, upper }) >= 0 ? 1 : 0
  const below = lower === null ? 0 : normalCdf((lower - value) / standard)
  const above = upper === null ? 0 : normalCdf((value - upper) / standard)
  return Math.max(0, 1 - below - above)
}

/** Test uncertainty ratio: the width of the limits over that of the uncertainty, both ±. Null with one limit only. */
export function uncertaintyRatio(expanded: number, { lower, upper }: Bounds): number | null {
  return lower === null || upper === null || !(expanded > 0) ? null : (upper - lower) / (2 * expanded)
}

/**
 * The verdict on a reading. With a guard band and no known uncertainty nothing can be more than conditional: how far the
 * instrument may be out is not known. A reading on the acceptance limit itself is conditional, as ILAC-G8 prints it.
 */
export function judge(value: number, bounds: Bounds, uncertainty: Pick<Uncertainty, 'standard' | 'expanded'> | null, { rule, factor }: DecisionRule): Judgement {
  const room = margin(value, bounds)
  const within = room >= 0
  const guardBand = uncertainty === null ? null : rule === 'simple' ? 0 : factor * uncertainty.expanded
  return {
    verdict: verdictFor(room, guardBand, rule, roundingOf(value, bounds)),
    within,
    conformance: uncertainty === null ? null : conformanceProbability(value, uncertainty.standard, bounds),
    ratio: uncertainty === null ? null : uncertaintyRatio(uncertainty.expanded, bounds),
    guardBand,
  }
}

function verdictFor(room: number, guardBand: number | null, rule: DecisionRuleName, rounding: number): Verdict {
  if (rule === 'simple' || guardBand === 0) return room >= 0 ? 'pass' : 'fail'
  if (guardBand === null) return room >= 0 ? 'conditional_pass' : 'conditional_fail'
  if (room > guardBand + rounding) return 'pass'
  if (room >= 0) return 'conditional_pass'
  return -room <= guardBand + rounding ? 'conditional_fail' : 'fail'
}

/** Whether the instrument is good enough for the limit. */
export const FITNESSES = ['decides', 'near_limits', 'cannot', 'one_limit', 'not_known'] as const
export type Fitness = (typeof FITNESSES)[number]

/** The ratio usually asked for (ANSI/NCSL Z540.3, 5.3: 4:1 where the risk is not worked out). */
export const USUAL_RATIO = 4

/** How fit an instrument is for a limit by the test uncertainty ratio; `name` is what the bench calls it: "your counter". */
export function fitnessOf(ratio: number | null): Fitness {
  if (ratio === null) return 'not_known'
  return ratio >= USUAL_RATIO ? 'decides' : ratio > 1 ? 'near_limits' : 'cannot'
}

/** The same in words, to stand beside a checkpoint. */
export function fitnessInWords(fitness: Fitness, instrument: string, ratio: number | null): string {
  const figure = ratio === null ? '' : ` (limit ${ratio >= 10 ? ratio.toFixed(0) : ratio.toFixed(1)} times its uncertainty)`
  switch (fitness) {
    case 'decides': return `${instrument} can decide this${figure}.`
    case 'near_limits': return `${instrument} can decide this only well away from the limits${figure}; 4 times is usual.`
    case 'cannot': return `${instrument} can’t decide this${figure}: its own doubt is wider than the limit.`
    case 'one_limit': return `Measured with ${instrument}. With one limit only there is no width to hold its uncertainty against.`
    default: return `How well ${instrument} measures this is not known, so nothing here is more than an indication.`
  }
}
