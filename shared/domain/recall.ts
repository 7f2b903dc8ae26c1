/** When one of the shop's own instruments is found wrong: what can be said of what it read. */
import { formatAmount } from './amount'
import type { Checkpoint } from './checkpoint'
import type { DecisionRule, Verdict } from './decision'
import { judge, VERDICT_LABELS } from './decision'
import type { Result } from './evaluation'
import { decibelsPerDecade } from './limits'
import type { Quantity } from './reading'

/** How the error that was found is stated: by how much the instrument reads too high. */
export const FOUND_ERROR_KINDS = ['percent', 'ppm', 'absolute', 'decibel', 'not_known'] as const
export type FoundErrorKind = (typeof FOUND_ERROR_KINDS)[number]
export const FOUND_ERROR_KIND_LABELS: Record<FoundErrorKind, string> = {
  percent: 'per cent of the reading',
  ppm: 'parts in a million',
  absolute: 'a fixed amount',
  decibel: 'dB',
  not_known: 'not known: readings can’t be put right',
}

export const RECALL_OUTCOMES = ['stands', 'stands_corrected', 'measure_again', 'buyer_told', 'accepted'] as const
export type RecallOutcome = (typeof RECALL_OUTCOMES)[number]
export const RECALL_OUTCOME_LABELS: Record<RecallOutcome, string> = {
  stands: 'The sheet stands as it is',
  stands_corrected: 'It stands with the readings put right',
  measure_again: 'To be measured again',
  buyer_told: 'The buyer was told',
  accepted: 'Left as it is, knowingly',
}

/** What was found: `amount` positive where the instrument reads too high, in the unit of `kind` (absolute: the base unit); null where not known. */
export interface FoundError { kind: FoundErrorKind, amount: number | null }

/** What can't be below nought, so that an error which would leave less was no error of this reading. */
const NEVER_BELOW_NOUGHT: readonly Quantity[] = ['frequency', 'resistance', 'capacitance', 'inductance', 'duration']

/**
 * A reading with the found error taken off, in its base unit; null where it can't be put right. Too high by p per cent means
 * that it showed v·(1 + p/100). In dB a factor for what goes as a voltage or a power, a difference for a level.
 */
export function correctedReading(value: number, quantity: Quantity, { kind, amount }: FoundError): number | null {
  const corrected = amount === null ? null : withoutError(value, quantity, kind, amount)
  if (corrected === null || !Number.isFinite(corrected)) return null
  return corrected < 0 && NEVER_BELOW_NOUGHT.includes(quantity) ? null : corrected
}

function withoutError(value: number, quantity: Quantity, kind: FoundErrorKind, amount: number): number | null {
  switch (kind) {
    case 'percent': return amount > -100 ? value / (1 + amount / 100) : null
    case 'ppm': return amount > -1e6 ? value / (1 + amount / 1e6) : null
    case 'absolute': return value - amount
    case 'decibel': return quantity === 'level' || quantity === 'power_level' ? value - amount : value / 10 ** (amount / decibelsPerDecade(quantity))
    default: return null
  }
}

/** A reading that stood, and what it says once the found error is taken off it. */
export interface Rejudged {
  /** Null where it can't be put right. */
  corrected: number | null
  verdict: Verdict | null
  /** Whether putting it right moves it across a limit, or its verdict to another. */
  changes: boolean
  sentence: string
}

const NOT_KNOWN = 'By how much it was out is not known, so it can’t be put right: measure it again.'
const TOO_MUCH = 'The error found is more than this reading can have been out by, so it can’t be put right: measure it again.'

/**
 * Judges a reading anew with the found error taken off, by the limits and the rule of its sheet and the same uncertainty: what
 * was wrong was the instrument's bias, not how finely it reads.
 */
export function rejudge(checkpoint: Pick<Checkpoint, 'quantity'>, { value, bounds, uncertainty, judgement }: Result, error: FoundError, rule: DecisionRule): Rejudged {
  const corrected = correctedReading(value, checkpoint.quantity, error)
  if (corrected === null) return { corrected: null, verdict: null, changes: true, sentence: error.amount === null ? NOT_KNOWN : TOO_MUCH }
  const shown = formatAmount(Number(corrected.toPrecision(6)), checkpoint.quantity)
  if (!bounds || !judgement) return { corrected, verdict: null, changes: false, sentence: `Put right it is ${shown}; it has no limit to be judged by.` }
  const again = judge(corrected, bounds, uncertainty, rule)
  const [before, after] = [VERDICT_LABELS[judgement.verdict].toLowerCase(), VERDICT_LABELS[again.verdict].toLowerCase()]
  return again.verdict === judgement.verdict
    ? { corrected, verdict: again.verdict, changes: false, sentence: `Put right it is ${shown}: still a ${after}.` }
    : { corrected, verdict: again.verdict, changes: true, sentence: `Put right it is ${shown}: it was a ${before} and is a ${after}.` }
}
