/** An amount in the base unit of its quantity as people write it: "220 mV", "98.2 kHz", "−3.2 dB". */
import { formatFrequency, NARROW_SPACE, unitStep } from './frequency'
import type { Quantity } from './reading'
import { BASE_UNITS } from './reading'
import { roundTo } from './uncertainty'

const PREFIXES: readonly [power: number, prefix: string][] = [[9, 'G'], [6, 'M'], [3, 'k'], [0, ''], [-3, 'm'], [-6, 'µ'], [-9, 'n'], [-12, 'p']]
const FREQUENCY_PREFIXES = [[0, ''], [3, 'k'], [6, 'M'], [9, 'G']] as const
/** Quantities that take no prefix. */
const BARE: readonly Quantity[] = ['level', 'power_level', 'percent']

/** The power of ten and the prefix under which a size is written with one to three figures before the point. A frequency is never written in mHz. */
function prefixOf(size: number, quantity: Quantity): readonly [number, string] {
  if (BARE.includes(quantity) || size === 0) return [0, '']
  return PREFIXES.find(([power]) => size >= 10 ** power * (1 - 1e-12) && (quantity !== 'frequency' || power >= 0)) ?? [0, '']
}

const signed = (text: string): string => text.replace('-', '\u2212')

/** An amount with a sensible prefix and at most `figures` significant figures. Frequencies from `formatFrequency`, when whole. */
export function formatAmount(value: number, quantity: Quantity, figures = 6): string {
  if (quantity === 'frequency' && value >= 0 && Number.isInteger(value)) return formatFrequency(value)
  // Rounded before the prefix is chosen: 0.9999999 V is 1 V, not 1000 mV.
  const [power, prefix] = prefixOf(Number(Math.abs(value).toPrecision(figures)), quantity)
  const scaled = Number((value / 10 ** power).toPrecision(figures))
  return `${signed(String(scaled))}${NARROW_SPACE}${prefix}${BASE_UNITS[quantity]}`
}

/**
 * A value to the last place of its uncertainty, both under one prefix: "98.213 kHz ± 0.012 kHz" (GUM 7.2.6). `place` is
 * the power of ten of that place in the base unit.
 */
export function formatWithUncertainty(value: number, uncertainty: number, place: number, quantity: Quantity): string {
  const [power, prefix] = prefixOf(Math.max(Math.abs(roundTo(value, place)), uncertainty), quantity)
  const decimals = Math.max(0, power - place)
  const shown = (amount: number) => signed((roundTo(amount, place) / 10 ** power).toFixed(decimals))
  const unit = `${prefix}${BASE_UNITS[quantity]}`
  return `${shown(value)}${NARROW_SPACE}${unit} ± ${shown(uncertainty)}${NARROW_SPACE}${unit}`
}

/**
 * A value to a decimal place and no further, its last noughts kept: "10.1999 MHz", "99.90 kHz", "−0.7 dB". `place` is the
 * power of ten of the last figure in the base unit. Frequencies change from kHz to MHz where `formatFrequency` does.
 */
export function formatToPlace(value: number, place: number, quantity: Quantity): string {
  const [power, prefix] = quantity === 'frequency' ? FREQUENCY_PREFIXES[unitStep(Math.abs(value))] : prefixOf(Math.abs(value), quantity)
  const [whole, fraction] = (roundTo(value, place) / 10 ** power).toFixed(Math.min(100, Math.max(0, power - place))).split('.')
  const grouped = (whole ?? '').replace(/\B(?=(?:\d{3})+$)/gu, NARROW_SPACE)
  return `${signed(fraction ? `${grouped}.${fraction}` : grouped)}${NARROW_SPACE}${prefix}${BASE_UNITS[quantity]}`
}

/** The same amount as a person types it into a form, without narrow spaces and with a plain minus. */
export function typedAmount(value: number, quantity: Quantity): string {
  const [power, prefix] = prefixOf(Number(Math.abs(value).toPrecision(12)), quantity)
  return `${Number((value / 10 ** power).toPrecision(12))} ${prefix}${BASE_UNITS[quantity]}`
}
