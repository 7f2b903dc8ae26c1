/**
 * Between what a reading must lie: as a specification states it, and in figures. Amounts are in the base unit of the
 * quantity (see `reading.ts`), per cents in per cent, decibels in dB.
 */
import type { Quantity } from './reading'

export const SIMPLE_LIMIT_KINDS = ['percent_of_setting', 'percent_of_span', 'absolute', 'decibel'] as const
export type SimpleLimitKind = (typeof SIMPLE_LIMIT_KINDS)[number]
/** ± an amount about the nominal value. */
export interface SimpleLimit { kind: SimpleLimitKind, amount: number }

export type Limit
  = | SimpleLimit
    /** ± whichever of two is larger: "±1 % or ±2 kHz, whichever is greater". */
    | { kind: 'larger_of', of: [SimpleLimit, SimpleLimit] }
    | { kind: 'at_least', value: number }
    | { kind: 'at_most', value: number }
    | { kind: 'between', lower: number, upper: number }
export type LimitKind = Limit['kind']

export const LIMIT_KINDS = [...SIMPLE_LIMIT_KINDS, 'larger_of', 'at_least', 'at_most', 'between'] as const
export const LIMIT_KIND_LABELS: Record<LimitKind, string> = {
  percent_of_setting: '± per cent of setting',
  percent_of_span: '± per cent of full scale',
  absolute: '± amount',
  decibel: '± dB',
  larger_of: 'the larger of two',
  at_least: 'at least',
  at_most: 'at most',
  between: 'from … to …',
}

/** What the limit is stated about: the nominal value and the full scale, in the base unit. */
export interface LimitBase { quantity: Quantity, nominal: number | null, span: number | null }

/** The limits in figures; null on a side where there is none. */
export interface Bounds { lower: number | null, upper: number | null }

export type BoundsResult = { ok: true, bounds: Bounds } | { ok: false, sentence: string }

const refuse = (sentence: string): BoundsResult => ({ ok: false, sentence })

/** Quantities that are logarithmic already: ± dB is added, not multiplied. */
const LOGARITHMIC: readonly Quantity[] = ['level', 'power_level']

/** How many dB a factor of ten is: 20 for what goes as a voltage, 10 for power. */
export const decibelsPerDecade = (quantity: Quantity): number => quantity === 'power' ? 10 : 20

/** The half-width of a ± limit in the base unit, or a sentence if it can't be taken. A ± dB limit of a voltage is not symmetrical and has none. */
function halfWidth(limit: SimpleLimit, { nominal, span }: LimitBase): number | string {
  if (!(limit.amount >= 0) || !Number.isFinite(limit.amount)) return 'A limit must be zero or more'
  if (limit.kind === 'absolute') return limit.amount
  if (limit.kind === 'percent_of_span') return span === null ? 'A limit in per cent of full scale needs the full scale' : Math.abs(span) * limit.amount / 100
  return nominal === null ? 'A limit in per cent of the setting needs the setting' : Math.abs(nominal) * limit.amount / 100
}

function decibelBounds(amount: number, { quantity, nominal }: LimitBase): BoundsResult {
  if (nominal === null) return refuse('A limit in dB needs the nominal value')
  if (!(amount >= 0) || !Number.isFinite(amount)) return refuse('A limit must be zero or more')
  if (LOGARITHMIC.includes(quantity)) return { ok: true, bounds: { lower: nominal - amount, upper: nominal + amount } }
  const factor = 10 ** (amount / decibelsPerDecade(quantity))
  const edges = [nominal / factor, nominal * factor]
  return { ok: true, bounds: { lower: Math.min(...edges), upper: Math.max(...edges) } }
}

function aboutNominal(limit: SimpleLimit, base: LimitBase): BoundsResult {
  if (limit.kind === 'decibel') return decibelBounds(limit.amount, base)
  const half = halfWidth(limit, base)
  if (typeof half === 'string') return refuse(half)
  if (base.nominal === null) return refuse('A ± limit needs the nominal value')
  return { ok: true, bounds: { lower: base.nominal - half, upper: base.nominal + half } }
}

function widest(first: BoundsResult, second: BoundsResult): BoundsResult {
  if (!first.ok) return first
  if (!second.ok) return second
  const side = (name: 'lower' | 'upper', take: (...values: number[]) => number) => {
    const [one, other] = [first.bounds[name], second.bounds[name]]
    return one === null || other === null ? null : take(one, other)
  }
  return { ok: true, bounds: { lower: side('lower', Math.min), upper: side('upper', Math.max) } }
}

/** A limit in figures, or a sentence that says what is missing or the wrong way round. */
export function boundsOf(limit: Limit, base: LimitBase): BoundsResult {
  switch (limit.kind) {
    case 'at_least': return { ok: true, bounds: { lower: limit.value, upper: null } }
    case 'at_most': return { ok: true, bounds: { lower: null, upper: limit.value } }
    case 'between': return limit.lower > limit.upper
      ? refuse('The lower limit is above the upper: swap them or mend one')
      : { ok: true, bounds: { lower: limit.lower, upper: limit.upper } }
    case 'larger_of': return widest(aboutNominal(limit.of[0], base), aboutNominal(limit.of[1], base))
    default: return aboutNominal(limit, base)
  }
}
