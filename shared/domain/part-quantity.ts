/**
 * How many of a lot there are: whole numbers of its smallest unit (pieces, or millimetres for wire), so that what came in
 * always equals what went out and what is left.
 */
import { NARROW_SPACE } from './frequency'

export const COUNTED_IN = ['piece', 'pair', 'set', 'millimetre', 'gram', 'millilitre'] as const
export type CountedIn = (typeof COUNTED_IN)[number]
export const COUNTED_IN_LABELS: Record<CountedIn, string> = {
  piece: 'Pieces', pair: 'Pairs', set: 'Sets', millimetre: 'Metres', gram: 'Grams', millilitre: 'Millilitres',
}

/** The most that is kept, in the smallest unit. */
export const MOST_QUANTITY = 1_000_000_000

const PLURALS: Partial<Record<CountedIn, readonly [string, string]>> = { piece: ['', ''], pair: ['pair', 'pairs'], set: ['set', 'sets'] }
const SUFFIXES: Partial<Record<CountedIn, readonly string[]>> = {
  piece: ['', 'off', 'pc', 'pcs', 'piece', 'pieces'], pair: ['', 'pr', 'prs', 'pair', 'pairs'], set: ['', 'set', 'sets'], gram: ['', 'g', 'gram', 'grams'], millilitre: ['', 'ml', 'millilitre', 'millilitres'],
}
/** Lengths are typed in metres unless they say otherwise. */
const LENGTHS: Record<string, number> = { '': 1000, 'm': 1000, 'metre': 1000, 'metres': 1000, 'cm': 10, 'mm': 1 }

export type QuantityReading = { ok: true, quantity: number } | { ok: false, sentence: string }

const refuse = (sentence: string): QuantityReading => ({ ok: false, sentence })

/**
 * Reads a quantity as typed ("12", "2 pr", "1.5 m", "750 mm") in whole numbers of the smallest unit. Refused with a sentence:
 * what is no number, nought or less, a part of a piece, and more than can be kept.
 */
export function readQuantity(text: string, countedIn: CountedIn): QuantityReading {
  const typed = /^(\d{1,9})(?:[.,](\d{1,6}))?\s*([a-z]*)$/i.exec(text.trim())
  if (!typed) return refuse(countedIn === 'millimetre' ? 'Enter a length, like 1.5 m or 750 mm' : 'Enter how many as a whole number, like 10')
  const [, whole = '', fraction = '', suffix = ''] = typed
  const scale = countedIn === 'millimetre' ? LENGTHS[suffix.toLowerCase()] : SUFFIXES[countedIn]?.includes(suffix.toLowerCase()) ? 1 : undefined
  if (scale === undefined) return refuse(`“${suffix}” is not how this lot is counted: it is counted in ${COUNTED_IN_LABELS[countedIn].toLowerCase()}`)
  const places = String(scale).length - 1
  const digits = fraction.replace(/0+$/, '')
  if (digits.length > places) return refuse(places === 0 ? `${COUNTED_IN_LABELS[countedIn]} come whole: enter a whole number` : 'Whole millimetres are the finest that is kept')
  const quantity = Number(whole + digits.padEnd(places, '0'))
  if (quantity === 0) return refuse('Enter more than 0')
  return quantity > MOST_QUANTITY ? refuse('This is more than can be kept. Check the noughts') : { ok: true, quantity }
}

/** A quantity of the smallest unit as it is shown: "12", "2 pairs", "31.5 m". */
export function formatQuantity(quantity: number, countedIn: CountedIn): string {
  const sign = quantity < 0 ? '\u2212' : ''
  const amount = Math.abs(quantity)
  if (countedIn === 'millimetre') return `${sign}${String(amount / 1000)}${NARROW_SPACE}m`
  if (countedIn === 'gram' || countedIn === 'millilitre') return `${sign}${amount}${NARROW_SPACE}${countedIn === 'gram' ? 'g' : 'ml'}`
  const noun = PLURALS[countedIn]?.[amount === 1 ? 0 : 1] ?? ''
  return `${sign}${amount}${noun ? `${NARROW_SPACE}${noun}` : ''}`
}

/** The same as a form shows it, to be typed over: "31.5" for metres. */
export const quantityAsTyped = (quantity: number, countedIn: CountedIn): string => String(countedIn === 'millimetre' ? quantity / 1000 : quantity)
