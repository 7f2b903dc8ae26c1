import type { Checkpoint } from '../domain/checkpoint'
import type { DecisionRule } from '../domain/decision'

/** One version of a model's procedure, whole. */
export interface ProcedureView {
  id: string
  number: number
  /** What the limits are taken from. */
  origin: string
  /** What changed since the version before. */
  why: string
  warmUpMinutes: number | null
  supply: string
  decisionRule: DecisionRule
  checkpoints: Checkpoint[]
  madeBy: string
  madeAt: string
}
