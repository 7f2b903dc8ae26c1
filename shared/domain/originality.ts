/**
 * How original a piece is, told from its work log in words that an honest seller would sign. The grades are the trade's usual
 * effect wording (common practice, no source); where nobody said how far an entry changes the piece, it is judged by whether it
 * can be undone and what became of the old parts, and never to the piece's favour.
 */
import type { Disposition, Hand, Nature, Reversibility } from './modifications'

export const GRADES = ['unaltered', 'serviced', 'reversible_supplied', 'reversible_not_supplied', 'altered', 'composite', 'not_examined'] as const
export type Grade = (typeof GRADES)[number]
export const GRADE_WORDS: Record<Grade, string> = {
  unaltered: 'Unaltered so far as seen',
  serviced: 'Serviced, original appearance kept',
  reversible_supplied: 'Reversible changes, parts supplied',
  reversible_not_supplied: 'Reversible changes, parts not supplied',
  altered: 'Altered (holes, finish or wiring)',
  composite: 'Composite of more than one unit',
  not_examined: 'Not examined inside',
}
const GRADE_SENTENCES: Record<Grade, string> = {
  unaltered: 'No change to it has been found or made.',
  serviced: 'Parts were replaced like for like, or it was only cleaned and adjusted: nothing shows.',
  reversible_supplied: 'Every change can be undone, and every original part that came out goes with it.',
  reversible_not_supplied: 'Every change can be undone, but not every original part goes with it.',
  altered: 'At least one change leaves a hole, another finish or other wiring, or can’t be undone.',
  composite: 'Part of its body came from another piece.',
  not_examined: 'Nobody has looked inside, so that nothing is said of what is there.',
}

/** An entry of the work log, as far as originality asks. */
export interface OriginalityEntry {
  id: string
  heading: string
  hand: Hand
  nature: Nature | null
  reversibility: Reversibility | null
  disposition: Disposition
  /** Circuit reference or place; what is put back there lifts what was altered there. */
  place: string
}

export interface OriginalityFacts {
  /** Entries that stand: withdrawn ones are left out. */
  entries: readonly OriginalityEntry[]
  /** Parts of the body (panel, case, sub-assembly) fitted from another piece, in words. */
  bodyParts: readonly string[]
  /** The day somebody last looked inside; null where nobody has. */
  examinedInsideOn: string | null
}

export const ORIGINALITY_GROUPS = ['altered', 'substituted', 'like_for_like', 'serviced', 'put_back', 'left_alone', 'earlier_hand', 'can_be_put_back'] as const
export type OriginalityGroup = (typeof ORIGINALITY_GROUPS)[number]
export const ORIGINALITY_GROUP_LABELS: Record<OriginalityGroup, string> = {
  altered: 'Altered',
  substituted: 'Replaced by another kind of part, or not said how far',
  like_for_like: 'Replaced like for like',
  serviced: 'Cleaned or adjusted, nothing replaced',
  put_back: 'Put back as it was made',
  left_alone: 'Original, and left alone on purpose',
  earlier_hand: 'Done by an earlier hand',
  can_be_put_back: 'Can be put back: the original part is kept',
}

export interface Originality {
  grade: Grade
  words: string
  sentence: string
  /** What stands beside the grade and must be read with it. */
  cautions: string[]
  groups: { key: OriginalityGroup, entries: { id: string, heading: string }[] }[]
}

type Change = 'left_alone' | 'put_back' | 'altered' | 'serviced' | 'like_for_like' | 'substituted'

/** What an entry is counted as. A hole, or what can't be undone, is an alteration whatever it was called. */
function changeOf({ hand, nature, reversibility, disposition }: OriginalityEntry): Change {
  if (hand === 'left_alone') return 'left_alone'
  if (nature === 'put_back') return 'put_back'
  if (nature === 'altered' || reversibility === 'hole_to_fill' || reversibility === 'not_reversible') return 'altered'
  if (nature === 'nothing_replaced') return 'serviced'
  if (nature === 'like_for_like') return 'like_for_like'
  // Nobody said, nothing came out and nothing shows: an adjustment.
  return nature === null && disposition === 'nothing_removed' && reversibility === 'no_trace' ? 'serviced' : 'substituted'
}

