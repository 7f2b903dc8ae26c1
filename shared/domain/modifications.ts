/** The vocabulary of the work log. Who did it, whether it can be undone and what became of the old parts are always told apart. */
export const HANDS = ['done_by_us', 'found_like_this', 'left_alone'] as const
export type Hand = (typeof HANDS)[number]
export const HAND_LABELS: Record<Hand, string> = {
  done_by_us: 'We did',
  found_like_this: 'Found like this',
  left_alone: 'Left alone on purpose',
}
/** The same, as said of an entry that is already logged. */
export const HAND_SAID: Record<Hand, string> = {
  done_by_us: 'Done by us',
  found_like_this: 'Found like this, an earlier hand, date unknown',
  left_alone: 'Deliberately left alone',
}

export const REVERSIBILITIES = ['no_trace', 're_solder', 'hole_to_fill', 'not_reversible'] as const
export type Reversibility = (typeof REVERSIBILITIES)[number]
export const REVERSIBILITY_LABELS: Record<Reversibility, string> = {
  no_trace: 'No trace',
  re_solder: 'Re-solder',
  hole_to_fill: 'Hole to fill',
  not_reversible: 'Not reversible',
}
export const REVERSIBILITY_SAID: Record<Reversibility, string> = {
  no_trace: 'can be undone without trace',
  re_solder: 're-solder to undo',
  hole_to_fill: 'leaves a hole to fill',
  not_reversible: 'not reversible',
}

export const DISPOSITIONS = ['kept_with_unit', 'left_in_place', 'returned_to_stock', 'discarded', 'not_known', 'nothing_removed'] as const
export type Disposition = (typeof DISPOSITIONS)[number]
export const DISPOSITION_LABELS: Record<Disposition, string> = {
  kept_with_unit: 'Kept with the unit',
  left_in_place: 'Left in place, out of circuit',
  returned_to_stock: 'Returned to stock',
  discarded: 'Discarded',
  not_known: 'Not known',
  nothing_removed: 'Nothing was removed',
}

export const REASONS = ['fault', 'safety', 'preventive', 'usability', 'looks', 'completeness', 'undoing', 'decision', 'not_known'] as const
export type Reason = (typeof REASONS)[number]
export const REASON_LABELS: Record<Reason, string> = {
  fault: 'Fault',
  safety: 'Safety',
  preventive: 'Preventive',
  usability: 'Usability',
  looks: 'Looks',
  completeness: 'Completeness',
  undoing: 'Undoing an earlier change',
  decision: 'A decision to leave it',
  not_known: 'Not known',
}

/** How far an entry changes what the piece is; its originality is told from these. Null where nobody said. */
export const NATURES = ['nothing_replaced', 'like_for_like', 'substitute', 'altered', 'put_back'] as const
export type Nature = (typeof NATURES)[number]
export const NATURE_LABELS: Record<Nature, string> = {
  nothing_replaced: 'Cleaned or adjusted: nothing replaced',
  like_for_like: 'Replaced like for like',
  substitute: 'Replaced by another kind of part',
  altered: 'Altered: holes, finish or wiring',
  put_back: 'Put back as it was made',
}
