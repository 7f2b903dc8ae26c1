/**
 * Readings typed as a person reads them off an instrument: "98.2 kc", "1.703 Mc", "0.22 V", "-3.2 dB".
 * The value is kept in the quantity's base unit, and the decimals as typed with it, because they say
 * how finely it was read.
 */
import { frequencyUnit } from './frequency-units'
import { isZero, parseDecimal, shiftDecimal, toNumber } from './decimal'
import type { Decimal } from './decimal'
import { formatFrequency } from './frequency'

export const QUANTITIES = ['frequency', 'voltage', 'current', 'resistance', 'capacitance', 'inductance', 'power', 'level', 'power_level', 'percent', 'duration'] as const
export type Quantity = (typeof QUANTITIES)[number]

export const QUANTITY_LABELS: Record<Quantity, string> = {
  frequency: 'Frequency',
  voltage: 'Voltage',
  current: 'Current',
  resistance: 'Resistance',
  capacitance: 'Capacitance',
  inductance: 'Inductance',
  power: 'Power',
  level: 'Level',
  power_level: 'Level in dBm',
  percent: 'Per cent',
  duration: 'Time',
}

/** The unit in which a quantity's value is kept. */
export const BASE_UNITS: Record<Quantity, string> = {
  frequency: 'Hz',
  voltage: 'V',
  current: 'A',
  resistance: 'Ω',
  capacitance: 'F',
  inductance: 'H',
  power: 'W',
  level: 'dB',
  power_level: 'dBm',
  percent: '%',
  duration: 's',
}

/** Words for the bare unit of each quantity, in lower case. */
const UNIT_WORDS: Record<Exclude<Quantity, 'frequency'>, readonly string[]> = {
  voltage: ['v', 'volt', 'volts', 'vrms'],
  current: ['a', 'amp', 'amps', 'ampere', 'amperes'],
  resistance: ['ω', 'Ω', 'ohm', 'ohms', 'r'],
  capacitance: ['f', 'fd', 'farad', 'farads'],
  inductance: ['h', 'henry', 'henries', 'henrys'],
  power: ['w', 'watt', 'watts'],
  level: ['db', 'decibel', 'decibels'],
  power_level: ['dbm'],
  percent: ['%', 'per cent', 'percent', 'pct'],
  duration: ['s', 'sec', 'secs', 'second', 'seconds'],
}

/** SI prefixes by their letter, as powers of ten. "u" stands for micro where no µ is at hand. */
const PREFIXES: Record<string, number> = { p: -12, n: -9, u: -6, µ: -6, μ: -6, m: -3, k: 3, K: 3, M: 6, G: 9 }

/** Prefixes that may stand alone for a quantity ("4.7k" of resistance). */
const LONE_PREFIXES: Partial<Record<Quantity, readonly string[]>> = {
  resistance: ['k', 'K', 'M'],
  capacitance: ['p', 'n', 'u', 'µ', 'μ'],
}

/** Quantities for which a number without a unit can only mean one thing. */
const ONE_UNIT: readonly Quantity[] = ['level', 'power_level', 'percent']

export type ReadingProblem = 'empty' | 'not-a-reading' | 'ambiguous-comma' | 'unit-missing' | 'unit-unknown' | 'negative'
export type Suspicion = 'ten-times' | 'thousand-times'

export interface Reading {
  ok: true
  quantity: Quantity
  /** In the base unit of the quantity: Hz (may be fractional), V, A, Ω, F, W, dB, %, s. */
  value: number
  /** The number as typed, with a point: "98.20". */
  typed: string
  /** The unit as typed, or the one assumed from the nominal. */
  typedUnit: string
  /** How many decimals were typed. */
  decimals: number
  /** One in the last place typed, in the base unit. */
  resolution: number
  /** True when no unit was typed and only one fits the nominal. */
  unitAssumed: boolean
  /** Set when the reading is about ten or a thousand times off its nominal: kept, but asked about. */
  suspicious: { kind: Suspicion, sentence: string } | null
}
export interface ReadingFailure { ok: false, reason: ReadingProblem, sentence: string }
export type ReadingResult = Reading | ReadingFailure

