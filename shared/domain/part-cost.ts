/**
 * What a quantity of a lot costs. A lot keeps how many are left and what those cost, and each part that goes out takes its
 * share of what is left, so that nothing is lost in rounding: cost in = cost of what went out + cost of what is left, to the
 * cent, in whatever order parts go out and come back.
 */
export interface LotStock {
  /** In the smallest unit, 0 or more. */
  quantity: number
  /** What they cost together, minor units; null where it is not known. */
  costMinor: number | null
}

/**
 * The share that `quantity` of what is left takes with it, in minor units: exact, rounded to the nearest (a half upwards); the
 * last takes all that is left. Null where the lot's cost is not known. Throws a RangeError for more than is left, or not above 0.
 */
export function costOf(stock: LotStock, quantity: number): number | null {
  if (!Number.isSafeInteger(quantity) || quantity <= 0 || quantity > stock.quantity) throw new RangeError('A quantity must be above 0 and no more than is left')
  if (stock.costMinor === null) return null
  // In BigInt: cost × quantity may pass 2⁵³.
  const [cost, part, whole] = [BigInt(stock.costMinor), BigInt(quantity), BigInt(stock.quantity)]
  return Number((2n * cost * part + whole) / (2n * whole))
}

/** What one of the smallest unit costs, in minor units and not rounded; null where not known or nothing is left. */
export const unitCostOf = ({ quantity, costMinor }: LotStock): number | null => costMinor === null || quantity === 0 ? null : costMinor / quantity
