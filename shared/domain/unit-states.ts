/**
 * The moves between the states of a unit and what stands guard over each. Decisions are data: a refused move
 * names every guard that refused, why, and what would satisfy it.
 */
import type { Ownership } from './acquisition'
import type { Hand } from './modifications'
import { UNIT_STATES, UNIT_STATE_LABELS } from './unit-state-names'
import type { UnitState } from './unit-state-names'

export { UNIT_STATES, UNIT_STATE_LABELS }
export type { UnitState }

/** The moves there are, whatever the guards say. A written-off unit may turn up again, and breaking one may be undone while every part is back in it. */
const MOVES: Record<UnitState, readonly UnitState[]> = {
  intake: ['bench', 'parted', 'written_off'],
  bench: ['ready', 'parted', 'written_off'],
  ready: ['offered', 'bench', 'parted', 'written_off'],
  offered: ['held', 'sold', 'ready', 'bench', 'written_off'],
  held: ['sold', 'offered', 'bench', 'written_off'],
  sold: ['dispatched', 'offered', 'returned'],
  dispatched: ['returned'],
  returned: ['bench'],
  parted: ['bench'],
  written_off: ['bench'],
}

/** What each move is called on its button. */
const MOVE_DEEDS: Record<UnitState, string> = {
  intake: 'Book in',
  bench: 'Send to the bench',
  ready: 'Mark as ready',
  offered: 'Offer for sale',
  held: 'Hold for a buyer',
  sold: 'Record the sale',
  dispatched: 'Dispatch',
  returned: 'Take back',
  parted: 'Break for parts',
  written_off: 'Write off',
}
const MOVE_DEEDS_BETWEEN: Partial<Record<`${UnitState}>${UnitState}`, string>> = {
  'offered>ready': 'Withdraw the offer',
  'held>offered': 'Release the hold',
  'sold>offered': 'Undo the sale',
  'returned>bench': 'Send back to the bench',
  'written_off>bench': 'Found again: send to the bench',
  'parted>bench': 'Undo the breaking: send to the bench',
}

export const GUARDS = [
  'no-such-move', 'parted', 'triage', 'hazard-hold', 'safety-check', 'disclosures', 'asking-price',
  'sale-details', 'kept-with', 'reason', 'owner-consent', 'record-closed', 'pulled-parts',
] as const
export type Guard = (typeof GUARDS)[number]

/** One guard's refusal, in words a shopkeeper can act on. */
export interface Refusal {
  guard: Guard
  /** What is wrong. */
  sentence: string
  /** What would satisfy the guard. */
  remedy: string
  /** Where that is done, when the caller knows. */
  href?: string
}
export type Decision = { allowed: true } | { allowed: false, refusals: Refusal[] }

/** Everything the guards look at. Times are ISO 8601 strings. */
export interface UnitFacts {
  /** A triage has been recorded, whatever its verdict. */
  hasTriage: boolean
  hazardHold: boolean
  /** When work was last done on it, or null if none. */
  lastWorkAt: string | null
  /** When it last passed a safety check, or null if never. */
  lastSafetyPass: string | null
  /** "Untested, not to be energised" has been disclosed. */
  notEnergisedDisclosure: boolean
  /** Labels of the disclosures without an answer of any kind. */
  missingDisclosures: readonly string[]
  /** Integer minor units, or null when no price has been set. */
  askingPriceMinor: number | null
  /** What the sale still lacks: "buyer", "price", "date". */
  missingSaleDetails: readonly string[]
  /** Kept-with items neither packed nor disclosed as absent, as they are to be named. */
  keptWithNotPacked: readonly string[]
  /** Lots of parts pulled from it that are not back in it. */
  pulledLots: number
  ownership: Ownership
  /** A consigned unit's owner has agreed to what is about to be done. */
  ownerConsent: boolean
  /** Why it is parted, written off, found again or its sale undone. */
  reason: string | null
  /** Where each guard's remedy is carried out. */
  links?: Partial<Record<Guard, string>>
}

/** The states a unit can be moved to from this one, in the order they are offered. */
export function possibleMoves(state: UnitState): readonly UnitState[] {
  return MOVES[state]
}

/** What a move is called on its button. */
export function moveDeed(from: UnitState, to: UnitState): string {
  return MOVE_DEEDS_BETWEEN[`${from}>${to}`] ?? MOVE_DEEDS[to]
}

/** States from which a unit comes back to the bench only with a reason. */
const GONE: readonly UnitState[] = ['written_off', 'parted']

