/** Time on the bench: whole minutes, typed and shown as a person says them. */
import { NARROW_SPACE } from './frequency'

/** The most that one entry keeps. */
export const MOST_MINUTES = 100_000

const HOURS = /^(\d{1,4})\s*(?:h|hr|hrs|hours?|:)\s*(?:(\d{1,2})\s*(?:m|min|mins|minutes?)?)?$/
const MINUTES = /^(\d{1,6})\s*(?:m|min|mins|minutes?)?$/

/** Minutes as a person types them: "45", "45 min", "1 h 30", "1:30", "4 h". Null for what is none of these, the empty text too. */
export function readMinutes(typed: string): number | null {
  const text = typed.trim().toLowerCase()
  const hours = HOURS.exec(text)
  if (hours) return Number(hours[1]) * 60 + Number(hours[2] ?? 0)
  const minutes = MINUTES.exec(text)
  return minutes ? Number(minutes[1]) : null
}

/** Whole minutes, 0 or more, as they are shown: "40 min", "4 h", "1 h 05". What it shows can be typed again. */
export function formatMinutes(minutes: number): string {
  const [hours, rest] = [Math.floor(minutes / 60), minutes % 60]
  if (hours === 0) return `${rest}${NARROW_SPACE}min`
  return rest === 0 ? `${hours}${NARROW_SPACE}h` : `${hours}${NARROW_SPACE}h${NARROW_SPACE}${String(rest).padStart(2, '0')}`
}
