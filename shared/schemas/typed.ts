import { z } from 'zod'
import { parseDecimal, toNumber } from '../domain/decimal'
import { parseFrequency } from '../domain/frequency'
import { MOST_MINUTES, readMinutes } from '../domain/minutes'

/** What a form sends as it was typed; a script may send the bare number. */
const typed = (label: string) => z.union([z.string(), z.number()], { error: `Enter ${label}` }).transform(value => String(value).trim())

/** A whole number as typed; empty is null. */
export const typedWhole = (label: string, least: number, most: number) => typed(label).nullable().default(null).transform((text, context) => {
  if (text === null || text === '') return null
  const reading = parseDecimal(text)
  const number = reading.ok ? toNumber(reading.decimal) : Number.NaN
  if (Number.isInteger(number) && number >= least && number <= most) return number
  context.addIssue({ code: 'custom', message: `${capital(label)} must be a whole number from ${least} to ${most}` })
  return z.NEVER
})

/** A tolerance as typed: "2", "±2 %", "0,5"; per cent either way, above 0 and at most 100. Empty is null. */
export const typedTolerance = (label: string) => typed(label).nullable().default(null).transform((text, context) => {
  const bare = (text ?? '').replace(/^\s*(?:±|\+\/?-)/u, '').replace(/(?:%|per cent)\s*$/u, '').trim()
  if (bare === '') return null
  const reading = parseDecimal(bare)
  const number = reading.ok ? Math.round(toNumber(reading.decimal) * 1e4) / 1e4 : Number.NaN
  if (number > 0 && number <= 100) return number
  context.addIssue({ code: 'custom', message: `${capital(label)} must be per cent above 0, at most 100, like 2 or ±0.5 %` })
  return z.NEVER
})

/** A frequency as a person types it, as whole hertz; a bare number is hertz only when a script sends it as a number. */
export const typedFrequency = (label: string) => z.union([z.string(), z.number()], { error: `Enter ${label}, like 455 kc or 10.7 MHz` }).transform((value, context) => {
  const reading = typeof value === 'number'
    ? parseFrequency(String(value), { assume: 'Hz', allowDc: true })
    : parseFrequency(value, { allowDc: true })
  if (reading.ok) return reading.hz
  context.addIssue({ code: 'custom', message: reading.sentence })
  return z.NEVER
})

/** An amount as typed, read in the shop's currency by the service; empty for none. */
export const typedAmount = (label: string) => z.union([z.string(), z.number()], { error: `Enter ${label} as an amount, like 1250.00` })
  .transform(value => String(value).trim()).pipe(z.string().max(60, `Enter ${label} as an amount, like 1250.00`))

/** As typed, "45" or "1 h 30"; empty is not said. What can't be read is left as it is, to be refused. */
const minutesOf = (value: unknown) => typeof value !== 'string' ? value : value.trim() === '' ? null : readMinutes(value) ?? value

/** Minutes as a person types them ("45", "1 h 30", "4 h"); empty is null. */
export const typedMinutes = (label: string, least = 0) => z.preprocess(minutesOf, z.int({ error: `Enter ${label} as a whole number, such as 45` })
  .min(least, `${capital(label)} must be ${least} or more`).max(MOST_MINUTES, `${capital(label)} must be ${MOST_MINUTES.toLocaleString('en-GB')} or less`).nullable().default(null))

function capital(text: string): string {
  const bare = text.replace(/^(the|a|an) /u, '')
  return bare.charAt(0).toUpperCase() + bare.slice(1)
}
