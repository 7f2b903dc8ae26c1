/**
 * A reading from what was typed to what follows: error, uncertainty, verdict, and whether the instrument is good enough.
 * The same function judges in the browser as it is typed and on the server when it is saved and signed.
 */
import type { Capability } from './accuracy'
import { accuracyInWords, covers, readingComponents, yearsBetween } from './accuracy'
import type { Checkpoint } from './checkpoint'
import type { DecisionRule, Fitness, Judgement } from './decision'
import { fitnessInWords, fitnessOf, judge } from './decision'
import type { Bounds } from './limits'
import { boundsOf } from './limits'
import { formatTag } from './tag'
import type { Taken } from './taken'
import { readTaken } from './taken'
import type { Uncertainty } from './uncertainty'
import { evaluate } from './uncertainty'

/** An instrument that may have taken the reading. */
export interface Gauge {
  id: string
  /** "B 000003 T Counter". */
  name: string
  capabilities: readonly Capability[]
  /** Years since its calibration in force on the day of the sitting; null where none is recorded. */
  yearsSinceCalibration: number | null
}

/** An instrument's record as a gauge of a day (`2026-11-30`). */
export function gaugeOf(instrument: { id: string, tag: string, name: string, capabilities: readonly Capability[], calibratedOn: string | null }, day: string): Gauge {
  return {
    id: instrument.id,
    name: `${instrument.name} (${formatTag(instrument.tag)})`,
    capabilities: instrument.capabilities,
    yearsSinceCalibration: yearsBetween(instrument.calibratedOn, day),
  }
}

export interface Result {
  value: number
  /** Reading less nominal, in the base unit; null without a nominal. */
  error: number | null
  /** Per cent of the setting; null without a nominal, or of nought. */
  errorPercent: number | null
  /** Steps of the last place read; null without a nominal, or where the last place is not known. */
  errorCounts: number | null
  count: number
  bounds: Bounds | null
  /** Why the limits could not be taken. */
  limitProblem: string | null
  instrumentId: string | null
  /** The line of the instrument's specification that was used. */
  accuracy: string | null
  uncertainty: Uncertainty | null
  /** Null where the checkpoint has no limit. */
  judgement: Judgement | null
  fitness: Fitness
  fitnessSentence: string
}

export type Evaluated = { ok: true, taken: Taken & { ok: true }, result: Result } | { ok: false, sentence: string }

interface Choice { gauge: Gauge, capability: Capability | null, uncertainty: Uncertainty | null }

function bestOf(gauge: Gauge, { quantity }: Checkpoint, taken: Taken & { ok: true }): Choice | null {
  const fitting = gauge.capabilities.filter(capability => covers(capability, quantity, taken.value))
    .map((capability): Choice => ({ gauge, capability, uncertainty: evaluate(readingComponents(capability, taken, gauge.yearsSinceCalibration)) }))
  return smallest(fitting)
}

/** The choice with the least uncertainty; one whose uncertainty is not known comes last. */
function smallest(choices: readonly Choice[]): Choice | null {
  return choices.reduce<Choice | null>((best, each) =>
    !best || (each.uncertainty?.expanded ?? Number.POSITIVE_INFINITY) < (best.uncertainty?.expanded ?? Number.POSITIVE_INFINITY) ? each : best, null)
}

/**
 * The instrument that a reading is put down to: the one named, else of the sheet's the one that measures it best. Null
 * where none of them measures such a value.
 */
export function chooseInstrument(checkpoint: Checkpoint, taken: Taken & { ok: true }, gauges: readonly Gauge[], namedId: string | null): Choice | null {
  const named = namedId === null ? null : gauges.find(({ id }) => id === namedId) ?? null
  if (named) return bestOf(named, checkpoint, taken) ?? { gauge: named, capability: null, uncertainty: null }
  return smallest(gauges.flatMap(gauge => bestOf(gauge, checkpoint, taken) ?? []))
}

/** A ratio of test uncertainty takes two limits; with one, what is known of the instrument is still known. */
function fitnessFor(judgement: Judgement | null, bounds: Bounds | null, uncertainty: Uncertainty | null): Fitness {
  const hasOneLimit = bounds !== null && (bounds.lower === null || bounds.upper === null)
  return hasOneLimit && uncertainty !== null ? 'one_limit' : fitnessOf(judgement?.ratio ?? null)
}

function fitnessSentenceOf(choice: Choice | null, judgement: Judgement | null, fitness: Fitness): string {
  if (!choice) return 'None of the instruments chosen is known to measure this.'
  if (!choice.capability) return `${choice.gauge.name} has no range on record that covers this reading, so how well it was measured is not known.`
  return judgement ? fitnessInWords(fitness, choice.gauge.name, judgement.ratio) : `Measured with ${choice.gauge.name}.`
}

/** Judges a value already read. */
export function resultOf(checkpoint: Checkpoint, taken: Taken & { ok: true }, choice: Choice | null, rule: DecisionRule): Result {
  const limits = checkpoint.limit === null ? null : boundsOf(checkpoint.limit, checkpoint)
  const bounds = limits?.ok ? limits.bounds : null
  const uncertainty = choice?.uncertainty ?? null
  const judgement = bounds ? judge(taken.value, bounds, uncertainty, rule) : null
  const error = checkpoint.nominal === null ? null : taken.value - checkpoint.nominal
  const fitness = fitnessFor(judgement, bounds, uncertainty)
  return {
    value: taken.value,
    error,
    errorPercent: error === null || !checkpoint.nominal ? null : error * 100 / Math.abs(checkpoint.nominal),
    errorCounts: error === null || !(taken.step > 0) ? null : error / taken.step,
    count: taken.count,
    bounds,
    limitProblem: limits && !limits.ok ? limits.sentence : null,
    instrumentId: choice?.gauge.id ?? null,
    accuracy: choice?.capability ? accuracyInWords(choice.capability) : null,
    uncertainty,
    judgement,
    fitness,
    fitnessSentence: fitnessSentenceOf(choice, judgement, fitness),
  }
}

/** Reads and judges what was typed; a sentence where it can't be read. */
export function evaluateReading(typed: string, checkpoint: Checkpoint, gauges: readonly Gauge[], namedId: string | null, rule: DecisionRule): Evaluated {
  const taken = readTaken(typed, checkpoint)
  if (!taken.ok) return taken
  return { ok: true, taken, result: resultOf(checkpoint, taken, chooseInstrument(checkpoint, taken, gauges, namedId), rule) }
}
