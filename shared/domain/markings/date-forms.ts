/**
 * The forms a date code may have, each with every year it may mean. Sources: the association's page on source-date codes (EIA) and
 * secondary readings of them; year-and-week codes by common practice, no source; the letters of IEC 60062 from memory and doubtful.
 */
import type { Span } from './calendar-spans'
import { monthSpan, weekSpan, yearSpan } from './calendar-spans'

/** How the figures and letters of a code are divided. */
export const DATE_FORMS = ['source', 'year', 'year-week', 'week-year', 'digit-week', 'month', 'two-figures', 'letter-month', 'letter'] as const
export type DateForm = (typeof DATE_FORMS)[number]

export interface DateCandidate {
  form: DateForm
  /** Every year it may mean, earliest first. */
  years: readonly number[]
  /** The days it means in a year; null where the year has no such week. */
  spanOf: (year: number) => Span | null
  /** What it means in a year, as words. */
  wordsOf: (year: number) => string
  why: string
  isDoubtful?: boolean
}

/** Marking by codes began in 1945 (EIA-476-B, abstract); a plain year may be earlier. */
const FIRST_CODE_YEAR = 1945
const FIRST_YEAR = 1920
/** No code reads further than this; what is still to come is refused later. */
const LAST_YEAR = 2099

const yearsEvery = (first: number, step: number, from: number): number[] =>
  Array.from({ length: Math.ceil((LAST_YEAR - first) / step) }, (_, index) => first + index * step).filter(year => year >= from && year <= LAST_YEAR)
const twoFigureYears = (text: string, from = FIRST_CODE_YEAR): number[] => yearsEvery(1900 + Number(text), 100, from)
const oneFigureYears = (text: string): number[] => yearsEvery(1940 + Number(text), 10, FIRST_CODE_YEAR)

const MONTHS = ['January', 'February', 'March', 'April', 'May', 'June', 'July', 'August', 'September', 'October', 'November', 'December'] as const
const byWeek = (week: number) => ({ spanOf: (year: number) => weekSpan(year, week), wordsOf: (year: number) => `week ${week} of ${year}` })
const byMonth = (month: number) => ({ spanOf: (year: number) => monthSpan(year, month), wordsOf: (year: number) => `${MONTHS[month - 1] ?? ''} ${year}` })
const byYear = { spanOf: yearSpan, wordsOf: (year: number) => String(year) }

function sourceCode(source: string, date: string): DateCandidate {
  const years = date.length === 4 ? twoFigureYears(date.slice(0, 2)) : oneFigureYears(date.slice(0, 1))
  const parts = date.length === 4 ? 'two for the year' : 'one for the year'
  return { form: 'source', years, ...byWeek(Number(date.slice(-2))), why: `A source-date code: ${source} is the maker, then ${parts} and two for the week.` }
}

/** A maker's number of three or four digits, then YWW or YYWW; a dash says where the maker ends. */
function sourceCodes(text: string): DateCandidate[] {
  const splits = text.includes('-') ? [text.split('-')] : [3, 4].map(at => [text.slice(0, at), text.slice(at)])
  return splits.flatMap(([source = '', date = '', more]) => more === undefined && /^\d{3,4}$/.test(source) && /^\d{3,4}$/.test(date) ? [sourceCode(source, date)] : [])
}

/** Four digits, with or without something between the pairs. */
function fourDigits(first: string, second: string, hasSeparator: boolean): DateCandidate[] {
  const plain = Number(first + second)
  const isYear = !hasSeparator && plain >= FIRST_YEAR && plain <= LAST_YEAR
  // A month that is none has no span, and falls out.
  const months: DateCandidate[] = [
    { form: 'month', years: twoFigureYears(first), ...byMonth(Number(second)), why: 'Read as year and month.' },
    { form: 'month', years: twoFigureYears(second), ...byMonth(Number(first)), why: 'Read as month and year.' },
  ]
  return [
    ...(isYear ? [{ form: 'year' as const, years: [plain], ...byYear, why: 'Read as a plain year.' }] : []),
    { form: 'year-week', years: twoFigureYears(first), ...byWeek(Number(second)), why: 'Read as year and week.' },
    { form: 'week-year', years: twoFigureYears(second), ...byWeek(Number(first)), why: 'Read as week and year.' },
    ...(hasSeparator ? months : []),
  ]
}

/** I, O, Q, Y, Z and G are not used; 1990 and 2010 are A. */
const YEAR_LETTERS = 'ABCDEFHJKLMNPRSTUVWX'
const MONTH_CHARACTERS = '123456789OND'

function letters(year: string, month: string): DateCandidate[] {
  const at = YEAR_LETTERS.indexOf(year)
  if (at < 0) return []
  const common = { years: yearsEvery(1970 + at, 20, 1970), isDoubtful: true }
  const doubt = 'from memory and doubtful, for the editions differ'
  return month === ''
    ? [{ form: 'letter', ...common, ...byYear, why: `Read as the year letter of IEC 60062: ${doubt}.` }]
    : [{ form: 'letter-month', ...common, ...byMonth(MONTH_CHARACTERS.indexOf(month) + 1), why: `Read as the year letter and month of IEC 60062: ${doubt}.` }]
}

/** Every form a typed code may have, the likelier first; weeks and months that no year has are still among them. */
export function dateCandidates(text: string): DateCandidate[] {
  const code = text.trim().toUpperCase().replace(/\s+/g, '')
  const pairs = /^(\d\d)([-/.]?)(\d\d)$/.exec(code)
  if (pairs) return fourDigits(pairs[1] ?? '', pairs[3] ?? '', pairs[2] !== '')
  if (/^\d{3}$/.test(code)) return [{ form: 'digit-week', years: oneFigureYears(code.slice(0, 1)), ...byWeek(Number(code.slice(1))), why: 'Read as the last figure of the year, then the week.' }]
  if (/^’?'?\d\d$/.test(code)) return [{ form: 'two-figures', years: twoFigureYears(code.slice(-2), FIRST_YEAR), ...byYear, why: 'Read as a year in two figures.' }]
  if (/^\d{6,8}$/.test(code) || /^\d{3,4}-\d{3,4}$/.test(code)) return sourceCodes(code)
  const iec = /^([A-Z])([1-9OND]?)$/.exec(code)
  return iec ? letters(iec[1] ?? '', iec[2] ?? '') : []
}