export interface ReadingOptions {
  /** What was expected, in the base unit; used to guess a missing unit and to question a slip. */
  nominal?: number
}

const EXAMPLES: Record<Quantity, string> = {
  frequency: '98.2 kc or 1.703 Mc',
  voltage: '0.22 V or 220 mV',
  current: '35 mA',
  resistance: '4.7 k or 470 ohm',
  capacitance: '100 pF or 0.1 uF',
  inductance: '220 uH',
  power: '1.5 W',
  level: '-3.2 dB',
  power_level: '-20 dBm',
  percent: '30 %',
  duration: '10 ms',
}

const UNIT_CHOICES: Record<Quantity, string> = {
  frequency: 'c/s, kc or Mc (Hz, kHz or MHz)',
  voltage: 'V, mV or µV',
  current: 'A, mA or µA',
  resistance: 'ohm, k or M',
  capacitance: 'pF, nF or µF',
  inductance: 'µH, mH or H',
  power: 'W or mW',
  level: 'dB',
  power_level: 'dBm',
  percent: '%',
  duration: 's, ms or µs',
}

const refuse = (reason: ReadingProblem, sentence: string): ReadingFailure => ({ ok: false, reason, sentence })

/** The power of ten of a unit as typed, "ask" when it can mean two things, or null when it is no unit of the quantity. */
function powerOfUnit(word: string, quantity: Quantity): number | 'ask' | null {
  if (quantity === 'frequency') {
    const unit = frequencyUnit(word)
    if (!unit || unit.kind === 'metres') return null
    return unit.kind === 'ambiguous' ? 'ask' : unit.power
  }
  const words = UNIT_WORDS[quantity]
  if (words.includes(word.toLowerCase())) return 0
  if (quantity === 'resistance' && /^meg(?:ohms?)?$/i.test(word)) return 6
  if (quantity === 'resistance' && /^kilohms?$/i.test(word)) return 3
  const prefix = word.charAt(0)
  const power = PREFIXES[prefix]
  if (power === undefined || ONE_UNIT.includes(quantity)) return null
  const rest = word.slice(1).trim().toLowerCase()
  if (rest === '') return LONE_PREFIXES[quantity]?.includes(prefix) ? power : null
  return words.includes(rest) ? power : null
}

/** The one unit that puts a bare frequency within a half of its nominal, if exactly one does. */
function unitFromNominal(number: Decimal, nominal: number | undefined): { word: string, power: number } | null {
  if (nominal === undefined || !(nominal > 0)) return null
  const fitting = [{ word: 'Hz', power: 0 }, { word: 'kHz', power: 3 }, { word: 'MHz', power: 6 }, { word: 'GHz', power: 9 }]
    .filter(({ power }) => Math.abs(toNumber(shiftDecimal(number, power)) - nominal) <= nominal / 2)
  return fitting.length === 1 ? fitting[0] ?? null : null
}

function shownValue(value: number, quantity: Quantity): string {
  return quantity === 'frequency' ? formatFrequency(value) : `${value} ${BASE_UNITS[quantity]}`
}

/**
 * Whether a reading is about ten or a thousand times off its nominal (either way, within a quarter): the usual slips
 * of a decimal point, or of kc for Mc. Levels in dB or dBm have no ratio and are never questioned.
 */
export function suspicionOf(value: number, nominal: number, quantity: Quantity): Reading['suspicious'] {
  if (quantity === 'level' || quantity === 'power_level' || !(value > 0) || !(nominal > 0)) return null
  const ratio = Math.max(value / nominal, nominal / value)
  const about = (times: number): boolean => ratio >= times * 0.8 && ratio <= times * 1.25
  const kind = about(10) ? 'ten-times' : about(1000) ? 'thousand-times' : null
  if (!kind) return null
  const times = kind === 'ten-times' ? 'ten' : 'a thousand'
  const way = value > nominal ? 'above' : 'below'
  return { kind, sentence: `${shownValue(value, quantity)} is about ${times} times ${way} ${shownValue(nominal, quantity)}. Check the decimal point and the unit.` }
}

