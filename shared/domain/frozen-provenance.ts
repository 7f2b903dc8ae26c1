/** Buyer's sheets frozen in an earlier form, brought to the present one without changing what they say. */
import type { ReadingView } from '../types/bench'
import type { FrozenProvenance, ProvenanceSheet, ProvenanceSheetForm1 } from '../types/provenance'
import { dialCheckpoint } from './dial-check'
import { resultOf } from './evaluation'

type OldReading = ProvenanceSheetForm1['sheets'][number]['readings'][number]

/** A dial point of the first form: judged by simple acceptance, the instrument's uncertainty not known to the sheet. */
function toReading({ band, settingHz, tolerancePercent, readingText, readingHz }: OldReading, index: number): ReadingView {
  const checkpoint = dialCheckpoint(band, settingHz, tolerancePercent)
  const taken = { ok: true as const, value: readingHz ?? 0, step: 0, count: 1, deviation: 0, unitAssumed: false, typedUnit: '', question: null }
  const found = readingText === null || readingHz === null ? null : { text: readingText, result: resultOf(checkpoint, taken, null, { rule: 'simple', factor: 1 }) }
  return { id: '', position: index + 1, ...checkpoint, found, left: null, instrumentId: null, note: '', photoIds: [] }
}

/** A frozen sheet in the present form. */
export function currentForm(frozen: FrozenProvenance): ProvenanceSheet {
  if (frozen.form === 2) return frozen
  return {
    ...frozen,
    form: 2,
    sheets: frozen.sheets.map(sheet => ({
      ...sheet, readings: sheet.readings.map(toReading), instrumentWarnings: [], decisionRule: { rule: 'simple', factor: 1 }, earlier: [], drift: null,
    })),
  }
}
