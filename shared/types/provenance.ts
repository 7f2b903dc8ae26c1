import type { UnitState } from '../domain/unit-state-names'
import type { DisclosureKey } from '../domain/disclosures'
import type { Hand } from '../domain/modifications'
import type { Fact } from './unit'
import type { BandView } from './model'

/** A picture on the buyer's sheet. Its address depends on who looks, so only its id is kept. */
export interface ProvenancePhoto { id: string, caption: string, width: number, height: number }

/** What the buyer is given: no cost, no shelf, no people's names. Frozen as JSON on the day of the sale, so every field is plain data. */
export interface ProvenanceSheet {
  /** Raised when the shape changes; an older frozen sheet is still shown as it is. */
  form: 1
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
  /** `doneOn` null: an earlier hand, date unknown, or a decision. */
  work: { doneOn: string | null, hand: Hand, heading: string, lines: string[] }[]
  sheets: {
    number: number
    testedOn: string
    instruments: string[]
    conditions: string
    staleBecause: string | null
    readings: { band: string, settingHz: number, readingText: string | null, readingHz: number | null, errorPercent: number | null, tolerancePercent: number, within: boolean | null }[]
    checks: { name: string, result: string, note: string }[]
  }[]
  safety: { doneAt: string, passed: boolean, lines: string[], current: boolean } | null
  keptWith: { tag: string, description: string, originality: string, condition: string, missing: string | null }[]
  disclosures: { key: DisclosureKey, label: string, words: string, known: boolean }[]
  photos: ProvenancePhoto[]
}
