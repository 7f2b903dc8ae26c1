import { describe, expect, it } from 'vitest'
import { GUARDS, possibleMoves, UNIT_STATES } from '../../../../shared/domain/unit-states'
import { guardLinks, movePage, movePermission } from '../../../../shared/domain/unit-moves'

describe('who may make a move', () => {
  it.each([
    ['intake', 'bench', 'unit.move'],
    ['ready', 'offered', 'unit.offer'],
    ['held', 'offered', 'unit.move'],
    ['offered', 'held', 'unit.move'],
    ['offered', 'sold', 'unit.sell'],
    ['sold', 'offered', 'unit.sell'],
    ['sold', 'dispatched', 'unit.move'],
    ['dispatched', 'returned', 'unit.sell'],
    ['bench', 'parted', 'unit.write-off'],
    ['bench', 'written_off', 'unit.write-off'],
  ] as const)('%s to %s needs %s', (from, to, permission) => {
    expect(movePermission(from, to)).toBe(permission)
  })
})

describe('where a move is made', () => {
  it('has a page exactly for those that ask for more than a reason', () => {
    const paged = UNIT_STATES.flatMap(from => possibleMoves(from).filter(to => movePage('U0000016', from, to) !== null).map(to => `${from}>${to}`))
    expect(paged.sort()).toEqual(['dispatched>returned', 'held>sold', 'offered>held', 'offered>sold', 'sold>offered', 'sold>returned'])
  })
})

describe('where a guard is satisfied', () => {
  it('names pages of this unit, and only guards that there are', () => {
    for (const [guard, href] of Object.entries(guardLinks('U0000016'))) {
      expect(GUARDS).toContain(guard)
      expect(href).toMatch(/^\/units\/U0000016\//)
    }
  })
})
