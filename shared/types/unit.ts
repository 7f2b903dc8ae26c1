import type { Ownership, SourceKind } from '../domain/acquisition'
import type { Technology } from '../domain/equipment-kinds'
import type { Originality } from '../domain/originality'
import type { Knowledge } from '../domain/knowledge'
import type { UnitState } from '../domain/unit-state-names'
import type { Hazard } from '../domain/triage'
import type { KeptWithView } from './kept-with'
import type { BandView, ModelName } from './model'
import type { DonorView, FittingView } from './part'
import type { UnitPartRecall } from './part-recall'
import type { ModificationView } from './modification'
import type { DocumentView, PhotoView } from './photo'
import type { SafetyCheckView, TestSheetSummary, TriageView } from './bench'
import type { Refusal } from './problem'

/** A fact that may be missing in one of four ways. */
export interface Fact { answer: Knowledge, text: string | null }

export interface PlaceView { tag: string, path: string }

/** A unit as a list shows it. */
export interface UnitSummary {
  tag: string
  model: ModelName
  serial: Fact
  state: UnitState
  /** Why it is on hazard hold; null if it is not. */
  hazardHold: string | null
  place: PlaceView | null
  bands: BandView[]
  ownership: Ownership
  /** Minor units; null without a price or without the right to see one. */
  askingMinor: number | null
  askingCurrency: string | null
  /** The first photo, 320 px wide; null if there is none. */
  thumbnailUrl: string | null
  /** When it was booked in. */
  createdAt: string
}

/** A move the unit could make next, and every guard that refuses it now. */
export interface MoveView { to: UnitState, label: string, refusals: Refusal[] }

/** Everything on the page of one unit. Cost and names are null for those who may not see them. */
export interface UnitView extends UnitSummary {
  id: string
  technology: Technology | null
  /** As the model was published, and as this one is set. */
  supply: string
  supplyAsSet: string
  dialTolerancePercent: number | null
  typicalHazards: Hazard[]
  conditionNotes: string
  acquiredOn: string
  sourceKind: SourceKind
  sourceName: string | null
  sourceNote: string | null
  costMinor: number | null
  costCurrency: string | null
  /** Bench time after which to stop and think, minutes; null where none is set. */
  ceilingMinutes: number | null
  notEnergisedDisclosure: string | null
  keptWith: KeptWithView[]
  modifications: ModificationView[]
  originality: OriginalityView
  /** Every part that we placed in it. */
  fittings: FittingView[]
  /** What was pulled from it, where something was. */
  donor: DonorView | null
  /** Open recalls of parts that reach it and are not decided for it. */
  partRecalls: UnitPartRecall[]
  photos: PhotoView[]
  documents: DocumentView[]
  sheets: TestSheetSummary[]
  triage: TriageView | null
  safety: SafetyCheckView | null
  moves: MoveView[]
  /** `heldFor` is null for those who may not see names. */
  hold: { heldFor: string | null, until: string } | null
  sale: { soldOn: string, buyer: string | null, priceMinor: number | null, currency: string } | null
  publication: { url: string, publishedAt: string } | null
  version: number
}

/** How original a unit is, with what is noted of looking inside. */
export interface OriginalityView extends Originality { examinedInsideOn: string | null, examinedInsideNote: string }

/** One entry of the story. */
export interface StoryEntry { id: number, at: string, who: string | null, event: string, sentence: string, details: string[] }
