/**
 * Frequencies: whole hertz as a number, read from what people type and written as people read.
 */
import { ituBandOf } from './band-names'
import type { ItuBand } from './band-names'
import { fromNumber, isWhole, isZero, parseDecimal, shiftDecimal, toNumber, writeDecimal } from './decimal'
import type { Decimal } from './decimal'
import { frequencyUnit } from './frequency-units'

/** The highest frequency kept, in Hz: the top of the ITU's table (RR 2.1). */
export const HIGHEST_HZ = 3e12

/** Speed of light in vacuum in metres per second, exact by the definition of the metre. */
export const SPEED_OF_LIGHT = 299_792_458

/** U+202F, so that a frequency never wraps inside itself. */
export const NARROW_SPACE = '\u202F'

export type FrequencyProblem
  = | 'empty' | 'not-a-frequency' | 'unit-missing' | 'ambiguous-unit' | 'ambiguous-comma'
    | 'zero' | 'negative' | 'too-high' | 'finer-than-a-hertz'

export interface FrequencyFailure { ok: false, reason: FrequencyProblem, sentence: string }
export type FrequencyReading = { ok: true, hz: number } | FrequencyFailure

export interface FrequencyOptions {
  /** Whether "DC", or nought, may be given; it reads as 0 Hz. */
  allowDc?: boolean
  /** The unit of a number that has none ("Hz", "kHz", "Mc" …). Without it such a number is refused. */
  assume?: string
}

const refuse = (reason: FrequencyProblem, sentence: string): FrequencyFailure => ({ ok: false, reason, sentence })

const shown = (text: string): string => {
  const trimmed = text.trim()
  return trimmed.length > 40 ? `${trimmed.slice(0, 40)}…` : trimmed
}

