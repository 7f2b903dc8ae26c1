import { describe, expect, it } from 'vitest'
import { HANDS } from '../../../../shared/domain/modifications'
import type { Guard, ModificationFacts, UnitFacts, UnitState } from '../../../../shared/domain/unit-states'
import {
  decideModification, decideMove, GUARDS, moveDeed, moveNeedsReason, possibleMoves, safetyCheckIsCurrent, UNIT_STATES,
} from '../../../../shared/domain/unit-states'

/** A unit about which nothing stands in the way of any move. */
const CLEAR: UnitFacts = {
  hasTriage: true,
  hazardHold: false,
  lastWorkAt: '2026-03-01T10:00:00Z',
  lastSafetyPass: '2026-03-02T10:00:00Z',
  notEnergisedDisclosure: false,
  missingDisclosures: [],
  askingPriceMinor: 24_000,
  missingSaleDetails: [],
  keptWithNotPacked: [],
  pulledLots: 0,
  ownership: 'bought',
  ownerConsent: false,
  reason: 'because',
}
/** A unit about which everything does. */
const BLOCKED: UnitFacts = {
  hasTriage: false,
  hazardHold: true,
  lastWorkAt: '2026-03-02T10:00:00Z',
  lastSafetyPass: '2026-03-01T10:00:00Z',
  notEnergisedDisclosure: false,
  missingDisclosures: ['Safety', 'Rear', 'Terms'],
  askingPriceMinor: null,
  missingSaleDetails: ['buyer', 'price'],
  keptWithNotPacked: ['K 000004 Y handbook'],
  pulledLots: 3,
  ownership: 'consigned',
  ownerConsent: false,
  reason: ' ',
}
const PAIRS = UNIT_STATES.flatMap(from => UNIT_STATES.map((to): [UnitState, UnitState] => [from, to]))

function refusedBy(from: UnitState, to: UnitState, facts: UnitFacts): Guard[] {
  const decision = decideMove(from, to, facts)
  return decision.allowed ? [] : decision.refusals.map(refusal => refusal.guard)
}

describe('the moves', () => {
  it('are the life of a unit, with its ways back and its ends', () => {
    const chain: UnitState[] = ['intake', 'bench', 'ready', 'offered', 'held', 'sold', 'dispatched', 'returned', 'bench']
    for (const [index, from] of chain.slice(0, -1).entries()) expect(possibleMoves(from)).toContain(chain[index + 1])
    expect(possibleMoves('parted')).toEqual(['bench'])
    expect(possibleMoves('offered')).toContain('sold')
    for (const state of ['intake', 'bench', 'ready'] as const) expect(possibleMoves(state)).toEqual(expect.arrayContaining(['parted', 'written_off']))
  })

  it.each(PAIRS)('%s to %s is allowed exactly when it exists, if nothing stands in the way', (from, to) => {
    expect(decideMove(from, to, CLEAR).allowed).toBe(possibleMoves(from).includes(to))
  })

  it.each(PAIRS)('%s to %s, if refused, says why and what would satisfy each guard, once', (from, to) => {
    const decision = decideMove(from, to, BLOCKED)
    if (decision.allowed) return
    const guards = decision.refusals.map(refusal => refusal.guard)
    expect(new Set(guards).size).toBe(guards.length)
    for (const refusal of decision.refusals) {
      expect(GUARDS).toContain(refusal.guard)
      expect(refusal.sentence).toMatch(/^\S.*\.$/)
      expect(refusal.remedy).toMatch(/^\S.*\.$/)
    }
  })

  it('that do not exist are refused as that alone, and name those that do', () => {
    const decision = decideMove('intake', 'sold', BLOCKED)
    expect(refusedBy('intake', 'sold', BLOCKED)).toEqual(['no-such-move'])
    expect(decision.allowed ? '' : decision.refusals[0]?.remedy).toContain('“On the bench”')
    expect(refusedBy('bench', 'bench', CLEAR)).toEqual(['no-such-move'])
  })

  it('have a deed for their button', () => {
    for (const from of UNIT_STATES) for (const to of possibleMoves(from)) expect(moveDeed(from, to)).not.toBe('')
    expect(moveDeed('bench', 'ready')).toBe('Mark as ready')
    expect(moveDeed('held', 'offered')).toBe('Release the hold')
  })
})

