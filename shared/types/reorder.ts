import type { BoughtFor } from '../domain/reorder'
import type { PartTypeView } from './part'

/** A type of part with how many may be fitted, in its smallest unit: those of good lots. */
export interface PartStock { type: PartTypeView, inStock: number }

/** A type of which fewer are there than its minimum. Suppliers and costs are null for those who may not see them. */
export interface ReorderLine extends PartStock {
  minimum: number
  /** How many are missing to the minimum, in the smallest unit: always above 0. */
  short: number
  /** Who sold the last lot that was bought. */
  lastSupplier: string | null
  /** What the last lot of known cost was bought for. */
  lastBought: BoughtFor | null
}
