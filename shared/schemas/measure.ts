import { z } from 'zod'
import { parseDecimal, toNumber } from '../domain/decimal'
import type { Quantity } from '../domain/reading'
import { parseReading } from '../domain/reading'

/** An amount as a form types it ("220 mV") or as a script sends it (a number in the base unit). */
export const rawAmount = z.union([z.string().max(60, 'That is too long for an amount'), z.number()], { error: 'Enter an amount with its unit, like 220 mV' })
export type RawAmount = z.output<typeof rawAmount>

export type AmountRead = { ok: true, value: number | null } | { ok: false, sentence: string }

/** Reads an amount of a quantity; empty is null. Nought needs no unit. */
export function readAmount(raw: RawAmount | null | undefined, quantity: Quantity): AmountRead {
  if (raw === null || raw === undefined) return { ok: true, value: null }
  if (typeof raw === 'number') return Number.isFinite(raw) ? { ok: true, value: raw } : { ok: false, sentence: 'That is not a number that can be kept.' }
  const text = raw.trim()
  if (text === '') return { ok: true, value: null }
  if (/^0([.,]0*)?$/.test(text)) return { ok: true, value: 0 }
  const reading = parseReading(text, quantity)
  if (!reading.ok) return { ok: false, sentence: reading.sentence }
  return Number.isFinite(reading.value) ? { ok: true, value: reading.value } : { ok: false, sentence: 'That is not a number that can be kept.' }
}

/** A plain number as typed, zero or more ("0.5", "±0.5 %", "0,5"); empty is null. */
export const typedShare = (label: string, most = 1e9) => z.union([z.string(), z.number()], { error: `Enter ${label} as a number` }).nullable().default(null).transform((value, context) => {
  const text = String(value ?? '').replace(/^\s*(?:±|\+\/?-)/u, '').replace(/(?:%|per cent|ppm|dB|s|digits?)\s*$/u, '').trim()
  if (text === '') return null
  const read = parseDecimal(text)
  const number = read.ok ? toNumber(read.decimal) : Number.NaN
  if (number >= 0 && number <= most) return number
  context.addIssue({ code: 'custom', message: `Enter ${label} as a number, zero or more, like 0.5` })
  return z.NEVER
})
