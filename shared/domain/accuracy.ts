/**
 * How well a bench instrument measures, as its maker states it, and what that means for one reading.
 *
 * A stated accuracy is a pair of limits within which the value lies, so it is taken as rectangular with no end of degrees
 * of freedom (GUM 4.3.7, G.4.2). Counter: ±1 count is 1/gate time, the time base f·|Δf₀/f₀| (usual counter theory).
 */
import type { Quantity } from './reading'
import { BASE_UNITS } from './reading'
import { decibelsPerDecade } from './limits'
import type { Component } from './uncertainty'
import { repeats, resolution, within } from './uncertainty'

/** One line of an instrument's specification: over what it holds, and how well. Everything in base units. */
export interface Capability {
  /** "AC volts, 3 V range"; empty where the quantity says it all. */
  label: string
  quantity: Quantity
  /** What it can read, both ends within. `upper` is the full scale that per cent of range is taken of. */
  lower: number
  upper: number
  percentOfReading: number | null
  percentOfRange: number | null
  /** ± this many of the last digit. */
  digits: number | null
  /** What one of the last digit is; null: as finely as the reading was typed. */
  digitStep: number | null
  /** Time base: ± parts in a million, and how much it may age in a year. */
  ppm: number | null
  ageingPpmPerYear: number | null
  /** Gate time in seconds: ±1 count of it is counted. */
  gateSeconds: number | null
  decibels: number | null
}

/** Whether a capability covers a value of a quantity. */
export function covers(capability: Capability, quantity: Quantity, value: number): boolean {
  return capability.quantity === quantity && Math.abs(value) >= capability.lower && Math.abs(value) <= capability.upper
}

/** A reading as the computation needs it: the mean, its last place, and the single values if there are several. */
export interface Measured { value: number, step: number, count: number, deviation: number }

const number = (value: number): string => String(Number(value.toPrecision(6)))

/** The limits that add up as makers add them: % of reading, % of range and digits. */
function addedLimits(capability: Capability, { value, step }: Measured): Component[] {
  const parts: [string, number][] = []
  if (capability.percentOfReading) parts.push([`${number(capability.percentOfReading)} % of reading`, Math.abs(value) * capability.percentOfReading / 100])
  if (capability.percentOfRange) parts.push([`${number(capability.percentOfRange)} % of range`, capability.upper * capability.percentOfRange / 100])
  if (capability.digits) parts.push([`${number(capability.digits)} ${capability.digits === 1 ? 'digit' : 'digits'}`, capability.digits * (capability.digitStep ?? step)])
  return parts.length === 0 ? [] : [within(`accuracy ±(${parts.map(([label]) => label).join(' + ')})`, parts.reduce((sum, [, part]) => sum + part, 0))]
}

/** ± dB about a value: added where the quantity is in dB, else the larger of the two ways a factor can go. */
function decibelLimit(capability: Capability, { value }: Measured): Component[] {
  if (!capability.decibels) return []
  const isLevel = capability.quantity === 'level' || capability.quantity === 'power_level'
  const half = isLevel ? capability.decibels : Math.abs(value) * (10 ** (capability.decibels / decibelsPerDecade(capability.quantity)) - 1)
  return [within(`accuracy ±${number(capability.decibels)} dB`, half)]
}

function timeBase(capability: Capability, { value }: Measured, yearsSinceCalibration: number | null): Component[] {
  const stated = capability.ppm ? [within(`time base, ±${number(capability.ppm)} ppm`, Math.abs(value) * capability.ppm * 1e-6)] : []
  if (!capability.ageingPpmPerYear || yearsSinceCalibration === null) return stated
  const aged = capability.ageingPpmPerYear * yearsSinceCalibration
  return [...stated, within(`time base, aged ${Number(aged.toPrecision(2))} ppm since calibration`, Math.abs(value) * aged * 1e-6)]
}

/** ±1 count: in hertz 1/gate; of a time or another quantity it has no meaning and is left out. */
function lastCount(capability: Capability): Component[] {
  return capability.gateSeconds && capability.quantity === 'frequency'
    ? [within(`±1 count at ${number(capability.gateSeconds)} s gate`, 1 / capability.gateSeconds)]
    : []
}

/** The last place read, where no count or digit of the same size or more stands for it already. */
function lastPlace(capability: Capability, { step }: Measured): Component[] {
  const counted = Math.max(
    capability.gateSeconds && capability.quantity === 'frequency' ? 1 / capability.gateSeconds : 0,
    capability.digits ? capability.digits * (capability.digitStep ?? step) : 0,
  )
  return step > counted * (1 + 1e-9) ? [resolution('last place read', step)] : []
}

/**
 * The components of a reading's uncertainty, in the reading's base unit. `yearsSinceCalibration` is null where the
 * instrument was never calibrated as far as is recorded: then no ageing can be counted. Empty where the instrument
 * states no accuracy: a display alone doesn't say how well it measures.
 */
export function readingComponents(capability: Capability, measured: Measured, yearsSinceCalibration: number | null): Component[] {
  const stated = [
    ...addedLimits(capability, measured), ...decibelLimit(capability, measured),
    ...timeBase(capability, measured, yearsSinceCalibration), ...lastCount(capability),
  ]
  if (stated.length === 0) return []
  const repeated = measured.count > 1 ? [repeats(`repeat readings, ${measured.count} of them`, measured.deviation, measured.count)] : []
  return [...stated, ...lastPlace(capability, measured), ...repeated]
}

/** "±(0.5 % of reading + 2 digits), ±0.2 ppm, ±1 count at 1 s": a capability as its maker would write it. */
export function accuracyInWords(capability: Capability): string {
  const added = [
    capability.percentOfReading ? `${number(capability.percentOfReading)} % of reading` : '',
    capability.percentOfRange ? `${number(capability.percentOfRange)} % of range` : '',
    capability.digits ? `${number(capability.digits)} ${capability.digits === 1 ? 'digit' : 'digits'}` : '',
  ].filter(Boolean)
  return [
    added.length > 1 ? `±(${added.join(' + ')})` : added.length === 1 ? `±${added[0]}` : '',
    capability.decibels ? `±${number(capability.decibels)} dB` : '',
    capability.ppm ? `±${number(capability.ppm)} ppm` : '',
    capability.ageingPpmPerYear ? `ageing ${number(capability.ageingPpmPerYear)} ppm a year` : '',
    capability.gateSeconds ? `±1 count at ${number(capability.gateSeconds)} s` : '',
  ].filter(Boolean).join(', ') || `${BASE_UNITS[capability.quantity]}, accuracy not stated`
}

const DAYS_PER_YEAR = 365.25
const MS_PER_DAY = 86_400_000

/** Years between two days (`2026-11-30`), 0 if the second is the earlier; null where the first is not known. */
export function yearsBetween(from: string | null, to: string): number | null {
  if (from === null) return null
  return Math.max(0, (Date.parse(to) - Date.parse(from)) / MS_PER_DAY / DAYS_PER_YEAR)
}
