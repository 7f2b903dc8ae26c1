import type { Permission } from './roles'
import type { UnitState } from './unit-state-names'
import type { Guard } from './unit-states'

/** What a person must hold to make a move. Releasing a hold is a move like any other; offering afresh is the owner's. */
export function movePermission(from: UnitState, to: UnitState): Permission {
  if (to === 'sold' || (from === 'sold' && to === 'offered') || to === 'returned') return 'unit.sell'
  if (to === 'parted' || to === 'written_off') return 'unit.write-off'
  if (to === 'offered' && from !== 'held') return 'unit.offer'
  return 'unit.move'
}

/** The page on which each guard's remedy is carried out, for a unit's compact tag. */
export function guardLinks(tag: string): Partial<Record<Guard, string>> {
  const unit = `/units/${tag}`
  return {
    'triage': `${unit}/triage`,
    'hazard-hold': `${unit}/triage`,
    'safety-check': `${unit}/safety`,
    'disclosures': `${unit}/disclosures`,
    'asking-price': `${unit}/price`,
    'sale-details': `${unit}/sell`,
    'kept-with': `${unit}/pack`,
  }
}

/** Moves that need more than a reason, and so have a page of their own; null for those made on the spot. */
export function movePage(tag: string, from: UnitState, to: UnitState): string | null {
  if (to === 'held') return `/units/${tag}/hold`
  if (to === 'sold') return `/units/${tag}/sell`
  if (to === 'returned' || (from === 'sold' && to === 'offered')) return `/units/${tag}/take-back`
  return null
}
