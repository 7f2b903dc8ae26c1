/**
 * Everything that can happen to a unit (or to the shop's other records), and what an entry of each kind remembers.
 * The ledger is append-only; words for people are made from these by `story.ts`.
 */
export interface FieldChange { field: string, from: string | null, to: string | null }

export interface LedgerDetails {
  /** `notLooked`: what of the model's kit nobody looked for. */
  booked_in: { model: string, serial: string, ownership: string, source: string, notLooked?: string[] }
  edited: { changes: FieldChange[] }
  cost_changed: { changes: FieldChange[] }
  moved: { from: string | null, to: string | null, why?: string }
  state_changed: { from: string, to: string, why?: string }
  triaged: { verdict: string, safetyClass: string, hazards: string[], note?: string }
  hazard_held: { why: string }
  hazard_lifted: { why: string }
  not_energised_disclosed: { text: string | null }
  modification_logged: { modificationId: string, hand: string, before: string, after: string }
  modification_corrected: { modificationId: string, changes: FieldChange[], why: string }
  modification_withdrawn: { modificationId: string, summary: string, why: string }
  /** Judged not to have changed what was measured. */
  modification_unaffecting: { modificationId: string, summary: string, why: string }
  kept_with_added: { tag: string, description: string }
  kept_with_changed: { tag: string, description: string, changes: FieldChange[] }
  kept_with_removed: { tag: string, description: string, why: string }
  packed: { tag: string, description: string, packed: boolean }
  photo_added: { photoId: string, subject: string, caption: string }
  photo_removed: { photoId: string, subject: string, why: string }
  document_added: { documentId: string, title: string }
  document_removed: { documentId: string, title: string, why: string }
  sheet_started: { sheetNumber: number }
  sheet_signed: { sheetNumber: number, verdict: string, within: number, outside: number }
  /** `said`: every reading as it stood when it was opened again. */
  sheet_reopened: { sheetNumber: number, why: string, said?: string[] }
  /** An instrument with which a sheet was made was found wrong; and what was decided of the sheet. */
  instrument_recalled: { sheetNumber: number, instrument: string, why: string }
  recall_decided: { sheetNumber: number, instrument: string, outcome: string, note?: string }
  safety_checked: { verdict: string, note?: string }
  disclosed: { key: string, answer: string, text: string | null }
  priced: { fromMinor: number | null, toMinor: number | null, currency: string }
  held: { heldFor: string, until: string }
  hold_released: { heldFor: string, why: string }
  sold: { buyer: string, priceMinor: number, currency: string, soldOn: string }
  sale_undone: { why: string }
  published: { token: string }
  publication_revoked: { why: string }
  label_printed: { sheet: string }
  coverage_changed: { from: string, to: string }
  /** A part of a lot went into the piece, or a fitting was undone; `lot` is the lot's compact tag, null where it is not known. */
  fitted: { fittingId: string, lot: string | null, description: string, quantity: string, circuitReference: string }
  fitting_undone: { fittingId: string, lot: string | null, description: string, quantity: string, circuitReference: string, why: string }
  /** A part was taken out: pulled from a donor, or an old part returned to stock. */
  part_pulled: { lot: string, description: string, quantity: string }
  part_put_back: { lot: string, description: string, quantity: string, why: string }
  ceiling_set: { fromMinutes: number | null, toMinutes: number | null }
  examined_inside: { on: string | null, note: string }
  /** A part in it may be bad; and what was decided of the piece. */
  part_recalled: { recall: number, parts: string, why: string }
  part_recall_decided: { recall: number, outcome: string, note?: string }
  /** Records other than units. */
  lot_received: { name: string, quantity: string, source: string }
  lot_moved_out: { name: string, how: string, quantity: string, note: string }
  lot_movement_undone: { name: string, how: string, quantity: string, why: string }
  lot_split: { name: string, into: string, quantity: string, why: string }
  lot_standing_changed: { name: string, from: string, to: string, why: string }
  lot_counted: { name: string, counted: string, book: string, note: string }
  lot_count_settled: { name: string, difference: string, how: string, note: string }
  part_recall_raised: { number: number, basis: string, why: string, units: number }
  part_recall_closed: { number: number }
  recalled: { name: string, number: number, foundOn: string, why: string, sheets: number }
  recall_closed: { name: string, number: number }
  calibrated: { name: string, calibratedOn: string, dueOn: string | null, certificateNumber: string }
  calibration_withdrawn: { name: string, calibratedOn: string | null, why: string }
  procedure_saved: { number: number, checkpoints: number, why: string }
  created: { name: string }
  changed: { name: string, changes: FieldChange[] }
  retired: { name: string, why: string }
  signed_in: { from: string }
  role_changed: { name: string, from: string, to: string }
}
export type LedgerEvent = keyof LedgerDetails

/** Entries that hold money or the names of buyers and sellers; shown only to those who may see such. */
export const COST_EVENTS: readonly LedgerEvent[] = ['cost_changed']
export const PRICE_EVENTS: readonly LedgerEvent[] = ['priced']
export const PARTY_EVENTS: readonly LedgerEvent[] = ['sold', 'held', 'hold_released']

export const LEDGER_SUBJECTS = ['unit', 'model', 'location', 'instrument', 'person', 'shop', 'part_lot', 'part_recall'] as const
export type LedgerSubject = (typeof LEDGER_SUBJECTS)[number]
