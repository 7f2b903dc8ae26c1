/** What belongs to one unit and must leave with it. */
export const KEPT_WITH_KINDS = ['manual', 'lead', 'probe', 'plug_in', 'spare', 'removed_parts', 'case', 'document', 'cover', 'other'] as const
export type KeptWithKind = (typeof KEPT_WITH_KINDS)[number]
export const KEPT_WITH_KIND_LABELS: Record<KeptWithKind, string> = {
  manual: 'Manual',
  lead: 'Lead',
  probe: 'Probe',
  plug_in: 'Plug-in',
  spare: 'Spare',
  removed_parts: 'Bag of removed parts',
  case: 'Case',
  document: 'Document',
  cover: 'Cover or knob',
  other: 'Other',
}

export const ORIGINALITIES = ['original', 'copy', 'replacement', 'not_known'] as const
export type Originality = (typeof ORIGINALITIES)[number]
export const ORIGINALITY_LABELS: Record<Originality, string> = {
  original: 'Original', copy: 'Copy', replacement: 'Replacement', not_known: 'Not known',
}

/** Where the item is now: with the unit, put somewhere of its own, or missing. */
export const WHEREABOUTS = ['with_unit', 'elsewhere', 'missing'] as const
export type Whereabouts = (typeof WHEREABOUTS)[number]
export const WHEREABOUTS_LABELS: Record<Whereabouts, string> = {
  with_unit: 'With the unit', elsewhere: 'Elsewhere', missing: 'Missing',
}