/** Splits "1 250,5 kc/s" into its number and its unit word. */
function splitUnit(text: string): { number: string, unit: string } | null {
  const parts = /^([-+\u2212\u2013]?\s*[\d.,][\d.,\s\u00A0\u202F']*?(?:e[+-]?\d+)?)\s*((?:[a-z~][a-z/~\s.]*)?)$/i.exec(text)
  return parts ? { number: (parts[1] ?? '').trim(), unit: (parts[2] ?? '').trim() } : null
}

/** Metres to the nearest whole hertz: f = c / λ. */
export function metresToHz(metres: number): number {
  return Math.round(SPEED_OF_LIGHT / metres)
}

/** Hertz to metres: λ = c / f, unrounded. */
export function hzToMetres(hz: number): number {
  return SPEED_OF_LIGHT / hz
}

function withinSense(hertz: Decimal, text: string, allowDc: boolean): FrequencyReading {
  if (isZero(hertz)) {
    return allowDc ? { ok: true, hz: 0 } : refuse('zero', 'A frequency must be above zero.')
  }
  if (hertz.negative) return refuse('negative', `${shown(text)} is below zero. A frequency must be above zero.`)
  if (toNumber(hertz) > HIGHEST_HZ) {
    return refuse('too-high', `${shown(text)} is above 3${NARROW_SPACE}000${NARROW_SPACE}GHz, the highest frequency kept.`)
  }
  if (!isWhole(hertz)) {
    return refuse('finer-than-a-hertz', `Frequencies are kept in whole hertz, and ${shown(text)} is finer than that. Round it.`)
  }
  return { ok: true, hz: toNumber(hertz) }
}

function ambiguousMetres(number: string): FrequencyFailure {
  return refuse('ambiguous-unit', `"${shown(number)} m" can mean metres or megacycles. Write "${shown(number)} metres" or "${shown(number)} Mc".`)
}

function fromWavelength(wavelength: Decimal, text: string): FrequencyReading {
  if (isZero(wavelength) || wavelength.negative) return refuse('not-a-frequency', `${shown(text)} is not a wavelength. It must be above zero.`)
  const hz = metresToHz(toNumber(wavelength))
  if (hz > HIGHEST_HZ) return withinSense(fromNumber(hz), text, false)
  return hz > 0 ? { ok: true, hz } : refuse('finer-than-a-hertz', `${shown(text)} is a wavelength too long for a frequency in whole hertz.`)
}

/**
 * Reads a frequency as a person types it, in old or new units, exactly, as whole hertz.
 *
 * Understood: c/s, cps, ~, cycles, kc, kc/s, kilocycles, kHz, Mc, mc, megs, megacycles, MHz, kMc, GHz, the
 * suffixes k, M and G alone, metres and centimetres, a decimal point or comma, spaces between thousands.
 * Refused with a sentence: nought (unless DC is allowed), negatives, anything above 3 000 GHz, fractions of a
 * hertz, a number without a unit (unless one is assumed), a lower-case "m", and what is not a number.
 */
export function parseFrequency(text: string, options: FrequencyOptions = {}): FrequencyReading {
  const allowDc = options.allowDc ?? false
  if (text.trim() === '') return refuse('empty', 'Enter a frequency, like 455 kc or 10.7 MHz.')
  if (/^d\.?c\.?$/i.test(text.trim())) {
    return allowDc ? { ok: true, hz: 0 } : refuse('zero', 'DC is not a frequency here. It must be above zero.')
  }
  const parts = text.length > 80 ? null : splitUnit(text.trim())
  if (!parts) return refuse('not-a-frequency', `"${shown(text)}" is not a frequency. Write it like 455 kc or 10.7 MHz.`)
  const number = parseDecimal(parts.number)
  if (!number.ok) {
    return number.reason === 'ambiguous-comma'
      ? refuse('ambiguous-comma', number.sentence)
      : refuse('not-a-frequency', `"${shown(text)}" is not a frequency. Write it like 455 kc or 10.7 MHz.`)
  }
  const word = parts.unit || options.assume
  if (!word) {
    if (isZero(number.decimal) || number.decimal.negative) return withinSense(number.decimal, text, allowDc)
    if (toNumber(number.decimal) > HIGHEST_HZ) return withinSense(number.decimal, text, allowDc)
    return refuse('unit-missing', `Say what ${shown(text)} is in: c/s, kc or Mc (Hz, kHz or MHz).`)
  }
  const unit = frequencyUnit(word)
  if (!unit) return refuse('not-a-frequency', `"${shown(word)}" is not a unit of frequency. Use Hz, kHz, MHz or GHz (c/s, kc, Mc or kMc).`)
  if (unit.kind === 'ambiguous') return ambiguousMetres(parts.number)
  const value = shiftDecimal(number.decimal, unit.power)
  return unit.kind === 'metres' ? fromWavelength(value, text) : withinSense(value, text, allowDc)
}

export const FREQUENCY_STYLES = ['si', 'period'] as const
export type FrequencyStyle = (typeof FREQUENCY_STYLES)[number]

const STYLE_UNITS: Record<FrequencyStyle, readonly [string, string, string, string]> = {
  si: ['Hz', 'kHz', 'MHz', 'GHz'],
  period: ['c/s', 'kc', 'Mc', 'kMc'],
}

/** Which thousand a frequency is written in: 0 Hz, 1 kHz, 2 MHz, 3 GHz, by the unit rule of ITU RR 2.1. */
export function unitStep(hz: number): 0 | 1 | 2 | 3 {
  if (hz < 1e3) return 0
  if (hz <= 3e6) return 1
  return hz <= 3e9 ? 2 : 3
}

function inUnit(hz: number, step: number): string {
  return writeDecimal(shiftDecimal(fromNumber(hz), -3 * step), NARROW_SPACE)
}

/**
 * A frequency in Hz as it is shown: by ITU RR 2.1, kHz up to and including 3 000 kHz, MHz above 3 MHz up to and
 * including 3 000 MHz, then GHz; Hz below 1 kHz. In `period` style c/s, kc, Mc and kMc with the same limits.
 * Every digit of whole hertz is kept; spaces inside are narrow and don't break. 0 reads "DC".
 */
export function formatFrequency(hz: number, style: FrequencyStyle = 'si'): string {
  if (!Number.isFinite(hz)) return 'not a frequency'
  if (hz === 0) return 'DC'
  const step = unitStep(Math.abs(hz))
  return `${inUnit(hz, step)}${NARROW_SPACE}${STYLE_UNITS[style][step]}`
}

/**
 * A range in Hz as it is shown: in the upper end's unit where the lower is at least one of it ("88–108 MHz", "2–4 MHz"),
 * else each in its own ("20 Hz – 20 kHz"); a spot frequency stands alone.
 */
export function formatFrequencyRange(lowerHz: number, upperHz: number, style: FrequencyStyle = 'si'): string {
  if (lowerHz === upperHz) return formatFrequency(lowerHz, style)
  const step = unitStep(upperHz)
  const shared = lowerHz >= 10 ** (3 * step) || (lowerHz > 0 && unitStep(lowerHz) === step)
  return shared
    ? `${inUnit(lowerHz, step)}–${formatFrequency(upperHz, style)}`
    : `${formatFrequency(lowerHz, style)} – ${formatFrequency(upperHz, style)}`.replaceAll(' ', NARROW_SPACE)
}

/** The ITU band of a frequency in Hz: lower limits exclusive, upper inclusive, so that 3 MHz is MF. */
export function bandOfFrequency(hz: number): ItuBand | null {
  return ituBandOf(hz)
}
