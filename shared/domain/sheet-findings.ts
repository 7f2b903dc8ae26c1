/** What the readings of a sheet say taken together: of a band's alignment, of the coverage, of a level over the bands, of an attenuator. */
import type { ReadingView } from '../types/bench'
import type { AlignmentAdvice } from './alignment-advisor'
import { adviseAlignment, LEAST_POINTS } from './alignment-advisor'
import { reportCoverage } from './coverage-check'
import { NARROW_SPACE } from './frequency'
import { attenuatorErrors, levelling } from './levels'
import { standing } from './sheet-tally'

/** One thing the readings say; `isFault` where it falls short of what is published. */
export interface Finding { sentence: string, isFault: boolean }

interface Band { label: string, points: { settingHz: number, readingHz: number }[], lowest: ReadingView, highest: ReadingView, tolerancePercent: number }

const valueOf = (reading: ReadingView): number | null => standing(reading)?.result.value ?? null
const nominalOf = ({ nominal }: ReadingView): number => nominal ?? 0

/** The dial's readings band by band, each in the order of frequency. */
function dialBands(readings: readonly ReadingView[]): Band[] {
  const dial = readings.filter(reading => reading.section === 'dial' && nominalOf(reading) > 0)
  return [...new Set(dial.map(({ bandLabel }) => bandLabel))].flatMap((label): Band[] => {
    const own = dial.filter(reading => reading.bandLabel === label).sort((a, b) => nominalOf(a) - nominalOf(b))
    const [lowest, highest] = [own[0], own.at(-1)]
    if (!lowest || !highest) return []
    const points = own.flatMap((reading) => {
      const readingHz = valueOf(reading)
      return readingHz === null ? [] : [{ settingHz: nominalOf(reading), readingHz }]
    })
    return [{ label, points, lowest, highest, tolerancePercent: lowest.limit?.kind === 'percent_of_setting' ? lowest.limit.amount : 0 }]
  })
}

/** Advice for every band that was read at points enough; `hasTooFew` where the dial was read, but no band often enough. */
export function alignmentFindings(readings: readonly ReadingView[]): { bands: ({ label: string } & AlignmentAdvice)[], hasTooFew: boolean } {
  const all = dialBands(readings)
  const judgeable = all.filter(({ points, tolerancePercent }) => points.length >= LEAST_POINTS && tolerancePercent > 0)
  return {
    bands: judgeable.map(({ label, points, tolerancePercent }) => ({ label, ...adviseAlignment(points, tolerancePercent) })),
    hasTooFew: judgeable.length === 0 && all.some(({ points }) => points.length > 0),
  }
}

const FAULTS = ['short', 'gap', 'wrong_way']

/** Whether the dial reaches what the plate claims, band by band, seam by seam, and as a whole where every band was read. */
export function coverageFindings(readings: readonly ReadingView[]): Finding[] {
  const report = reportCoverage(dialBands(readings).filter(({ points }) => points.length > 0).map(({ label, lowest, highest, tolerancePercent }) => ({
    label, tolerancePercent, lowerHz: nominalOf(lowest), upperHz: nominalOf(highest), measuredLowHz: valueOf(lowest), measuredHighHz: valueOf(highest),
  })))
  const found = [...report.bands.map(({ finding }) => finding), ...report.seams].filter(({ kind }) => kind !== 'not_read')
  const whole = found.length > 1 ? report.plate.filter(({ kind }) => kind !== 'not_known').map(({ kind, sentence }) => ({ sentence, isFault: kind === 'short' })) : []
  return [...found.map(({ kind, sentence }) => ({ sentence, isFault: FAULTS.includes(kind) })), ...whole]
}

const decibels = (value: number): string => `${value < 0 ? '\u2212' : ''}${Math.abs(value).toFixed(1)}${NARROW_SPACE}dB`

function levellingOf(readings: readonly ReadingView[]): Finding[] {
  const levels = readings.filter(({ section }) => section === 'output_level').flatMap((reading) => {
    const value = valueOf(reading)
    return value === null ? [] : [value]
  })
  const spread = levelling(levels)
  return spread === null ? [] : [{ sentence: `The output level varies by ${decibels(spread)} over what was read (highest less lowest).`, isFault: false }]
}

function attenuatorOf(readings: readonly ReadingView[]): Finding[] {
  const steps = readings.filter(({ section, quantity }) => section === 'attenuator' && (quantity === 'level' || quantity === 'power_level'))
    .flatMap((reading) => {
      const readDb = valueOf(reading)
      return readDb === null || reading.nominal === null ? [] : [{ nominalDb: reading.nominal, readDb }]
    })
  const errors = attenuatorErrors(steps)
  const worst = errors.reduce((most, { stepErrorDb }) => Math.abs(stepErrorDb ?? 0) > Math.abs(most) ? stepErrorDb ?? 0 : most, 0)
  const last = errors.at(-1)
  return errors.length < 2 || !last
    ? []
    : [{ sentence: `The worst step of the attenuator is off by ${decibels(worst)}; down to ${decibels(last.nominalDb)} its errors add up to ${decibels(last.accumulatedErrorDb)}.`, isFault: false }]
}

/** How level the output is over the bands, and what the attenuator's steps are off; the verdicts stand at the readings themselves. */
export const levelFindings = (readings: readonly ReadingView[]): Finding[] => [...levellingOf(readings), ...attenuatorOf(readings)]
