/** The states of a unit, in the order of a life. The moves between them and their guards are in `unit-states.ts`. */
export const UNIT_STATES = ['intake', 'bench', 'ready', 'offered', 'held', 'sold', 'dispatched', 'returned', 'parted', 'written_off'] as const
export type UnitState = (typeof UNIT_STATES)[number]

export const UNIT_STATE_LABELS: Record<UnitState, string> = {
  intake: 'Intake',
  bench: 'On the bench',
  ready: 'Ready',
  offered: 'Offered',
  held: 'Held',
  sold: 'Sold',
  dispatched: 'Dispatched',
  returned: 'Returned',
  parted: 'Broken for parts',
  written_off: 'Written off',
}

/** The states in which a piece is still in the shop's hands. */
export const IN_STOCK_STATES = ['intake', 'bench', 'ready', 'offered', 'held', 'returned'] as const satisfies readonly UnitState[]
