/**
 * What was typed for one checkpoint, as a measurement: one reading, or several of the same thing ("98.21k; 98.19k"), or
 * for a modulation depth the highest and the lowest of the envelope ("8/2").
 */
import type { Checkpoint } from './checkpoint'
import { HIGHEST_HZ } from './frequency'
import { parseDecimal, toNumber } from './decimal'
import { parseReading } from './reading'
import type { Measured } from './accuracy'
import { mean, standardDeviation } from './statistics'

export type Taken
  = | (Measured & { ok: true, unitAssumed: boolean, typedUnit: string, question: string | null })
    | { ok: false, sentence: string }

const MOST_REPEATS = 50
/** What a frequency, a resistance and the like can't be. */
const ABOVE_ZERO = ['frequency', 'capacitance', 'inductance', 'duration'] as const

const TOO_LARGE = 'That is beyond what can be kept. Check the number.'

const refuse = (sentence: string): Taken => ({ ok: false, sentence })

/**
 * Depth in per cent from the highest and the lowest of the envelope, in any unit alike: (max − min)/(max + min). Usual
 * formula, envelope or trapezoid; over-modulation can't be read from it.
 */
function depthFromEnvelope(text: string): Taken | null {
  const parts = /^([\d.,]+)\s*(\p{L}*)\s*\/\s*([\d.,]+)\s*(\p{L}*)$/u.exec(text)
  if (!parts) return null
  if (parts[2] && parts[4] && parts[2] !== parts[4]) return refuse('Write the highest and the lowest of the envelope in the same unit, or without one: 8/2.')
  const [highest, lowest] = [parseDecimal(parts[1] ?? ''), parseDecimal(parts[3] ?? '')]
  if (!highest.ok || !lowest.ok) return refuse('Write the highest and the lowest of the envelope like 8/2.')
  const [top, bottom] = [toNumber(highest.decimal), toNumber(lowest.decimal)]
  if (bottom > top) return refuse('The highest of the envelope comes first: 8/2.')
  if (top + bottom === 0) return refuse('An envelope of nought has no depth. Check the trace.')
  const step = 10 ** -Math.min(highest.decimal.fraction.length, lowest.decimal.fraction.length)
  // One step of the highest or the lowest moves the depth by no more than this.
  const sensitivity = 2 * Math.max(top, bottom) / (top + bottom) ** 2
  return { ok: true, value: 100 * (top - bottom) / (top + bottom), step: 100 * sensitivity * step, count: 1, deviation: 0, unitAssumed: false, typedUnit: '%', question: null }
}

/** Reads one value: its number, unit and last place. */
function readOne(text: string, { quantity, nominal, atHz }: Pick<Checkpoint, 'quantity' | 'nominal' | 'atHz'>): Taken {
  const expected = nominal ?? (quantity === 'frequency' ? atHz : null)
  const reading = parseReading(text, quantity, expected === null ? {} : { nominal: expected })
  if (!reading.ok) return refuse(reading.sentence)
  if (ABOVE_ZERO.some(each => each === quantity) && !(reading.value > 0)) return refuse('A reading of this kind must be above zero. Leave it empty if nothing was read.')
  if (!Number.isFinite(reading.value)) return refuse(TOO_LARGE)
  if (quantity === 'frequency' && reading.value > HIGHEST_HZ) return refuse('That is above 3 000 GHz, the highest frequency kept. Check the unit.')
  return {
    ok: true, value: reading.value, step: reading.resolution, count: 1, deviation: 0,
    unitAssumed: reading.unitAssumed, typedUnit: reading.typedUnit, question: reading.suspicious?.sentence ?? null,
  }
}

/** A unit said once at the end holds for those before it: "98.21; 98.19; 98.20 kc". */
function withUnits(parts: readonly string[]): string[] {
  const unit = /[^\d.,\s+\u2212-]+[^\d]*$/u.exec(parts.at(-1) ?? '')?.[0] ?? ''
  return parts.map(part => /^[-+\u2212]?[\d.,\s]+$/u.test(part) ? `${part} ${unit}` : part)
}

/** Reads what was typed for a checkpoint. Several readings are parted by a semicolon; the value is their mean. */
export function readTaken(typed: string, checkpoint: Pick<Checkpoint, 'section' | 'quantity' | 'nominal' | 'atHz'>): Taken {
  const parts = typed.split(';').map(part => part.trim()).filter(Boolean)
  if (parts.length === 0) return readOne(typed, checkpoint)
  const depth = checkpoint.section === 'modulation' && checkpoint.quantity === 'percent' && parts.length === 1 ? depthFromEnvelope(parts[0] ?? '') : null
  if (depth) return depth
  if (parts.length > MOST_REPEATS) return refuse(`Type ${MOST_REPEATS} repeat readings at most.`)
  const values: (Taken & { ok: true })[] = []
  for (const part of withUnits(parts)) {
    const one = readOne(part, checkpoint)
    if (!one.ok) return one
    values.push(one)
  }
  const [first] = values
  if (!first || values.length === 1) return first ?? refuse('Enter the reading.')
  const numbers = values.map(({ value }) => value)
  const [value, deviation] = [mean(numbers), standardDeviation(numbers)]
  if (!Number.isFinite(value) || !Number.isFinite(deviation)) return refuse(TOO_LARGE)
  return {
    ...first, value, count: numbers.length, deviation, unitAssumed: values.some(({ unitAssumed }) => unitAssumed),
    step: Math.max(...values.map(({ step }) => step)), question: values.find(({ question }) => question !== null)?.question ?? null,
  }
}
