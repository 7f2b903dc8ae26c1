import type { LotReach, UnitReach, UnknownMark } from '../domain/part-recall'
import type { LotStanding, PartRecallBasis, PartRecallOutcome } from '../domain/part-lots'
import type { CountedIn } from '../domain/part-quantity'
import type { UnitState } from '../domain/unit-state-names'
import type { PartLink } from './part'

/** A lot that a recall reaches. */
export interface ReachedLotView extends PartLink {
  how: LotReach
  /** As marked on the part. */
  maker: string
  dateCode: string
  standing: LotStanding
  /** In the drawer, in the smallest unit. */
  quantity: number
  countedIn: CountedIn
}

/** A lot of which too little is known to say whether it is recalled; `units`: how many have one of it in them. */
export interface LookAtLotView extends PartLink { unknown: UnknownMark, maker: string, dateCode: string, units: number }

/** A unit that a recall reaches. */
export interface ReachedUnitView extends PartLink {
  state: UnitState
  how: UnitReach
  /** Each part in words: "C14: suppression capacitor X2 · 0.1 µF, P 000004 B". */
  reasons: string[]
  /** The sale that stands; buyer and contact are null for those who may not read names. */
  sale: { soldOn: string, buyer: string | null, contact: string | null } | null
}

/** What a recall reaches today. */
export interface PartRecallReachView {
  lots: ReachedLotView[]
  /** The first hundred, those in most units first. */
  lookAt: LookAtLotView[]
  lookAtTotal: number
  units: ReachedUnitView[]
}

/** What a recall would reach before it is raised; `refusal` says why it could not be. */
export interface PartRecallPreviewView extends PartRecallReachView { refusal: string | null }

/** A unit on the list of a recall, with what was decided of it. */
export interface RecalledUnitView extends Omit<ReachedUnitView, 'how'> {
  /** Null: what reached it was undone or corrected since, and only its decision is left. */
  how: UnitReach | null
  outcome: PartRecallOutcome | null
  note: string
  decidedBy: string | null
  decidedAt: string | null
  /** Such a part was fitted after it was decided, so it is to be decided again. */
  isFittedSince: boolean
}

/** A recall as the list shows it. */
export interface PartRecallSummary {
  number: number
  basis: PartRecallBasis
  /** What it goes by, in words. */
  title: string
  why: string
  raisedBy: string
  raisedAt: string
  closedAt: string | null
  /** How many units are on its list, and how many of them are decided; of a closed one: how many were decided. */
  units: number
  decided: number
}

/** A recall with all that it reaches today. */
export interface PartRecallView extends PartRecallSummary, Omit<PartRecallReachView, 'units'> {
  closedBy: string | null
  items: RecalledUnitView[]
}

/** An open recall that reaches a unit and is not decided for it. */
export interface UnitPartRecall { number: number, why: string, parts: string }
