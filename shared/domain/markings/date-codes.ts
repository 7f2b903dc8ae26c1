/**
 * What a date code may mean, given the years the set was made and the day it is read. The forms are those of `date-forms.ts`; how far
 * the years of the set decide the decade is common practice, no source.
 */
import { yearsMade } from '../years'
import type { DateCandidate, DateForm } from './date-forms'
import { dateCandidates } from './date-forms'

/** The years a model or unit was made; null where not known. */
export interface YearsMade {
  from: number | null
  to: number | null
}

export interface DateReading {
  form: DateForm
  /** The days it means, ISO 8601, both included. */
  from: string
  to: string
  year: number
  /** "week 15 of 1972". */
  words: string
  why: string
  /** Whether it lies in the years in which parts for the set were made; null where those are not known. */
  agreesWithSet: boolean | null
  isDoubtful: boolean
}
/** `isOther`: the text is no date code at all, and may be another. */
export type DateCodeResult = { ok: true, readings: readonly DateReading[] } | { ok: false, isOther: boolean, sentence: string }

export interface DateCodeOptions {
  /** The day of reading, ISO 8601. */
  today: string
  made?: YearsMade
}

/** Parts were made up to three years before the set, and in the year after its last. */
const EARLIER = 3
const LATER = 1

function agrees(year: number, made: YearsMade | undefined): boolean | null {
  if (!made || (made.from === null && made.to === null)) return null
  return year >= (made.from ?? 0) - EARLIER && year <= (made.to ?? 9999) + LATER
}

const isReading = (reading: DateReading | null): reading is DateReading => reading !== null

function readingIn(year: number, candidate: DateCandidate, made: YearsMade | undefined): DateReading | null {
  const span = candidate.spanOf(year)
  return span && { form: candidate.form, ...span, year, words: candidate.wordsOf(year), why: candidate.why, agreesWithSet: agrees(year, made), isDoubtful: candidate.isDoubtful ?? false }
}

/** The readings of one form: where several years are possible and the set's years speak for some, those, with the others named. */
function decided(readings: readonly DateReading[], made: YearsMade | undefined): readonly DateReading[] {
  const agreeing = readings.filter(({ agreesWithSet }) => agreesWithSet === true)
  if (!made || agreeing.length === 0 || agreeing.length === readings.length) return readings
  const others = readings.filter(reading => !agreeing.includes(reading)).map(({ year }) => year)
  const named = others.length === 1 ? String(others[0]) : `${others.slice(0, -1).join(', ')} or ${others.at(-1)}`
  return agreeing.map(reading => ({ ...reading, why: `${reading.why} The decade is that of the set (made ${yearsMade(made.from, made.to)}); the code alone could also mean ${named}.` }))
}

const rank = ({ agreesWithSet, isDoubtful }: DateReading): number => (agreesWithSet === true ? 0 : 2) + (isDoubtful ? 1 : 0)

/**
 * Every date a code may mean, the likelier first: what agrees with the years the set was made, then the commoner forms. Where the code
 * leaves the decade open and the set's years decide it, only those years are given. Refused with a sentence: what is no date code, a week
 * that no year has, and a code that can only mean a day after `today`.
 */
export function readDateCode(text: string, { today, made }: DateCodeOptions): DateCodeResult {
  const shown = `“${text.trim().slice(0, 40)}”`
  const candidates = dateCandidates(text)
  if (candidates.length === 0) return { ok: false, isOther: true, sentence: `${shown} is not a date code that can be read. They look like 7215, 1572, 190-7215 or 642.` }
  const possible = candidates.map(candidate => candidate.years.map(year => readingIn(year, candidate, made)).filter(isReading))
  const readings = possible.flatMap(ofForm => decided(ofForm.filter(({ from }) => from <= today), made))
  if (readings.length > 0) return { ok: true, readings: [...readings].sort((a, b) => rank(a) - rank(b)) }
  const soonest = possible.flat().sort((a, b) => a.from.localeCompare(b.from))[0]
  return { ok: false, isOther: false, sentence: soonest ? `${shown} would be ${soonest.words}, which is still to come. Read it again: it is another number, or another date.` : `${shown} is not a date code: no year has such a week.` }
}

/**
 * Whether a part is newer than the last year the set was made, in whole calendar years, with the sentence to say; null where it is not, or
 * where that year is not known.
 */
export function isNewerThanSet({ year }: Pick<DateReading, 'year'>, made: YearsMade): { years: number, sentence: string } | null {
  if (made.to === null || year <= made.to) return null
  const years = year - made.to
  return { years, sentence: `This part is newer than the set: it was made in ${year}, ${years === 1 ? 'one year' : `${years} years`} after the last year the set was made (${made.to}). It is a replacement.` }
}