/** Whether a move asks for a reason in words. */
export function moveNeedsReason(from: UnitState, to: UnitState): boolean {
  return to === 'parted' || to === 'written_off' || (GONE.includes(from) && to === 'bench') || (from === 'sold' && to === 'offered')
}

/** "a", "a and b", "a, b and c". */
function listed(items: readonly string[]): string {
  const last = items.at(-1) ?? ''
  return items.length < 2 ? last : `${items.slice(0, -1).join(', ')} and ${last}`
}

function quoted(states: readonly UnitState[]): string {
  return listed(states.map(state => `“${UNIT_STATE_LABELS[state]}”`))
}

const FOR_SALE: readonly UnitState[] = ['ready', 'offered', 'held', 'sold', 'dispatched']
const BACK_TO_BENCH: readonly UnitState[] = ['bench', 'returned']

type GuardCheck = (from: UnitState, to: UnitState, facts: UnitFacts) => Refusal | null

function guardMove(from: UnitState, to: UnitState): Refusal | null {
  if (MOVES[from].includes(to) || (from === 'parted' && FOR_SALE.includes(to))) return null
  if (from === to) {
    return { guard: 'no-such-move', sentence: `It is already “${UNIT_STATE_LABELS[to]}”.`, remedy: 'Nothing needs to be done.' }
  }
  return {
    guard: 'no-such-move',
    sentence: `A unit can’t go from “${UNIT_STATE_LABELS[from]}” to “${UNIT_STATE_LABELS[to]}”.`,
    remedy: MOVES[from].length > 0 ? `From here it can go to ${quoted(MOVES[from])}.` : 'This is where its record ends.',
  }
}

const guardParted: GuardCheck = (from, to) => from === 'parted' && FOR_SALE.includes(to)
  ? {
      guard: 'parted',
      sentence: 'A unit broken for parts can’t be sold.',
      remedy: 'Sell what was taken from it as part lots; its own record stays as their source.',
    }
  : null

const guardTriage: GuardCheck = (from, to, facts) =>
  facts.hasTriage || BACK_TO_BENCH.includes(to) || (to === 'written_off' && from !== 'bench')
    ? null
    : {
        guard: 'triage',
        sentence: 'It has had no triage, the safety look before any power.',
        remedy: 'Record a triage.',
      }

const guardHazard: GuardCheck = (_from, to, facts) => facts.hazardHold && !BACK_TO_BENCH.includes(to)
  ? {
      guard: 'hazard-hold',
      sentence: 'A hazard hold is on it, which allows it nowhere but the bench.',
      remedy: 'Deal with the hazard, then lift the hold and say why.',
    }
  : null

/** Whether a safety check was passed after the last work. A check at the very time of the work doesn't count. */
export function safetyCheckIsCurrent(facts: Pick<UnitFacts, 'lastSafetyPass' | 'lastWorkAt'>): boolean {
  if (facts.lastSafetyPass === null) return false
  return facts.lastWorkAt === null || Date.parse(facts.lastSafetyPass) > Date.parse(facts.lastWorkAt)
}

const guardSafety: GuardCheck = (from, to, facts) => {
  const claimed = to === 'ready' || (to === 'offered' && from !== 'sold') || to === 'sold'
  if (!claimed || (from === 'offered' && to === 'ready') || facts.notEnergisedDisclosure || safetyCheckIsCurrent(facts)) return null
  return {
    guard: 'safety-check',
    sentence: facts.lastSafetyPass === null ? 'It has not passed a safety check.' : 'Work was done after its last safety check.',
    remedy: 'Record a passed safety check, or disclose it as “untested, not to be energised”.',
  }
}

const guardDisclosures: GuardCheck = (from, to, facts) =>
  to === 'offered' && from !== 'sold' && facts.missingDisclosures.length > 0
    ? {
        guard: 'disclosures',
        sentence: `The buyer is not yet told about: ${listed(facts.missingDisclosures)}.`,
        remedy: 'Answer each, or say that it is not known, not looked at, couldn’t be told or not applicable.',
      }
    : null

const guardPrice: GuardCheck = (_from, to, facts) =>
  to === 'offered' && !(facts.askingPriceMinor !== null && facts.askingPriceMinor > 0)
    ? { guard: 'asking-price', sentence: 'It has no asking price.', remedy: 'Set an asking price.' }
    : null

const guardSale: GuardCheck = (_from, to, facts) => to === 'sold' && facts.missingSaleDetails.length > 0
  ? {
      guard: 'sale-details',
      sentence: `The sale lacks its ${listed(facts.missingSaleDetails)}.`,
      remedy: 'Enter who bought it, for how much and when.',
    }
  : null

