/** How a donor's cost is shared among the parts pulled from it: by what each is worth, with shares set by hand where wanted. */
import { allocate } from './money'

export interface SharedPart {
  /** What the parts of this line are worth together, minor units; the weight of its share. */
  worthMinor: number
  /** The share set by hand, minor units; null: by worth. */
  shareMinor: number | null
}

export type CostShares
  = | { ok: true, shares: number[], carcassMinor: number }
    | { ok: false, sentence: string }

/**
 * Shares `leftMinor`, what of the donor's cost has not been shared yet, among the parts and what stays with the carcass. Shares
 * set by hand stand; the rest goes by worth among the other parts and the carcass, each share exact to the minor unit (largest
 * remainders), so that shares and carcass always add up to `leftMinor`. Nothing worth anything: it stays with the carcass.
 * Refused where the shares set by hand come to more than there is.
 */
export function shareCost(leftMinor: number, parts: readonly SharedPart[], carcassWorthMinor: number): CostShares {
  const byHand = parts.reduce((sum, { shareMinor }) => sum + (shareMinor ?? 0), 0)
  if (byHand > leftMinor) return { ok: false, sentence: 'The shares come to more than is left of what the piece cost. Make one of them smaller.' }
  const open = parts.map(({ worthMinor, shareMinor }) => shareMinor === null ? worthMinor : 0)
  const weights = [...open, carcassWorthMinor]
  const rest = leftMinor - byHand
  const shared = weights.every(weight => weight === 0) ? [...open, rest] : allocate(rest, weights)
  return { ok: true, shares: parts.map(({ shareMinor }, index) => shareMinor ?? shared[index] ?? 0), carcassMinor: shared.at(-1) ?? 0 }
}
