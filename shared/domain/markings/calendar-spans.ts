/** Weeks, months and years as spans of days, ISO 8601 dates (YYYY-MM-DD), both ends included. */

export interface Span {
  from: string
  to: string
}

const DAY = 86_400_000
const iso = (time: number): string => new Date(time).toISOString().slice(0, 10)

/** The Sunday that begins week 1: the week that holds 4 January. */
function firstSunday(year: number): number {
  const fourth = Date.UTC(year, 0, 4)
  return fourth - new Date(fourth).getUTCDay() * DAY
}

/**
 * A week, Sunday to Saturday, as the source-date codes count: week 10 of 1999 is 7 to 13 March (the association's own page). Makers
 * who count from Monday differ by days. Null for week 0 and for a week the year does not have.
 */
export function weekSpan(year: number, week: number): Span | null {
  const start = firstSunday(year) + (week - 1) * 7 * DAY
  return week < 1 || start >= firstSunday(year + 1) ? null : { from: iso(start), to: iso(start + 6 * DAY) }
}

/** A month, 1 to 12; null for what is none. */
export function monthSpan(year: number, month: number): Span | null {
  return month < 1 || month > 12 ? null : { from: iso(Date.UTC(year, month - 1, 1)), to: iso(Date.UTC(year, month, 0)) }
}

/** A whole year. */
export function yearSpan(year: number): Span {
  return { from: `${year}-01-01`, to: `${year}-12-31` }
}