const guardKeptWith: GuardCheck = (_from, to, facts) => to === 'dispatched' && facts.keptWithNotPacked.length > 0
  ? {
      guard: 'kept-with',
      sentence: `Not packed and not disclosed as absent: ${listed(facts.keptWithNotPacked)}.`,
      remedy: 'Tick each off as packed, or disclose its absence to the buyer.',
    }
  : null

const guardPulled: GuardCheck = (from, to, facts) => from === 'parted' && to === 'bench' && facts.pulledLots > 0
  ? {
      guard: 'pulled-parts',
      sentence: `${facts.pulledLots === 1 ? 'One lot of parts' : `${facts.pulledLots} lots of parts`} pulled from it ${facts.pulledLots === 1 ? 'is' : 'are'} not back in it.`,
      remedy: 'Put each back from its own page first; what has been used stays out of it, and the unit stays broken.',
    }
  : null

const REASON_ASKED: Partial<Record<UnitState, string>> = {
  parted: 'why it is broken for parts',
  written_off: 'why it is written off',
  bench: 'why it is back',
  offered: 'why the sale is undone',
}

const guardReason: GuardCheck = (from, to, facts) => moveNeedsReason(from, to) && (facts.reason ?? '').trim() === ''
  ? { guard: 'reason', sentence: 'No reason is given.', remedy: `Say ${REASON_ASKED[to] ?? 'why'}.` }
  : null

const guardConsent: GuardCheck = (_from, to, facts) => to === 'parted' && facts.ownership === 'consigned' && !facts.ownerConsent
  ? {
      guard: 'owner-consent',
      sentence: 'It is consigned: it belongs to somebody else.',
      remedy: 'Record its owner’s consent to its being broken for parts.',
    }
  : null

const CHECKS: readonly GuardCheck[] = [
  guardMove, guardParted, guardTriage, guardHazard, guardSafety, guardDisclosures, guardPrice, guardSale, guardKeptWith,
  guardReason, guardConsent, guardPulled,
]

function decide(refusals: readonly Refusal[], links: UnitFacts['links']): Decision {
  if (refusals.length === 0) return { allowed: true }
  return {
    allowed: false,
    refusals: refusals.map((refusal) => {
      const href = links?.[refusal.guard]
      return href === undefined ? refusal : { ...refusal, href }
    }),
  }
}

/**
 * Whether a unit may be moved from one state to another. A refused move lists every guard that refuses. A move that
 * doesn't exist is refused as that alone: no remedy of another guard would bring it about.
 */
export function decideMove(from: UnitState, to: UnitState, facts: UnitFacts): Decision {
  const impossible = guardMove(from, to) ?? guardParted(from, to, facts)
  if (impossible) return decide([impossible], facts.links)
  return decide(CHECKS.map(check => check(from, to, facts)).filter(refusal => refusal !== null), facts.links)
}

/** What decides whether an entry may be added to a unit's work log, or one corrected. */
export interface ModificationFacts {
  state: UnitState
  hand: Hand
  ownership: Ownership
  ownerConsent: boolean
  links?: UnitFacts['links']
}

/** States in which the work log is closed, because a buyer's paperwork must keep matching it, or the unit is gone. */
const CLOSED: readonly UnitState[] = ['sold', 'dispatched', 'parted', 'written_off']

const CLOSED_REMEDY: Partial<Record<UnitState, string>> = {
  sold: 'Undo the sale or take it back first.',
  dispatched: 'Take it back first, if it has come back.',
  written_off: 'Bring it back to the bench first, if it has been found again.',
}

/**
 * Whether a modification may be logged. Work we do on a consigned unit needs its owner's consent; what was found
 * or left alone changes nothing and needs none. The log of a unit that is sold or gone is closed.
 */
export function decideModification(facts: ModificationFacts): Decision {
  const refusals: Refusal[] = []
  if (CLOSED.includes(facts.state)) {
    refusals.push({
      guard: 'record-closed',
      sentence: `Its work log is closed: the unit is “${UNIT_STATE_LABELS[facts.state]}”.`,
      remedy: CLOSED_REMEDY[facts.state] ?? 'This is where its record ends.',
    })
  }
  if (facts.ownership === 'consigned' && facts.hand === 'done_by_us' && !facts.ownerConsent) {
    refusals.push({
      guard: 'owner-consent',
      sentence: 'It is consigned: work on it needs its owner’s consent.',
      remedy: 'Record the owner’s consent, and how it was given.',
    })
  }
  return decide(refusals, facts.links)
}
