import type { Disposition, Hand, Nature, Reason, Reversibility } from '../domain/modifications'
import type { Path } from '../domain/paths'
import type { PhotoView } from './photo'

export interface ModificationView {
  id: string
  hand: Hand
  place: string
  before: string
  after: string
  reason: Reason
  reversibility: Reversibility | null
  /** How far it changes what the piece is; null: nobody said. */
  nature: Nature | null
  disposition: Disposition
  dispositionNote: string
  parts: string
  /** Each part fitted out of a lot, in words for anybody: no cost, no supplier. */
  fitted: string[]
  testedAfter: string
  minutes: number | null
  doneOn: string | null
  ownerConsent: string
  /** The only parts that it could have changed; null: not said, so it could be any. */
  touches: Path[] | null
  /** Why it could not have changed what was measured; null: it could. */
  affectsNothingBecause: string | null
  loggedBy: string
  loggedAt: string
  /** True once it has been corrected; the earlier words are in the ledger. */
  corrected: boolean
  withdrawnBecause: string | null
  photos: PhotoView[]
  version: number
}

/** What logging answers with: the entry, and the tag of the bag of removed parts if one was made. */
export interface LoggedModification extends ModificationView { bagTag: string | null }
