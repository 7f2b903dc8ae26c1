/** The vocabulary of part lots: what a part is, where a lot came from, and whether it may be fitted. */
export const PART_KINDS = [
  'resistor', 'capacitor', 'potentiometer', 'inductor', 'transformer', 'valve', 'semiconductor', 'crystal', 'lamp', 'fuse', 'switch', 'connector', 'meter',
  'battery', 'wire', 'knob', 'dial', 'panel', 'case', 'assembly', 'mechanical', 'other',
] as const
export type PartKind = (typeof PART_KINDS)[number]
export const PART_KIND_LABELS: Record<PartKind, string> = {
  resistor: 'Resistor',
  capacitor: 'Capacitor',
  potentiometer: 'Potentiometer',
  inductor: 'Inductor or coil',
  transformer: 'Transformer',
  valve: 'Valve',
  semiconductor: 'Semiconductor',
  crystal: 'Crystal',
  lamp: 'Lamp',
  fuse: 'Fuse',
  switch: 'Switch or relay',
  connector: 'Connector',
  meter: 'Meter movement',
  battery: 'Battery or adaptor',
  wire: 'Wire, lead or sleeving',
  knob: 'Knob or pointer',
  dial: 'Dial or dial glass',
  panel: 'Front panel',
  case: 'Case or cabinet',
  assembly: 'Sub-assembly',
  mechanical: 'Mechanical part',
  other: 'Other',
}

/** Parts that make a piece a composite of two when they come from another (common practice, no source). */
export const BODY_KINDS: readonly PartKind[] = ['panel', 'case', 'assembly']

export const LOT_CONDITIONS = ['new', 'old_stock', 'pulled', 'rebuilt', 'made_here', 'not_known'] as const
export type LotCondition = (typeof LOT_CONDITIONS)[number]
export const LOT_CONDITION_LABELS: Record<LotCondition, string> = {
  new: 'New',
  old_stock: 'Old stock, unused',
  pulled: 'Pulled, used',
  rebuilt: 'Rebuilt, rewound or restuffed',
  made_here: 'Made here',
  not_known: 'Not known',
}

export const LOT_SOURCES = ['supplier', 'old_stock', 'donor', 'split', 'made_here', 'not_known'] as const
export type LotSource = (typeof LOT_SOURCES)[number]
export const LOT_SOURCE_LABELS: Record<LotSource, string> = {
  supplier: 'Supplier’s invoice',
  old_stock: 'Old shop stock',
  donor: 'Donor unit',
  split: 'Taken out of another lot',
  made_here: 'Made here',
  not_known: 'Not known',
}
/** The sources a person chooses when entering a lot; the others come of breaking a unit, an old part and splitting a lot. */
export const ENTERED_SOURCES = ['supplier', 'old_stock', 'made_here', 'not_known'] as const satisfies readonly LotSource[]

/** Whether a lot may be fitted: only a good one. */
export const LOT_STANDINGS = ['good', 'quarantined', 'withdrawn'] as const
export type LotStanding = (typeof LOT_STANDINGS)[number]
export const LOT_STANDING_LABELS: Record<LotStanding, string> = { good: 'Good', quarantined: 'In quarantine', withdrawn: 'Withdrawn' }

/**
 * What changes how many are in the drawer. What came in is `received` + `found` − `split_off` − `put_back`; it always equals
 * fitted + sold + scrapped + lost + in the drawer. A reversal is a second movement of the same kind, the other way.
 */
export const MOVEMENT_KINDS = ['received', 'found', 'split_off', 'put_back', 'fitted', 'sold', 'scrapped', 'lost'] as const
export type MovementKind = (typeof MOVEMENT_KINDS)[number]
export const MOVEMENT_LABELS: Record<MovementKind, string> = {
  received: 'Came in',
  found: 'Found at a count',
  split_off: 'Moved to a lot of its own',
  put_back: 'Put back into the donor',
  fitted: 'Fitted',
  sold: 'Sold',
  scrapped: 'Scrapped',
  lost: 'Lost',
}
/** Ways out of the drawer that a person records by hand. */
export const REMOVALS = ['sold', 'scrapped', 'lost'] as const satisfies readonly MovementKind[]
export type Removal = (typeof REMOVALS)[number]

/** How a counting difference was settled. Until then it is an open finding: the book is never simply overwritten. */
export const COUNT_SETTLEMENTS = ['miscounted', 'lost', 'scrapped', 'sold', 'found', 'fitted_since'] as const
export type CountSettlement = (typeof COUNT_SETTLEMENTS)[number]
export const COUNT_SETTLEMENT_LABELS: Record<CountSettlement, string> = {
  miscounted: 'Counted wrongly: the book was right',
  lost: 'Lost: nobody knows where',
  scrapped: 'Scrapped and not noted',
  sold: 'Sold and not noted',
  found: 'More were there than the book knew',
  fitted_since: 'Fitted and not logged: it has been logged since',
}

/** What a recall of parts goes by. */
export const PART_RECALL_BASES = ['lot', 'invoice', 'made_between', 'maker_and_value'] as const
export type PartRecallBasis = (typeof PART_RECALL_BASES)[number]
export const PART_RECALL_BASIS_LABELS: Record<PartRecallBasis, string> = {
  lot: 'One lot',
  invoice: 'A supplier’s invoice',
  made_between: 'A range of date codes',
  maker_and_value: 'A maker and a value',
}

/** What was decided of a unit that has a recalled part in it. */
export const PART_RECALL_OUTCOMES = ['checked', 'replaced', 'accepted'] as const
export type PartRecallOutcome = (typeof PART_RECALL_OUTCOMES)[number]
export const PART_RECALL_OUTCOME_LABELS: Record<PartRecallOutcome, string> = {
  checked: 'Checked: sound',
  replaced: 'Replaced',
  accepted: 'Accepted as it is',
}
