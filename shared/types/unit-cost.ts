import type { BenchTime, UnitCost } from '../domain/unit-cost'

/** What a unit has really cost; only ever sent to those who may see costs. Amounts in minor units. */
export interface UnitCostView extends UnitCost {
  benchRateMinor: number | null
  minutesSpent: number
  /** Null: none is set. */
  ceilingMinutes: number | null
  benchTime: BenchTime
  version: number
}
