/** What a unit may wait for: the lines of the day-book, and a filter of the list by the same names. */
export const UNIT_NEEDS = ['hazard', 'triage', 'bench', 'ready', 'held', 'dispatch', 'missing', 'place'] as const
export type UnitNeed = (typeof UNIT_NEEDS)[number]

/** As the day-book and the list name it. */
export const UNIT_NEED_LABELS: Record<UnitNeed, string> = {
  hazard: 'On hazard hold',
  triage: 'Waiting for triage',
  bench: 'On the bench',
  ready: 'Ready to offer',
  held: 'Held for a buyer',
  dispatch: 'Sold, to be dispatched',
  missing: 'Something that belongs to it is missing',
  place: 'Without a place',
}

/** Whether text names a need. */
export function isUnitNeed(text: unknown): text is UnitNeed {
  return UNIT_NEEDS.some(need => need === text)
}
