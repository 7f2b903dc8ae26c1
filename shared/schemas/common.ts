import { z } from 'zod'

/** Limits of typed text, said once. */
export const SHORT_TEXT = 120
export const LONG_TEXT = 4000

/** One line a person types: trimmed, NFC, no control characters (a NUL is refused by PostgreSQL). */
const clean = (value: string) => value.normalize('NFC').replace(/[^\P{Cc}\n\t]/gu, '').trim()

/** A line that must be there. `label` opens the sentence: "Enter the serial". */
export const line = (label: string, max = SHORT_TEXT) =>
  z.string({ error: `Enter ${label}` }).transform(clean)
    .pipe(z.string().min(1, `Enter ${label}`).max(max, `${capital(label)} must be ${max} characters or less`))

/** A line that may be empty. */
export const optionalLine = (label: string, max = SHORT_TEXT) =>
  z.string({ error: `${capital(label)} must be text` }).default('').transform(clean)
    .pipe(z.string().max(max, `${capital(label)} must be ${max} characters or less`))

/** A line that may be emptied by a change; left out, it stays as it is. */
export const changedLine = (label: string, max = SHORT_TEXT) =>
  z.string({ error: `${capital(label)} must be text` }).transform(clean)
    .pipe(z.string().max(max, `${capital(label)} must be ${max} characters or less`)).optional()

/** Paragraphs that may be empty. */
export const optionalProse = (label: string) => optionalLine(label, LONG_TEXT)
export const prose = (label: string) => line(label, LONG_TEXT)

export const uuid = (what: string) => z.uuid({ error: `Choose ${what}` })
export const day = (label: string) => z.iso.date({ error: `${capital(label)} must be a real date` })
/** The version of the row the form was opened on. */
export const versionSeen = z.int({ error: 'Open the form again: the version is missing' }).min(1)

/** Minor units of money already parsed; whole and not negative, below ten million pounds. */
export const minorUnits = (label: string) => z.int({ error: `Enter ${label} as a number` })
  .min(0, `${capital(label)} must be zero or more`).max(1_000_000_000, `${capital(label)} is more than Knurl keeps`)

export const pageQuery = z.object({
  limit: z.coerce.number({ error: 'limit must be a number' }).int('limit must be a whole number').min(1, 'limit must be 1 or more').max(500, 'limit must be 500 or less').default(50),
  cursor: z.string().max(400, 'That cursor is not one of ours').optional(),
})

function capital(text: string): string {
  const bare = text.replace(/^(the|a|an) /u, '')
  return bare.charAt(0).toUpperCase() + bare.slice(1)
}
