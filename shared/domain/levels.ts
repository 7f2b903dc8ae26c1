/**
 * Levels in decibels and volts, and what is told by several of them. Impedances in ohm, voltages in volts rms unless said
 * otherwise. V = √(10^(dBm/10) · 1 mW · Z); dBµV = dBm + 90 + 10·log Z (definitions of dBm and dBµV; dBu refers to √0.6 V).
 */
import { NARROW_SPACE } from './frequency'

/** Impedances that instruments of the trade are levelled in, ohm. */
export const IMPEDANCES = [50, 75, 600] as const

/** Level in dBm of a voltage across an impedance; −Infinity for nought. */
export const dbmOf = (volts: number, ohm: number): number => 10 * Math.log10(volts * volts / ohm * 1000)
/** Volts across an impedance at a level in dBm. */
export const voltsOf = (dbm: number, ohm: number): number => Math.sqrt(10 ** (dbm / 10) / 1000 * ohm)
/** dBm in an impedance as dB above a microvolt, and back. */
export const dbuvOf = (dbm: number, ohm: number): number => dbm + 90 + 10 * Math.log10(ohm)
export const dbmFromDbuv = (dbuv: number, ohm: number): number => dbuv - 90 - 10 * Math.log10(ohm)
/** Peak and peak-to-peak of a sine from its rms value, and the rms value from either. Of a sine only. */
export const peakOf = (rms: number): number => Math.SQRT2 * rms
export const peakToPeakOf = (rms: number): number => 2 * Math.SQRT2 * rms
export const rmsFromPeak = (peak: number): number => peak / Math.SQRT2
export const rmsFromPeakToPeak = (peakToPeak: number): number => peakToPeak / (2 * Math.SQRT2)
/** A ratio of two voltages in dB across the same impedance, and back. */
export const voltageRatioDb = (voltage: number, reference: number): number => 20 * Math.log10(voltage / reference)
export const voltageRatio = (db: number): number => 10 ** (db / 20)
/** A ratio of two powers in dB, and back. */
export const powerRatioDb = (power: number, reference: number): number => 10 * Math.log10(power / reference)
export const powerRatio = (db: number): number => 10 ** (db / 10)
/** How far the voltage across a matched load lies below the EMF, in dB: 20·log 2. */
export const EMF_TO_MATCHED_DB = 20 * Math.log10(2)
/** What stands across a load that matches its source: half the EMF, 6.02 dB less. Volts in, volts out. */
export const matchedVolts = (emf: number): number => emf / 2

/** How level an output is over a band: the highest less the lowest, in dB; null of fewer than two levels. */
export function levelling(levelsDb: readonly number[]): number | null {
  if (levelsDb.length < 2) return null
  return Math.max(...levelsDb) - Math.min(...levelsDb)
}

/** What one setting of an attenuator is off, in dB; the first setting is the reference. */
export interface StepError {
  nominalDb: number
  /** Measured step less nominal step, against the setting before; null for the first. */
  stepErrorDb: number | null
  /** The same against the first setting: what all so far add up to. */
  accumulatedErrorDb: number
}

/** What each step of an attenuator is off. Levels in dB as read at each nominal setting, the first being the reference. */
export function attenuatorErrors(steps: readonly { nominalDb: number, readDb: number }[]): StepError[] {
  const [first] = steps
  if (!first) return []
  return steps.map(({ nominalDb, readDb }, index) => {
    const before = steps[index - 1]
    return {
      nominalDb,
      stepErrorDb: before ? (readDb - before.readDb) - (nominalDb - before.nominalDb) : null,
      accumulatedErrorDb: (readDb - first.readDb) - (nominalDb - first.nominalDb),
    }
  })
}

/** Said where an envelope touches nought. That a trapezoid then grows a line beyond its point is common practice, no source. */
export const OVER_MODULATION_NOTE = `The troughs reach nought, which is 100${NARROW_SPACE}% or more: over-modulation can’t be read from the heights of an envelope. Look at the trapezoid for a line beyond its point.`

export type ModulationDepth
  /** `depth` is a share from 0 to 1; carrier and modulating peak in the unit of what was read; `note` only where the troughs reach nought. */
  = | { ok: true, depth: number, carrier: number, modulatingPeak: number, note: string | null }
    | { ok: false, sentence: string }

const refuse = (sentence: string): { ok: false, sentence: string } => ({ ok: false, sentence })

/** What is wrong with the two heights of an envelope, in a sentence; null when nothing is. */
function envelopeProblem(highest: number, lowest: number): string | null {
  if (!Number.isFinite(highest) || !Number.isFinite(lowest)) return 'Enter the highest and the lowest of the envelope as numbers.'
  if (highest < 0 || lowest < 0) return 'The heights of an envelope can’t be below nought. Measure both from the centre line, or both peak to peak.'
  if (lowest > highest) return 'The lowest of the envelope is more than the highest. Swap them.'
  return highest === 0 ? 'With no signal there is no modulation depth to read.' : null
}

/**
 * Modulation depth from the highest and the lowest of the envelope, (max − min)/(max + min), or from the long and the short
 * side of a trapezoid alike; the carrier is the mean of the two, the modulating peak half their difference (an engineer’s
 * published notes on both methods, secondary). Over-modulation can’t be read from it: once the carrier is cut off it stays at 1.
 */
export function modulationDepth(highest: number, lowest: number): ModulationDepth {
  const problem = envelopeProblem(highest, lowest)
  if (problem) return refuse(problem)
  return {
    ok: true,
    depth: (highest - lowest) / (highest + lowest),
    carrier: (highest + lowest) / 2,
    modulatingPeak: (highest - lowest) / 2,
    note: lowest === 0 ? OVER_MODULATION_NOTE : null,
  }
}

export type PeakDepths = { ok: true, up: number, down: number, note: string | null } | { ok: false, sentence: string }

/**
 * Depth of the peaks and of the troughs apart, as shares of the unmodulated carrier, for an envelope that is not symmetrical:
 * (max − carrier)/carrier and (carrier − min)/carrier (a tester’s manual, secondary). `up` may exceed 1, `down` can’t.
 */
export function peakDepths(highest: number, lowest: number, carrier: number): PeakDepths {
  const problem = envelopeProblem(highest, lowest)
  if (problem) return refuse(problem)
  if (!(carrier > 0) || carrier > highest || carrier < lowest) {
    return refuse('The carrier without modulation must be above nought and lie between the lowest and the highest of the envelope. Read it again with the modulation off.')
  }
  return { ok: true, up: (highest - carrier) / carrier, down: (carrier - lowest) / carrier, note: lowest === 0 ? OVER_MODULATION_NOTE : null }
}
