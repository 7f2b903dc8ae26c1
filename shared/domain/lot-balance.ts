import type { MovementKind } from './part-lots'

/** What came in and where it went, in the smallest unit: `cameIn` = `fitted` + `sold` + `scrapped` + `lost` + `inDrawer`. */
export interface LotBalanceFacts { cameIn: number, fitted: number, sold: number, scrapped: number, lost: number, inDrawer: number }

/**
 * The balance of a lot from all that moved in and out of its drawer. `quantity` is above nought into the drawer; a reversal is
 * of the same kind the other way, so that sums by kind are what stands. Common practice in the trade, no source.
 */
export function balanceOf(movements: readonly { kind: MovementKind, quantity: number }[]): LotBalanceFacts {
  const sum = (...kinds: MovementKind[]) => movements.reduce((total, { kind, quantity }) => kinds.includes(kind) ? total + quantity : total, 0)
  // A nought taken the other way would be −0, which no test and no reader expects.
  const out = (kind: MovementKind) => 0 - sum(kind)
  return {
    cameIn: sum('received', 'found', 'split_off', 'put_back'),
    fitted: out('fitted'),
    sold: out('sold'),
    scrapped: out('scrapped'),
    lost: out('lost'),
    inDrawer: movements.reduce((total, { quantity }) => total + quantity, 0),
  }
}
