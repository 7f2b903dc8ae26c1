import type { FoundErrorKind, RecallOutcome, Rejudged } from '../domain/recall'
import type { Quantity } from '../domain/reading'
import type { UnitState } from '../domain/unit-state-names'

/** A recall as the instrument's page lists it. */
export interface RecallSummary {
  number: number
  foundOn: string
  goodOn: string | null
  quantity: Quantity | null
  errorKind: FoundErrorKind
  /** How far it reads too high, in the unit of the kind (an amount: the base unit). */
  errorAmount: number | null
  why: string
  startedBy: string
  closedAt: string | null
  sheets: number
  decided: number
}

/** One reading in question, as it stood and as it is put right. */
export interface RecalledReading extends Rejudged { title: string, text: string, side: 'found' | 'left' }

export interface RecalledSheet {
  id: string
  unitTag: string
  unitName: string
  state: UnitState
  isSold: boolean
  number: number
  testedOn: string
  readings: RecalledReading[]
  outcome: RecallOutcome | null
  note: string
  decidedBy: string | null
}

export interface RecallView extends RecallSummary { instrumentTag: string, instrumentName: string, items: RecalledSheet[] }
/** What the form of a recall starts from. */
export interface RecallStart { instrumentName: string, suggestedGoodOn: string | null, today: string }
