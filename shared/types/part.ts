import type { CountSettlement, LotCondition, LotSource, LotStanding, MovementKind, PartKind } from '../domain/part-lots'
import type { CountedIn } from '../domain/part-quantity'
import type { Disposition } from '../domain/modifications'
import type { PlaceView } from './unit'

/** What a part is, whoever made it. */
export interface PartTypeView {
  id: string
  kind: PartKind
  description: string
  value: string
  tolerance: string
  rating: string
  package: string
  countedIn: CountedIn
  /** In the smallest unit; null where it is not watched. */
  minimum: number | null
  version: number
}

/** Another thing in the graph, as a line names it. */
export interface PartLink { tag: string, title: string }

/** A lot as a list shows it. Costs and names are null for those who may not see them. */
export interface PartLotSummary {
  tag: string
  type: PartTypeView
  /** As marked on the part. */
  maker: string
  dateCode: string
  condition: LotCondition
  tested: string
  sourceKind: LotSource
  /** Null without the right to see names, and for a lot that no supplier sold. */
  supplier: string | null
  invoiceNumber: string | null
  donor: PartLink | null
  standing: LotStanding
  standingBecause: string
  /** In the drawer, in the type's smallest unit. */
  quantity: number
  /** What those cost together, in minor units. */
  costMinor: number | null
  currency: string | null
  place: PlaceView | null
  acquiredOn: string
  photoUrl: string | null
  version: number
}

/** One change of what is in the drawer. */
export interface LotMovementView {
  id: number
  kind: MovementKind
  quantity: number
  costMinor: number | null
  note: string
  who: string
  at: string
  /** The unit it went into, for a fitting. */
  unit: PartLink | null
  circuitReference: string
  /** Takes an earlier movement back, or was taken back itself. */
  isReversal: boolean
  isReversed: boolean
}

export interface LotCountView {
  id: string
  counted: number
  book: number
  note: string
  who: string
  at: string
  settledAs: CountSettlement | null
  settledNote: string
}

/** What came in and where it went, in the smallest unit: `cameIn` = `fitted` + `sold` + `scrapped` + `lost` + `inDrawer`. */
export interface LotBalance { cameIn: number, fitted: number, sold: number, scrapped: number, lost: number, inDrawer: number }

/** Everything on the page of one lot. */
export interface PartLotView extends PartLotSummary {
  id: string
  madeFrom: string | null
  madeTo: string | null
  note: string
  parent: PartLink | null
  /** Lots taken out of this one. */
  children: PartLink[]
  /** The fitting that was pulled to make this lot: a part we had fitted to the donor before. */
  fromFitting: { lot: PartLink | null, description: string, circuitReference: string } | null
  balance: LotBalance
  movements: LotMovementView[]
  counts: LotCountView[]
}

/** A part placed in a unit. */
export interface FittingView {
  id: string
  modificationId: string
  unit: PartLink
  /** Null: the lot is unknown. */
  lot: PartLink | null
  lotStanding: LotStanding | null
  description: string
  quantity: number
  countedIn: CountedIn
  circuitReference: string
  replaced: string
  disposition: Disposition
  /** The lot that the old part became, when it was returned to stock. */
  oldPartLot: PartLink | null
  costMinor: number | null
  currency: string | null
  fittedOn: string
  isRemoved: boolean
  undoneBecause: string | null
}

/** A counting difference that nobody has settled. */
export interface OpenFinding { id: string, lot: PartLink, place: string | null, counted: number, book: number, countedIn: CountedIn, at: string }

/** What was pulled from a unit, and what of its cost stayed with it. Amounts in minor units; null without the right to see them. */
export interface DonorView {
  pulled: { lot: PartLink, quantity: number, left: number, countedIn: CountedIn, standing: LotStanding, shareMinor: number | null }[]
  costLeftMinor: number | null
  currency: string | null
  version: number
}
