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

/** A version as the list of them names it. */
export interface ProcedureSummary extends Pick<ProcedureView, 'number' | 'origin' | 'why' | 'madeBy' | 'madeAt'> { checkpointCount: number }

/** Another model's procedure as a draft for this one. */
export interface ProcedureCopy extends Pick<ProcedureView, 'origin' | 'warmUpMinutes' | 'supply' | 'decisionRule' | 'checkpoints'> {
  /** Dial points that lie in none of this model's bands. */
  leftOut: string[]
  /** What is copied under a band of the other model that this one has not: "Output level: F, 5 MHz". */
  strangers: string[]
}
