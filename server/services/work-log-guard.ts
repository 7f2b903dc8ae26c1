import type { Hand } from '../../shared/domain/modifications'
import { guardLinks } from '../../shared/domain/unit-moves'
import { decideModification } from '../../shared/domain/unit-states'
import { conflict } from '../utils/errors'
import type { UnitRow } from './unit-lock'

/** 409 with every refusal when the unit's work log is closed, or a consigned piece's owner has not agreed to work of ours. */
export function requireOpenLog(unit: UnitRow, said: { hand: Hand, ownerConsent: string }): void {
  const decision = decideModification({
    state: unit.state, hand: said.hand, ownership: unit.ownership, ownerConsent: said.ownerConsent !== '', links: guardLinks(unit.tag),
  })
  if (decision.allowed) return
  const first = decision.refusals[0]
  throw conflict(first?.guard ?? 'refused', decision.refusals.map(({ sentence, remedy }) => `${sentence} ${remedy}`).join(' '), { refusals: decision.refusals })
}