const SUPPLIED: readonly Disposition[] = ['kept_with_unit', 'left_in_place', 'nothing_removed']
const KEPT: readonly Disposition[] = ['kept_with_unit', 'left_in_place']
const placeOf = ({ place }: OriginalityEntry) => place.trim().toLowerCase()

interface Counted { entry: OriginalityEntry, change: Change }

/** Alterations that still stand: what was put back at the same place has lifted the others. */
function standing(counted: readonly Counted[]): Counted[] {
  const restored = new Set(counted.filter(({ change }) => change === 'put_back').map(({ entry }) => placeOf(entry)).filter(Boolean))
  return counted.filter(({ entry, change }) => (change !== 'altered' && change !== 'substituted') || !restored.has(placeOf(entry)))
}

function gradeOf(counted: readonly Counted[], facts: OriginalityFacts): Grade {
  if (facts.bodyParts.length > 0) return 'composite'
  const left = standing(counted)
  const has = (change: Change) => left.some(each => each.change === change)
  if (has('altered')) return 'altered'
  if (has('substituted')) return left.every(({ entry, change }) => change !== 'substituted' || SUPPLIED.includes(entry.disposition)) ? 'reversible_supplied' : 'reversible_not_supplied'
  if (has('serviced') || has('like_for_like') || has('put_back')) return 'serviced'
  return wasExamined(facts) ? 'unaltered' : 'not_examined'
}

/** Our own work on it is looking inside too. */
const wasExamined = ({ examinedInsideOn, entries }: OriginalityFacts) => examinedInsideOn !== null || entries.some(({ hand }) => hand === 'done_by_us')

function cautionsOf(grade: Grade, counted: readonly Counted[], facts: OriginalityFacts): string[] {
  const unsaid = facts.entries.filter(({ hand, nature }) => hand !== 'left_alone' && nature === null).length
  return [
    grade !== 'not_examined' && !wasExamined(facts) ? 'Not examined inside: there may be more.' : '',
    facts.bodyParts.length > 0 ? `From another piece: ${facts.bodyParts.join('; ')}.` : '',
    unsaid > 0 ? `Of ${unsaid === 1 ? 'one entry' : `${unsaid} entries`} nobody said how far the piece is changed: judged by whether it can be undone.` : '',
    counted.some(({ change, entry }) => change === 'put_back' && placeOf(entry) === '') ? 'Something was put back, but not said where, so that it lifts nothing.' : '',
  ].filter(Boolean)
}

/** The piece's originality as its log stands. */
export function originalityOf(facts: OriginalityFacts): Originality {
  const counted = facts.entries.map(entry => ({ entry, change: changeOf(entry) }))
  const grade = gradeOf(counted, facts)
  const inGroup: Record<OriginalityGroup, (each: Counted) => boolean> = {
    altered: ({ change }) => change === 'altered',
    substituted: ({ change }) => change === 'substituted',
    like_for_like: ({ change }) => change === 'like_for_like',
    serviced: ({ change }) => change === 'serviced',
    put_back: ({ change }) => change === 'put_back',
    left_alone: ({ change }) => change === 'left_alone',
    earlier_hand: ({ entry }) => entry.hand === 'found_like_this',
    can_be_put_back: ({ entry, change }) => change !== 'left_alone' && change !== 'put_back' && KEPT.includes(entry.disposition) && entry.reversibility !== 'not_reversible',
  }
  return {
    grade,
    words: GRADE_WORDS[grade],
    sentence: GRADE_SENTENCES[grade],
    cautions: cautionsOf(grade, counted, facts),
    groups: ORIGINALITY_GROUPS.map(key => ({ key, entries: counted.filter(inGroup[key]).map(({ entry: { id, heading } }) => ({ id, heading })) })).filter(({ entries }) => entries.length > 0),
  }
}