/** For each guard: the fact that trips it alone, and the moves it stands over, of all that exist. */
const GUARDED: [Guard, Partial<UnitFacts>, (from: UnitState, to: UnitState) => boolean][] = [
  ['triage', { hasTriage: false }, (from, to) => !['bench', 'returned'].includes(to) && !(to === 'written_off' && from !== 'bench')],
  ['hazard-hold', { hazardHold: true }, (_from, to) => !['bench', 'returned'].includes(to)],
  ['safety-check', { lastSafetyPass: null }, (from, to) =>
    (to === 'ready' && from === 'bench') || (to === 'offered' && from !== 'sold') || to === 'sold'],
  ['disclosures', { missingDisclosures: ['Safety'] }, (from, to) => to === 'offered' && from !== 'sold'],
  ['asking-price', { askingPriceMinor: null }, (_from, to) => to === 'offered'],
  ['sale-details', { missingSaleDetails: ['buyer'] }, (_from, to) => to === 'sold'],
  ['kept-with', { keptWithNotPacked: ['handbook'] }, (_from, to) => to === 'dispatched'],
  ['reason', { reason: null }, (from, to) => ['parted', 'written_off'].includes(to) || from === 'written_off' || from === 'parted' || (from === 'sold' && to === 'offered')],
  ['owner-consent', { ownership: 'consigned' }, (_from, to) => to === 'parted'],
  ['pulled-parts', { pulledLots: 1 }, (from, to) => from === 'parted' && to === 'bench'],
]

describe.each(GUARDED)('the guard %s', (guard, trips, standsOver) => {
  const moves = PAIRS.filter(([from, to]) => possibleMoves(from).includes(to))

  it.each(moves)('on %s to %s', (from, to) => {
    expect(refusedBy(from, to, { ...CLEAR, ...trips })).toEqual(standsOver(from, to) ? [guard] : [])
  })
})

