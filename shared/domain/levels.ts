/**
 * Levels in decibels and volts, and what is told by several of them. Impedances in ohm, voltages in volts rms unless said
 * otherwise. V = √(10^(dBm/10) · 1 mW · Z); dBµV = dBm + 90 + 10·log Z (definitions of dBm and dBµV; dBu refers to √0.6 V).
 */
export const IMPEDANCES = [50, 75, 600] as const

/** Level in dBm of a voltage across an impedance; −Infinity for nought. */
export const dbmOf = (volts: number, ohm: number): number => 10 * Math.log10(volts * volts / ohm * 1000)
/** Volts across an impedance at a level in dBm. */
export const voltsOf = (dbm: number, ohm: number): number => Math.sqrt(10 ** (dbm / 10) / 1000 * ohm)
/** dBm in an impedance as dB above a microvolt, and back. */
export const dbuvOf = (dbm: number, ohm: number): number => dbm + 90 + 10 * Math.log10(ohm)
export const dbmFromDbuv = (dbuv: number, ohm: number): number => dbuv - 90 - 10 * Math.log10(ohm)
/** Peak-to-peak of a sine from its rms value. */
export const peakToPeakOf = (rms: number): number => 2 * Math.SQRT2 * rms
/** A voltage ratio in dB. */
export const voltageRatioDb = (voltage: number, reference: number): number => 20 * Math.log10(voltage / reference)
/** What stands across a load that matches its source: half the EMF, 6.02 dB less. */
export const matchedVolts = (emf: number): number => emf / 2

/** How level an output is over a band: the highest less the lowest, in dB; null of fewer than two levels. */
export function levelling(levelsDb: readonly number[]): number | null {
  if (levelsDb.length < 2) return null
  return Math.max(...levelsDb) - Math.min(...levelsDb)
}

export interface StepError {
  nominalDb: number
  /** Against the setting before, and against the first: what one pad is off, and what all so far add up to. */
  stepErrorDb: number | null
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

/**
 * Modulation depth as a share from the highest and the lowest of the envelope: (max − min)/(max + min), the same from the
 * long and short side of a trapezoid. Null for what can't be: negative, or the wrong way round, or both nought.
 * Over-modulation can't be read from it: once the carrier is cut off it stays at 1.
 */
export function modulationDepth(highest: number, lowest: number): number | null {
  if (!(lowest >= 0) || !(highest >= lowest) || !(highest + lowest > 0)) return null
  return (highest - lowest) / (highest + lowest)
}

/** Depth of the peaks and of the troughs apart, against the unmodulated carrier, for an envelope that is not symmetrical. */
export function peakDepths(highest: number, lowest: number, carrier: number): { up: number, down: number } | null {
  if (!(carrier > 0) || !(highest >= carrier) || !(lowest >= 0) || lowest > carrier) return null
  return { up: (highest - carrier) / carrier, down: (carrier - lowest) / carrier }
}
