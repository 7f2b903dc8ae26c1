/**
 * The results of a test report, a table for each part of the piece. What was adjusted stands twice, before and after, each
 * with its own error, uncertainty and verdict (ISO/IEC 17025:2017, 7.8.4.1). Words only: the PDF lays them out.
 */
import type { InstrumentView, ReadingView, TakenView } from '../types/bench'
import { formatToPlace } from './amount'
import type { Section } from './checkpoint'
import { SECTION_LABELS, SECTIONS } from './checkpoint'
import type { Judgement, Verdict } from './decision'
import { VERDICT_LABELS } from './decision'
import type { Result } from './evaluation'
import { NARROW_SPACE } from './frequency'
import { bound, boundTag } from './report-words'
import { checkpointTitle, errorInWords, limitInWords, uncertaintyInWords } from './result-words'
import { readTaken } from './taken'
import { roundTo, roundUncertainty } from './uncertainty'

/** Before an adjustment or after it; neither where nothing was adjusted. */
export type Phase = 'as found' | 'as left' | ''

export interface ReportRow {
  point: string
  phase: Phase
  limit: string
  /** "99.912 kHz"; "not read". */
  read: string
  error: string
  /** "±0.98 Hz", and its coverage factor: "2.00". */
  uncertainty: string
  factor: string
  /** Probability that the value measured is within the limits: "97 %"; empty where it can't be said. */
  conformance: string
  /** Test uncertainty ratio: "41", "2.6"; empty with one limit only. */
  ratio: string
  verdict: Verdict | null
  verdictWords: string
}

export interface ReportTable {
  section: Section
  title: string
  isAdjusted: boolean
  rows: ReportRow[]
  /** What is to be known of single rows, and with what they were read. */
  notes: string[]
}

/** Probability of conformance in per cent, never rounded up to certainty. */
export function conformanceInWords(probability: number | null): string {
  if (probability === null) return ''
  const percent = probability * 100
  if (percent > 99.9) return `>${NARROW_SPACE}99.9${NARROW_SPACE}%`
  if (percent < 0.1) return `<${NARROW_SPACE}0.1${NARROW_SPACE}%`
  return `${percent.toFixed(percent > 99 || percent < 1 ? 1 : 0)}${NARROW_SPACE}%`
}

/** A test uncertainty ratio to two figures, cut and not rounded up, so that 3.96 is not taken for 4. */
export function ratioInWords(ratio: number | null): string {
  if (ratio === null) return ''
  if (ratio >= 100) return `>${NARROW_SPACE}100`
  return ratio >= 10 ? String(Math.floor(ratio)) : (Math.floor(ratio * 10 + 1e-9) / 10).toFixed(1)
}

/** Six significant figures of a value, as a power of ten: how finely it is shown where nothing else says. */
const sixFigures = (value: number): number => Math.floor(Math.log10(Math.abs(value) || 1)) - 5

/** The value as finely as it was read; what is worked out (a mean, a depth) as finely as its uncertainty is stated. */
export function readInWords({ text, result }: TakenView, reading: ReadingView): string {
  const taken = readTaken(text, reading)
  const read = taken.ok && taken.step > 0 ? Math.floor(Math.log10(taken.step) + 1e-9) : null
  const isAsRead = read !== null && Math.abs(roundTo(result.value, read) - result.value) < 1e-6 * 10 ** read
  const place = isAsRead ? read : result.uncertainty ? roundUncertainty(result.uncertainty.expanded).place : sixFigures(result.value)
  return formatToPlace(result.value, place, reading.quantity)
}

function verdictWords(result: Result, judgement: Judgement | null): string {
  if (judgement) return VERDICT_LABELS[judgement.verdict].toLowerCase()
  return result.limitProblem ? 'not judged' : 'no limit'
}

function rowOf(reading: ReadingView, taken: TakenView, phase: Phase): ReportRow {
  const { result } = taken
  const { judgement, uncertainty } = result
  return {
    point: checkpointTitle(reading),
    phase,
    limit: limitInWords(reading.limit, reading.quantity),
    read: readInWords(taken, reading),
    error: errorInWords(result, reading),
    uncertainty: uncertaintyInWords(result, reading.quantity),
    factor: uncertainty ? uncertainty.factor.toFixed(2) : '',
    conformance: conformanceInWords(judgement?.conformance ?? null),
    ratio: ratioInWords(judgement?.ratio ?? null),
    verdict: judgement?.verdict ?? null,
    verdictWords: verdictWords(result, judgement),
  }
}

const notRead = (reading: ReadingView): ReportRow => ({
  point: checkpointTitle(reading), phase: '', limit: limitInWords(reading.limit, reading.quantity), read: 'not read',
  error: '', uncertainty: '', factor: '', conformance: '', ratio: '', verdict: null, verdictWords: '',
})

function rowsOf(reading: ReadingView): ReportRow[] {
  const { found, left } = reading
  if (left) return [...found ? [rowOf(reading, found, 'as found')] : [], rowOf(reading, left, 'as left')]
  return found ? [rowOf(reading, found, '')] : [notRead(reading)]
}

/** How a value came of what was written down, where it is not simply that. */
function origin({ text, result }: TakenView): string[] {
  const written = bound(text).replaceAll(/(^|[\s;])-/gu, '$1\u2212')
  if (result.count > 1) return [`the mean of ${written}`]
  return text.includes('/') ? [`from the envelope, ${written}`] : []
}

function notesOf(reading: ReadingView): string[] {
  const taken = [reading.found, reading.left].flatMap(each => each ?? [])
  const words = [
    ...taken.flatMap(origin),
    ...new Set(taken.flatMap(({ result }) => result.limitProblem ?? [])),
    ...new Set(taken.flatMap(({ result }) => result.fitness === 'cannot' ? result.fitnessSentence : [])),
    ...reading.note ? [reading.note] : [],
  ]
  return words.length > 0 ? [`${checkpointTitle(reading)}: ${words.map(each => each.replace(/\.$/u, '')).join('; ')}.`] : []
}

/** "Read with Counter (B 000001 1).", or what was read with each where there were several. */
function instrumentsOf(readings: readonly ReadingView[], instruments: readonly InstrumentView[]): string[] {
  const used = new Map<string, Set<string>>()
  for (const reading of readings) {
    for (const taken of [reading.found, reading.left]) {
      if (!taken) continue
      const instrument = instruments.find(({ id }) => id === taken.result.instrumentId)
      const name = instrument ? `${instrument.name} (${boundTag(instrument.tag)})` : 'an instrument that is not recorded'
      used.set(name, (used.get(name) ?? new Set()).add(checkpointTitle(reading)))
    }
  }
  if (used.size === 0) return []
  const words = [...used].map(([name, points]) => used.size === 1 ? name : `${name}: ${[...points].join('; ')}`)
  return [`Read with ${words.join('. With ')}.`]
}

/** The readings of a sheet as tables, in the order of the parts of a piece. */
export function reportTables(readings: readonly ReadingView[], instruments: readonly InstrumentView[]): ReportTable[] {
  return SECTIONS.flatMap((section) => {
    const own = readings.filter(reading => reading.section === section)
    return own.length === 0
      ? []
      : [{
          section,
          title: SECTION_LABELS[section],
          isAdjusted: own.some(({ left }) => left !== null),
          rows: own.flatMap(rowsOf),
          notes: [...instrumentsOf(own, instruments), ...own.flatMap(notesOf)],
        }]
  })
}
