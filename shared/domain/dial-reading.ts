/**
 * One point of a dial check, from what was typed to its verdict: used by the sheet in the browser as it is typed, and
 * by the server when it is saved.
 */
import type { Interval } from './coverage'
import { dialCheckpoints, judgeDial } from './dial-check'
import type { DialVerdict } from './dial-check'
import { HIGHEST_HZ } from './frequency'
import type { CoverageFunction } from './functions'
import { parseReading } from './reading'

/** A checkpoint before it is read: the setting in Hz and its tolerance, ± per cent of the setting. */
export interface DialPoint { settingHz: number, tolerancePercent: number }

export type DialReading
  = | { ok: true, hz: number, verdict: DialVerdict, unitAssumed: boolean, typedUnit: string, question: string | null }
    | { ok: false, sentence: string }

/** Reads a dial reading as typed ("98.2 kc"; the unit may be left off where only one fits the setting) and judges it. */
export function readDial(typed: string, { settingHz, tolerancePercent }: DialPoint): DialReading {
  const reading = parseReading(typed, 'frequency', { nominal: settingHz })
  if (!reading.ok) return { ok: false, sentence: reading.sentence }
  if (!(reading.value > 0)) return { ok: false, sentence: 'A frequency read off a meter must be above zero. Leave it empty if nothing was read.' }
  if (reading.value > HIGHEST_HZ) return { ok: false, sentence: 'That is above 3 000 GHz, the highest frequency kept. Check the unit.' }
  return {
    ok: true,
    hz: reading.value,
    verdict: judgeDial(settingHz, reading.value, tolerancePercent),
    unitAssumed: reading.unitAssumed,
    typedUnit: reading.typedUnit,
    question: reading.suspicious?.sentence ?? null,
  }
}

/** What a band tells of its dial. */
export interface DialBand extends Interval { label: string, function: CoverageFunction, dialTolerancePercent: number | null }

/** The functions that a dial sets; what a piece measures or passes is not set by a dial. */
const SET_BY_DIAL: readonly CoverageFunction[] = ['generates', 'tunes', 'transmits']

/**
 * The dial checkpoints of a model, band by band: low, middle and high of each band that a dial sets and for which a
 * tolerance is known (the band's own, else the model's). Without a tolerance there is nothing to judge by, so none.
 */
export function modelCheckpoints(bands: readonly DialBand[], modelTolerancePercent: number | null): (DialPoint & { bandLabel: string })[] {
  return bands.flatMap((band) => {
    const tolerancePercent = band.dialTolerancePercent ?? modelTolerancePercent
    if (tolerancePercent === null || !SET_BY_DIAL.includes(band.function)) return []
    return dialCheckpoints(band).map(({ settingHz }) => ({ bandLabel: band.label, settingHz, tolerancePercent }))
  })
}