describe('what the guards say', () => {
  it('lets a unit onto the bench whatever is wrong with it, and off it only after triage', () => {
    expect(refusedBy('intake', 'bench', BLOCKED)).toEqual([])
    expect(refusedBy('returned', 'bench', BLOCKED)).toEqual([])
    expect(refusedBy('bench', 'ready', { ...CLEAR, hasTriage: false })).toEqual(['triage'])
  })

  it('takes back a unit on hazard hold: a recall must be able to come home', () => {
    expect(refusedBy('dispatched', 'returned', BLOCKED)).toEqual([])
  })

  it('lists every guard at once', () => {
    expect(refusedBy('bench', 'ready', BLOCKED)).toEqual(['triage', 'hazard-hold', 'safety-check'])
    expect(refusedBy('ready', 'offered', BLOCKED)).toEqual(['triage', 'hazard-hold', 'safety-check', 'disclosures', 'asking-price'])
    expect(refusedBy('bench', 'parted', BLOCKED)).toEqual(['triage', 'hazard-hold', 'reason', 'owner-consent'])
  })

  it('wants a safety check newer than the last work', () => {
    expect(safetyCheckIsCurrent({ lastSafetyPass: '2026-03-02T10:00:00Z', lastWorkAt: null })).toBe(true)
    expect(safetyCheckIsCurrent({ lastSafetyPass: null, lastWorkAt: null })).toBe(false)
    expect(safetyCheckIsCurrent({ lastSafetyPass: '2026-03-02T10:00:00Z', lastWorkAt: '2026-03-02T10:00:00Z' })).toBe(false)
    expect(safetyCheckIsCurrent({ lastSafetyPass: '2026-03-02T10:00:00+02:00', lastWorkAt: '2026-03-02T09:00:00Z' })).toBe(false)
    expect(safetyCheckIsCurrent({ lastSafetyPass: '2026-03-02T10:00:01Z', lastWorkAt: '2026-03-02T10:00:00Z' })).toBe(true)
  })

  it('takes "untested, not to be energised" in place of a safety check', () => {
    expect(refusedBy('bench', 'ready', { ...CLEAR, lastSafetyPass: null, notEnergisedDisclosure: true })).toEqual([])
  })

  it('lists what is missing by name', () => {
    const said = (from: UnitState, to: UnitState): string => {
      const decision = decideMove(from, to, { ...BLOCKED, hasTriage: true, hazardHold: false, notEnergisedDisclosure: true })
      return decision.allowed ? '' : decision.refusals.map(refusal => refusal.sentence).join(' ')
    }
    expect(said('ready', 'offered')).toContain('Safety, Rear and Terms')
    expect(said('offered', 'sold')).toContain('buyer and price')
    expect(said('sold', 'dispatched')).toContain('K 000004 Y handbook')
  })

  it('asks nothing more of a consigned unit when it is offered', () => {
    expect(refusedBy('ready', 'offered', { ...CLEAR, ownership: 'consigned' })).toEqual([])
    expect(refusedBy('bench', 'parted', { ...CLEAR, ownership: 'consigned', ownerConsent: true })).toEqual([])
  })

  it('never sells a unit broken for parts, and says so', () => {
    for (const to of ['ready', 'offered', 'held', 'sold', 'dispatched'] as const) expect(refusedBy('parted', to, CLEAR)).toEqual(['parted'])
  })

  it('has no price of nought', () => {
    expect(refusedBy('ready', 'offered', { ...CLEAR, askingPriceMinor: 0 })).toEqual(['asking-price'])
  })

  it('points to where the remedy is, when told', () => {
    const decision = decideMove('bench', 'ready', { ...CLEAR, hasTriage: false, links: { triage: '/units/U0000016/triage' } })
    expect(decision.allowed ? [] : decision.refusals).toMatchObject([{ guard: 'triage', href: '/units/U0000016/triage' }])
    const without = decideMove('bench', 'ready', { ...CLEAR, hasTriage: false })
    expect(without.allowed ? {} : without.refusals[0]).not.toHaveProperty('href')
  })

  it('asks a reason for exactly the moves that end a unit or undo something', () => {
    expect(PAIRS.filter(([from, to]) => possibleMoves(from).includes(to) && moveNeedsReason(from, to)).map(([from, to]) => `${from}>${to}`)).toEqual([
      'intake>parted', 'intake>written_off', 'bench>parted', 'bench>written_off', 'ready>parted', 'ready>written_off', 'offered>written_off',
      'held>written_off', 'sold>offered', 'parted>bench', 'written_off>bench',
    ])
  })
})

describe('decideModification', () => {
  const facts = (over: Partial<ModificationFacts>): ModificationFacts => ({ state: 'bench', hand: 'done_by_us', ownership: 'bought', ownerConsent: false, ...over })
  const closed: readonly UnitState[] = ['sold', 'dispatched', 'parted', 'written_off']

  it.each(UNIT_STATES.flatMap(state => HANDS.map(hand => ({ state, hand }))))('on a unit in $state, $hand', ({ state, hand }) => {
    expect(decideModification(facts({ state, hand })).allowed).toBe(!closed.includes(state))
    const guards = (over: Partial<ModificationFacts>): Guard[] => {
      const decision = decideModification(facts({ state, hand, ownership: 'consigned', ...over }))
      return decision.allowed ? [] : decision.refusals.map(refusal => refusal.guard)
    }
    const always: Guard[] = closed.includes(state) ? ['record-closed'] : []
    expect(guards({})).toEqual(hand === 'done_by_us' ? [...always, 'owner-consent'] : always)
    expect(guards({ ownerConsent: true })).toEqual(always)
  })
})