/** Takes "-3.2 dB" apart into number and unit word. */
function splitReading(text: string): { number: string, unit: string } | null {
  const parts = /^([-+\u2212\u2013]?\s*[\d.,][\d.,\s\u00A0\u202F']*?(?:e[+-]?\d+)?)\s*((?:[a-z~%µμΩω\u2126][a-z/~%µμΩω\u2126\s.]*)?)$/i.exec(text)
  return parts ? { number: (parts[1] ?? '').trim(), unit: (parts[2] ?? '').trim().replace('\u2126', 'Ω') } : null
}

/** The number as typed with a decimal point and nothing between thousands. */
function written(number: Decimal): string {
  return `${number.negative ? '-' : ''}${number.whole || '0'}${number.fraction ? `.${number.fraction}` : ''}`
}

function unitOf(number: Decimal, word: string, quantity: Quantity, options: ReadingOptions): { word: string, power: number, assumed: boolean } | ReadingFailure {
  if (word === '') {
    if (ONE_UNIT.includes(quantity)) return { word: BASE_UNITS[quantity], power: 0, assumed: true }
    const guessed = quantity === 'frequency' ? unitFromNominal(number, options.nominal) : null
    return guessed
      ? { ...guessed, assumed: true }
      : refuse('unit-missing', `Say what ${written(number)} is in: ${UNIT_CHOICES[quantity]}.`)
  }
  const power = powerOfUnit(word, quantity)
  if (power === 'ask') return refuse('unit-missing', `"${written(number)} ${word}" can mean more than one thing. Write ${UNIT_CHOICES[quantity]}.`)
  if (power === null) return refuse('unit-unknown', `"${word.slice(0, 20)}" is not a unit used here. Write ${UNIT_CHOICES[quantity]}.`)
  return { word, power, assumed: false }
}

/**
 * Reads one reading of a quantity as typed. Decimal point or comma. A missing unit is asked for, unless only one is
 * possible (dB, %) or, for a frequency, only one comes near the nominal. A reading about ten or a thousand times off
 * its nominal is accepted and marked `suspicious`, never refused: the instrument may really have said so.
 */
export function parseReading(text: string, quantity: Quantity, options: ReadingOptions = {}): ReadingResult {
  const trimmed = text.trim()
  if (trimmed === '') return refuse('empty', `Enter the reading, like ${EXAMPLES[quantity]}.`)
  const nonsense = refuse('not-a-reading', `"${trimmed.slice(0, 40)}" is not a reading. Write it like ${EXAMPLES[quantity]}.`)
  const parts = trimmed.length > 60 ? null : splitReading(trimmed)
  if (!parts) return nonsense
  const number = parseDecimal(parts.number)
  if (!number.ok) return number.reason === 'ambiguous-comma' ? refuse('ambiguous-comma', number.sentence) : nonsense
  const { decimal } = number
  if (decimal.negative && !isZero(decimal) && (quantity === 'frequency' || quantity === 'resistance' || quantity === 'capacitance' || quantity === 'inductance' || quantity === 'duration')) {
    return refuse('negative', `A ${QUANTITY_LABELS[quantity].toLowerCase()} can’t be below zero.`)
  }
  const unit = unitOf(decimal, parts.unit, quantity, options)
  if ('ok' in unit) return unit
  const value = toNumber(shiftDecimal(decimal, unit.power))
  const decimals = decimal.fraction.length
  return {
    ok: true,
    quantity,
    value,
    typed: written(decimal),
    typedUnit: unit.word,
    decimals,
    resolution: Number(`1e${unit.power - decimals}`),
    unitAssumed: unit.assumed,
    suspicious: options.nominal === undefined ? null : suspicionOf(value, options.nominal, quantity),
  }
}
