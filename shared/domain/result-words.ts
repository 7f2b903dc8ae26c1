/** A checkpoint's limits and a reading's error and uncertainty in words: the same on the page, the buyer's sheet and in a PDF. */
import { formatAmount, formatWithUncertainty } from './amount'
import type { Checkpoint } from './checkpoint'
import { checkpointInWords } from './checkpoint'
import { formatErrorPercent } from './dial-check'
import type { Result } from './evaluation'
import { NARROW_SPACE } from './frequency'
import type { Limit, SimpleLimit } from './limits'
import { boundsOf } from './limits'
import type { Quantity } from './reading'
import { BASE_UNITS } from './reading'
import { roundUncertainty } from './uncertainty'

const plain = (value: number): string => String(Number(value.toPrecision(6))).replace('-', '\u2212')

function simpleInWords({ kind, amount }: SimpleLimit, quantity: Quantity): string {
  switch (kind) {
    case 'percent_of_setting': return `±${plain(amount)}${NARROW_SPACE}%`
    case 'percent_of_span': return `±${plain(amount)}${NARROW_SPACE}% of full scale`
    case 'decibel': return `±${plain(amount)}${NARROW_SPACE}dB`
    default: return `±${formatAmount(amount, quantity)}`
  }
}

/** "±2 %", "at least 20 dB", "±1 % or ±2 kHz, whichever is more"; "no limit" where none is published. */
export function limitInWords(limit: Limit | null, quantity: Quantity): string {
  if (limit === null) return 'no limit'
  switch (limit.kind) {
    case 'at_least': return `at least ${formatAmount(limit.value, quantity)}`
    case 'at_most': return `at most ${formatAmount(limit.value, quantity)}`
    case 'between': return `${formatAmount(limit.lower, quantity)} to ${formatAmount(limit.upper, quantity)}`
    case 'larger_of': return `${simpleInWords(limit.of[0], quantity)} or ${simpleInWords(limit.of[1], quantity)}, whichever is more`
    default: return simpleInWords(limit, quantity)
  }
}

/** The tolerance of a ± per cent limit, so that an error is shown finely enough not to contradict its verdict. */
function tolerancePercent({ limit, nominal, quantity, span }: Checkpoint): number | undefined {
  if (limit === null || !nominal) return undefined
  const limits = boundsOf(limit, { nominal, quantity, span })
  if (!limits.ok) return undefined
  const { lower, upper } = limits.bounds
  const sides = [lower, upper].flatMap(edge => edge === null ? [] : [Math.abs(edge - nominal) * 100 / Math.abs(nominal)])
  return sides.length > 0 ? Math.max(...sides) : undefined
}

const signed = (value: number, digits: number, unit: string): string => {
  const text = Math.abs(value).toFixed(digits)
  return `${Number(text) === 0 ? '' : value < 0 ? '\u2212' : '+'}${text}${NARROW_SPACE}${unit}`
}

/** How far a reading is off: in dB, in per cent of full scale or of the setting, whichever its limit is stated in; empty without a nominal. */
export function errorInWords(result: Pick<Result, 'error' | 'errorPercent'>, checkpoint: Checkpoint): string {
  const { error, errorPercent } = result
  const { quantity, span, limit } = checkpoint
  if (error === null) return ''
  if (quantity === 'level' || quantity === 'power_level' || quantity === 'percent') return signed(error, 2, BASE_UNITS[quantity])
  if (limit?.kind === 'percent_of_span' && span) return `${signed(error * 100 / Math.abs(span), 2, '%')} of full scale`
  return errorPercent === null ? formatAmount(error, quantity) : formatErrorPercent(errorPercent, tolerancePercent(checkpoint))
}

/** "98.213 kHz ± 0.012 kHz": a value with its expanded uncertainty, rounded as the GUM advises; the bare value where it is not known. */
export function valueInWords({ value, uncertainty }: Pick<Result, 'value' | 'uncertainty'>, quantity: Quantity): string {
  if (!uncertainty || !(uncertainty.expanded > 0)) return formatAmount(value, quantity)
  const rounded = roundUncertainty(uncertainty.expanded)
  return formatWithUncertainty(value, rounded.uncertainty, rounded.place, quantity)
}

/** "±12 Hz": the expanded uncertainty alone; "not known" without one. */
export function uncertaintyInWords({ uncertainty }: Pick<Result, 'uncertainty'>, quantity: Quantity): string {
  if (!uncertainty) return 'not known'
  return `±${formatAmount(roundUncertainty(uncertainty.expanded).uncertainty, quantity)}`
}

/** A level against the set line: that its nominal is 0 dB goes without saying. */
const isSetLine = ({ section, nominal }: Checkpoint): boolean => section === 'output_level' && nominal === 0

/** The nominal value as a row names it; empty where the setting itself or the set line says it. */
export const nominalInWords = (checkpoint: Checkpoint): string =>
  checkpoint.section === 'dial' || isSetLine(checkpoint) || checkpoint.nominal === null ? '' : formatAmount(checkpoint.nominal, checkpoint.quantity)

/** What is to be read, in full: "A, 320 kHz", "HT at V3 anode, 180 V". */
export function checkpointTitle(checkpoint: Checkpoint): string {
  return [checkpoint.bandLabel, checkpointInWords(checkpoint), nominalInWords(checkpoint)].filter(Boolean).join(', ')
}
