/**
 * When a signed test sheet or a safety check no longer speaks for the unit, because something done since could have
 * changed what it measured.
 */
import type { Hand } from './modifications'

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
}

export interface StaleReason {
  /** Why, as a sentence. */
  sentence: string
  /** The entry of the work log that made it so. */
  workId: string
}

/** One rule: what the sheet is to be told of the entry, or null where the entry leaves it standing. */
type StalenessRule = (signedAt: string, work: WorkFact) => string | null

/** Work at the very time of the signature counts as later: what is not certain is not claimed. */
const isLater = (signedAt: string, work: WorkFact): boolean => Date.parse(work.loggedAt) >= Date.parse(signedAt)

const LONGEST = 120
const shortened = (text: string): string => text.length > LONGEST ? `${text.slice(0, LONGEST - 1).trimEnd()}…` : text

/** An entry of the work log in a few words: "C14: 0.1 µF paper, now 0.1 µF polypropylene". */
export function workInWords({ place, before, after }: Pick<WorkFact, 'place' | 'before' | 'after'>): string {
  const what = before && after ? `${before}, now ${after}` : after || before
  return shortened([place, what].filter(Boolean).join(': '))
}

const workOfOurs: StalenessRule = (signedAt, work) => {
  if (work.hand !== 'done_by_us' || !isLater(signedAt, work)) return null
  const words = workInWords(work)
  return `Work was logged after it was signed${words ? ` (${words})` : ''}: what was measured then may have changed.`
}

/** Every rule; the first that speaks gives the reason. */
const RULES: readonly StalenessRule[] = [workOfOurs]

/**
 * Why a sheet signed at `signedAt` is stale, or null if it stands. The earliest entry that made it so is named.
 * An unsigned sheet (null) is never stale: its sitting is not over. Entries withdrawn since don't count.
 */
export function staleReason(signedAt: string | null, workLog: readonly WorkFact[]): StaleReason | null {
  if (signedAt === null) return null
  const standing = workLog.filter(work => !work.withdrawn)
    .sort((a, b) => Date.parse(a.loggedAt) - Date.parse(b.loggedAt))
  for (const work of standing) {
    for (const rule of RULES) {
      const sentence = rule(signedAt, work)
      if (sentence !== null) return { sentence, workId: work.id }
    }
  }
  return null
}
