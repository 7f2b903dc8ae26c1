/** How the readings of a sheet came out, counted by verdict: what stands is as left where it was adjusted, else as found. */
import type { Verdict } from './decision'
import type { Result } from './evaluation'

export interface SheetTally {
  /** Checkpoints of the sheet, and how many of them were read. */
  points: number
  read: number
  pass: number
  conditionalPass: number
  conditionalFail: number
  fail: number
  /** Read, but without a limit to be judged by. */
  unjudged: number
}

interface Read { found: { result: Result } | null, left: { result: Result } | null }

/** What stands of a reading: as left, else as found; null while not read. */
export const standing = <Kind extends { result: Result }>(reading: { found: Kind | null, left: Kind | null }): Kind | null => reading.left ?? reading.found

const FIELDS: Record<Verdict, 'pass' | 'conditionalPass' | 'conditionalFail' | 'fail'> = {
  pass: 'pass', conditional_pass: 'conditionalPass', conditional_fail: 'conditionalFail', fail: 'fail',
}

/** Counts the readings of a sheet. */
export function tallyOf(readings: readonly Read[]): SheetTally {
  const tally: SheetTally = { points: readings.length, read: 0, pass: 0, conditionalPass: 0, conditionalFail: 0, fail: 0, unjudged: 0 }
  for (const reading of readings) {
    const result = standing(reading)?.result
    if (!result) continue
    tally.read += 1
    tally[result.judgement ? FIELDS[result.judgement.verdict] : 'unjudged'] += 1
  }
  return tally
}

/** Readings within their limits, whatever their uncertainty, and outside them. */
export const withinCount = ({ pass, conditionalPass }: SheetTally): number => pass + conditionalPass
export const outsideCount = ({ fail, conditionalFail }: SheetTally): number => fail + conditionalFail

/** "3 of 12 readings out, 2 too near the limit to be sure, 1 not read": a sheet in one line. */
export function tallyInWords(tally: SheetTally): string {
  const { points, read, conditionalPass, unjudged } = tally
  if (points === 0) return ''
  const out = outsideCount(tally)
  const judged = read - unjudged
  return [
    judged === 0 ? '' : out === 0 ? `${judged} ${judged === 1 ? 'reading' : 'readings'}, none out` : `${out} of ${judged} readings out`,
    conditionalPass === 0 ? '' : `${conditionalPass} in but too near the limit to be certain`,
    unjudged === 0 ? '' : `${unjudged} without a limit`,
    read === points ? '' : `${points - read} of ${points} not read`,
  ].filter(Boolean).join(', ')
}
