/**
 * When a signed test sheet no longer speaks for the unit, because something done since could have changed what it measured.
 * A safety check asks nothing of this: any later work of ours overtakes it (see `safetyCheckIsCurrent`).
 */
import type { Section } from './checkpoint'
import { SECTION_LABELS } from './checkpoint'
import type { Hand } from './modifications'
import type { Path } from './paths'
import { PATHS, SECTION_PATHS } from './paths'
import { effectOfWork } from './work-effects'

/** An entry of the work log, as far as staleness asks. Times are ISO 8601 strings. */
export interface WorkFact {
  id: string
  hand: Hand
  /** When it was logged. */
  loggedAt: string
  /** Whether it was withdrawn: then it was never so. */
  withdrawn: boolean
  place: string
  before: string
  after: string
  /** What it could have changed; null, or empty: not said, so it could be anything. */
  touches: readonly Path[] | null
  /** Why it could not have changed what was measured; null: it could. */
  affectsNothingBecause: string | null
}

/** What a sheet holds: the sections it read, checks that were answered rather than measured, and what was watched warming up. */
export type Measured = Section | 'checks' | 'warm_up'

const MEASURED_LABELS: Record<Measured, string> = { ...SECTION_LABELS, checks: 'Checks', warm_up: 'Warm-up' }

/** What was answered or watched could depend on anything. */
const pathsOf = (measured: Measured): readonly Path[] => measured === 'checks' || measured === 'warm_up' ? PATHS : SECTION_PATHS[measured]

export interface StaleReason {
  /** Why, as one or two sentences: the earliest work, and what no longer holds after all of it. */
  sentence: string
  /** The earliest entry of the work log that made it so. */
  workId: string
}

const LONGEST = 120
const shortened = (text: string): string => text.length > LONGEST ? `${text.slice(0, LONGEST - 1).trimEnd()}…` : text

/** An entry of the work log in a few words: "C14: 0.1 µF paper, now 0.1 µF polypropylene". */
export function workInWords({ place, before, after }: Pick<WorkFact, 'place' | 'before' | 'after'>): string {
  const what = before && after ? `${before}, now ${after}` : after || before
  return shortened([place, what].filter(Boolean).join(': '))
}

/** Work at the very time of the signature counts as later: what is not certain is not claimed. */
const isLater = (signedAt: string, work: WorkFact): boolean => Date.parse(work.loggedAt) >= Date.parse(signedAt)

/** Whether an entry can make any sheet stale: work of ours that stands and was not judged to affect nothing. */
const couldAffect = (work: WorkFact): boolean => work.hand === 'done_by_us' && !work.withdrawn && !work.affectsNothingBecause

const isSaid = (touches: readonly Path[] | null): touches is readonly Path[] => touches !== null && touches.length > 0

/** What an entry was said to touch, without what is no measurement's part; null: not said. */
const touched = ({ touches }: WorkFact): readonly Path[] | null => isSaid(touches) ? touches.filter(path => path !== 'nothing_measured') : null

/** Which of what was measured an entry could have changed. */
function overtaken(work: WorkFact, measured: readonly Measured[]): readonly Measured[] {
  const touches = touched(work)
  return touches === null ? measured : measured.filter(each => pathsOf(each).some(path => touches.includes(path)))
}

/** Without a list of what it holds, a sheet is taken as one answer that anything could change. */
const listOf = (measured: readonly Measured[] | 'everything'): readonly Measured[] =>
  measured === 'everything' || measured.length === 0 ? ['checks'] : [...new Set(measured)]

/** "Dial and output level no longer hold", in the order in which the sheet holds them; at least one. */
function noLongerHolds(lost: readonly Measured[]): string {
  const names = lost.map(each => MEASURED_LABELS[each].toLowerCase())
  const last = names.at(-1) ?? ''
  const listed = names.length < 2 ? last : `${names.slice(0, -1).join(', ')} and ${last}`
  const isMany = names.length > 1 || last.endsWith('s')
  return `${listed.charAt(0).toUpperCase()}${listed.slice(1)} no longer ${isMany ? 'hold' : 'holds'}.`
}

function sentenceOf(work: WorkFact, measured: readonly Measured[] | 'everything', lost: readonly Measured[]): string {
  const words = workInWords(work)
  const isAll = measured === 'everything' || measured.length === 0
  const { opening, effect } = effectOfWork([work.place, work.before, work.after].join(': '), touched(work), isAll || lost.includes('dial'))
  return `${opening}${words ? ` (${words})` : ''}: ${effect}. ${isAll ? 'The whole sheet no longer holds.' : noLongerHolds(lost)}`
}

/**
 * Why a sheet signed at `signedAt` is stale, or null if it stands. Only work of ours that touched a part on which something
 * `measured` depends makes it so; work that was not said to touch anything counts against everything. An empty list counts
 * as everything. An unsigned sheet (null) is never stale: its sitting is not over. Entries withdrawn since, and those judged
 * to affect nothing, don't count.
 */
export function staleReason(signedAt: string | null, workLog: readonly WorkFact[], measured: readonly Measured[] | 'everything'): StaleReason | null {
  if (signedAt === null) return null
  const held = listOf(measured)
  const counted = workLog.filter(work => couldAffect(work) && isLater(signedAt, work) && overtaken(work, held).length > 0)
    .sort((a, b) => Date.parse(a.loggedAt) - Date.parse(b.loggedAt))
  const [first] = counted
  if (!first) return null
  const lost = held.filter(each => counted.some(work => overtaken(work, [each]).length > 0))
  return { sentence: sentenceOf(first, measured, lost), workId: first.id }
}
