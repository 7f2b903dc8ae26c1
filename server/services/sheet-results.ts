import type { testSheets } from '../../drizzle/schema'
import { readings } from '../../drizzle/schema'
import type { Checkpoint } from '../../shared/domain/checkpoint'
import type { DecisionRule } from '../../shared/domain/decision'
import type { Gauge, Result } from '../../shared/domain/evaluation'
import { evaluateReading } from '../../shared/domain/evaluation'
import type { TakenView } from '../../shared/types/bench'

export type SheetRow = typeof testSheets.$inferSelect
export type ReadingRow = typeof readings.$inferSelect

/** The columns of a reading that make its checkpoint. */
export const checkpointFields = {
  section: readings.section, bandLabel: readings.bandLabel, label: readings.label, quantity: readings.quantity,
  atHz: readings.atHz, nominal: readings.nominal, span: readings.span, limitSpec: readings.limitSpec,
}
export type CheckpointFields = Pick<ReadingRow, keyof typeof checkpointFields>

/** A row's checkpoint: its limit as copied on the day. */
export function toCheckpoint({ section, bandLabel, label, quantity, atHz, nominal, span, limitSpec }: CheckpointFields): Checkpoint {
  return { section, bandLabel, label, quantity, atHz, nominal, span, limit: limitSpec }
}

/** The columns for a checkpoint. */
export function fromCheckpoint({ limit, ...checkpoint }: Checkpoint): CheckpointFields {
  const { section, bandLabel, label, quantity, atHz, nominal, span } = checkpoint
  return { section, bandLabel, label, quantity, atHz, nominal, span, limitSpec: limit }
}

/** The rule by which a sheet is judged. */
export const ruleOf = ({ decisionRule, guardFactor }: Pick<SheetRow, 'decisionRule' | 'guardFactor'>): DecisionRule => ({ rule: decisionRule, factor: guardFactor })

/** What follows from one text of a reading, computed afresh by the same function as in the browser; null while not read. */
function computed(text: string | null, row: ReadingRow, gauges: readonly Gauge[], rule: DecisionRule): Result | null {
  if (text === null) return null
  const evaluated = evaluateReading(text, toCheckpoint(row), gauges, row.instrumentId, rule)
  // What was understood when it was saved is understood now; if a later rule of reading refuses it, it is shown as not read.
  return evaluated.ok ? evaluated.result : null
}

/** Both results of a reading: as signed where the sheet is signed, else as they come out now. */
export function resultsOf(row: ReadingRow, gauges: readonly Gauge[], rule: DecisionRule): { found: Result | null, left: Result | null } {
  return row.signedResults ?? { found: computed(row.foundText, row, gauges, rule), left: computed(row.leftText, row, gauges, rule) }
}

/** A text with its result, as the sheet shows it. */
export const takenView = (text: string | null, result: Result | null): TakenView | null => text === null || result === null ? null : { text, result }
