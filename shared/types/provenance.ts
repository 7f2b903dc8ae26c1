import type { UnitState } from '../domain/unit-state-names'
import type { DisclosureKey } from '../domain/disclosures'
import type { Hand } from '../domain/modifications'
import type { Fact } from './unit'
import type { DecisionRule } from '../domain/decision'
import type { EarlierSheet, ReadingView } from './bench'
import type { BandView } from './model'

/** A picture on the buyer's sheet. Its address depends on who looks, so only its id is kept. */
export interface ProvenancePhoto { id: string, caption: string, width: number, height: number }

/** One signed test sheet as the buyer reads it. */
export interface ProvenanceTest {
  number: number
  testedOn: string
  instruments: string[]
  /** Overdue on the day or since, or found wrong. */
  instrumentWarnings: string[]
  conditions: string
  staleBecause: string | null
  decisionRule: DecisionRule
  readings: ReadingView[]
  earlier: EarlierSheet[]
  /** How it warmed up, in a sentence; null where it was not watched. */
  drift: string | null
  checks: { name: string, result: string, note: string }[]
}

/** The first form, in which sheets sold before checkpoints had limits of their own are frozen: a dial point and its per cent. */
export interface ProvenanceSheetForm1 extends Omit<ProvenanceSheet, 'form' | 'sheets'> {
  form: 1
  sheets: (Pick<ProvenanceTest, 'number' | 'testedOn' | 'instruments' | 'conditions' | 'staleBecause' | 'checks'> & {
    readings: { band: string, settingHz: number, readingText: string | null, readingHz: number | null, errorPercent: number | null, tolerancePercent: number, within: boolean | null }[]
  })[]
}
/** A sheet as it may stand frozen in a sale. */
export type FrozenProvenance = ProvenanceSheet | ProvenanceSheetForm1

/** What the buyer is given: no cost, no shelf, no people's names. Frozen as JSON on the day of the sale, so every field is plain data. */
export interface ProvenanceSheet {
  /** Raised when the shape changes; an older frozen sheet is still shown as it is. */
  form: 2
  tag: string
  shop: { name: string, address: string }
  asOf: string
  state: UnitState
  maker: string
  designation: string
  kind: string
  years: string
  serial: Fact
  supply: string
  bands: BandView[]
  coverage: { function: string, words: string }[]
  hazards: { label: string, caution: string }[]
  /** Why the piece is on hazard hold; null, or left out of a sheet frozen before it was told, when it is not. */
  hazardHold?: string | null
  notEnergised: string | null
  /** How original it is, in graded words; left out of a sheet frozen before it was told. */
  originality?: { words: string, sentence: string, cautions: string[] }
  /** `doneOn` null: an earlier hand, date unknown, or a decision. */
  work: { doneOn: string | null, hand: Hand, heading: string, lines: string[] }[]
  sheets: ProvenanceTest[]
  safety: { doneAt: string, passed: boolean, lines: string[], current: boolean } | null
  keptWith: { tag: string, description: string, originality: string, condition: string, missing: string | null }[]
  disclosures: { key: DisclosureKey, label: string, words: string, known: boolean }[]
  photos: ProvenancePhoto[]
}
