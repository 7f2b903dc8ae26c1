/**
 * What of the stock answers one typed line, and how nearly: words and frequencies together. Nearness and order are
 * common practice of this product, no source.
 */
import { covers, gapsWithin, overlaps, shortfall, unionOf } from './coverage'
import type { CoverageBand, Interval } from './coverage'
import { EQUIPMENT_KIND_LABELS, EQUIPMENT_KIND_WORDS } from './equipment-kinds'
import { formatFrequency, formatFrequencyRange } from './frequency'
import type { FrequencyQuery } from './frequency-query'
import { FUNCTIONS, FUNCTION_LABELS } from './functions'
import type { CoverageFunction } from './functions'
import { formatTag } from './tag'
import type { UnitSummary } from '../types/unit'

/** What a line asks of a coverage, besides its words. Whole hertz. */
export type AskedOfCoverage = Pick<FrequencyQuery, 'wholly' | 'overlapping' | 'reachesUpToHz' | 'reachesDownToHz' | 'functions'>

/** How a piece's coverage answers: wholly or nearly, with the words beneath its bars and how much is missing, in octaves. */
export interface CoverageAnswer {
  answer: 'full' | 'nearly'
  note: string | null
  missingOctaves: number
}

/** One piece that answers. The lower the rank, the better; within nearly, by what is missing. */
export interface StockHit {
  unit: UnitSummary
  answer: 'full' | 'nearly'
  note: string | null
  rank: number
}

/** How far a coverage may stop short of what is asked and still be called near: half an octave. */
const NEAR_OCTAVES = 0.5

interface Condition {
  met: boolean
  /** In octaves; 0 when met. */
  missing: number
  /** Part of what is asked is there. */
  partly: boolean
  says: string
}

const octaves = (from: number, to: number): number => Math.abs(Math.log2(Math.max(to, 1) / Math.max(from, 1)))

/** From a range to the nearest covered frequency, in octaves; none is as far as can be. */
function distance(intervals: readonly Interval[], range: Interval): number {
  return Math.min(...intervals.map(({ lowerHz, upperHz }) =>
    upperHz < range.lowerHz ? octaves(upperHz, range.lowerHz) : lowerHz > range.upperHz ? octaves(range.upperHz, lowerHz) : 0))
}

function askWholly(intervals: readonly Interval[], range: Interval): Condition {
  const met = covers(intervals, range)
  const partly = overlaps(intervals, range)
  const missing = met ? 0 : gapsWithin(intervals, range).reduce((sum, gap) => sum + octaves(gap.lowerHz, gap.upperHz + 1), 0)
  return {
    met,
    partly,
    missing: met || partly ? missing : missing + distance(intervals, range),
    says: met ? `covers ${formatFrequencyRange(range.lowerHz, range.upperHz)}` : shortfall(intervals, range) ?? '',
  }
}

function askPartly(intervals: readonly Interval[], range: Interval): Condition {
  const met = overlaps(intervals, range)
  return {
    met,
    partly: false,
    missing: met ? 0 : distance(intervals, range),
    says: met ? `covers part of ${formatFrequencyRange(range.lowerHz, range.upperHz)}` : shortfall(intervals, range) ?? '',
  }
}

function askUp(intervals: readonly Interval[], upToHz: number): Condition {
  const top = Math.max(...intervals.map(interval => interval.upperHz))
  const met = top >= upToHz
  return {
    met,
    partly: false,
    missing: met ? 0 : octaves(top, upToHz),
    says: met ? `reaches ${formatFrequency(upToHz)}` : `stops at ${formatFrequency(top)}, ${formatFrequency(upToHz - top)} short`,
  }
}

function askDown(intervals: readonly Interval[], downToHz: number): Condition {
  const bottom = Math.min(...intervals.map(interval => interval.lowerHz))
  const met = bottom <= downToHz
  return {
    met,
    partly: false,
    missing: met ? 0 : octaves(downToHz, bottom),
    says: met ? `goes down to ${formatFrequency(downToHz)}` : `starts at ${formatFrequency(bottom)}, ${formatFrequency(bottom - downToHz)} short`,
  }
}

function conditions(intervals: readonly Interval[], asked: AskedOfCoverage): Condition[] {
  return [
    ...asked.wholly.map(range => askWholly(intervals, range)),
    ...asked.overlapping.map(range => askPartly(intervals, range)),
    ...asked.reachesUpToHz === null ? [] : [askUp(intervals, asked.reachesUpToHz)],
    ...asked.reachesDownToHz === null ? [] : [askDown(intervals, asked.reachesDownToHz)],
  ]
}

const ALL_OF = ['', '', 'covers both', 'covers all three', 'covers all four']

function noteOf(all: readonly Condition[]): string | null {
  const unmet = all.filter(condition => !condition.met)
  const met = all.filter(condition => condition.met)
  if (unmet.length === 0) return all.length > 1 ? ALL_OF[all.length] ?? `covers all ${all.length}` : met[0]?.says ?? null
  return [...new Set([...met, ...unmet].map(condition => condition.says).filter(Boolean))].join(' · ')
}

function answerOf(intervals: readonly Interval[], asked: AskedOfCoverage): CoverageAnswer | null {
  const all = conditions(intervals, asked)
  const unmet = all.filter(condition => !condition.met)
  const missingOctaves = unmet.reduce((sum, condition) => sum + condition.missing, 0)
  if (unmet.length === 0) return { answer: 'full', note: noteOf(all), missingOctaves: 0 }
  const near = unmet.length < all.length || unmet.every(condition => condition.partly || condition.missing <= NEAR_OCTAVES)
  return near ? { answer: 'nearly', note: noteOf(all), missingOctaves } : null
}

/** Whether anything but words is asked for. */
export function asksOfCoverage(asked: AskedOfCoverage): boolean {
  return asked.wholly.length + asked.overlapping.length + asked.functions.length > 0
    || asked.reachesUpToHz !== null || asked.reachesDownToHz !== null
}

/**
 * How a piece's bands answer what is asked, or null where they don't. One function must answer all of it: generating
 * 455 kHz and measuring 30 MHz is not generating both. "Nearly" is where some of it is met, or what is missing is less
 * than half an octave, or part of a range is there; its note says what falls short.
 */
export function answerCoverage(bands: readonly CoverageBand[], asked: AskedOfCoverage): CoverageAnswer | null {
  const wanted: readonly CoverageFunction[] = asked.functions.length > 0 ? asked.functions : FUNCTIONS
  const several = new Set(bands.map(band => band.function)).size > 1
  const answers = wanted.flatMap((name) => {
    const intervals = unionOf(bands.filter(band => band.function === name))
    const found = intervals.length > 0 ? answerOf(intervals, asked) : null
    if (found === null) return []
    return [{ ...found, note: found.note !== null && several ? `${FUNCTION_LABELS[name].toLowerCase()}: ${found.note}` : found.note }]
  })
  const full = answers.find(found => found.answer === 'full')
  return full ?? answers.reduce<CoverageAnswer | null>((best, found) => best === null || found.missingOctaves < best.missingOctaves ? found : best, null)
}

/** Words that join a sentence and name nothing in stock. */
const JOINING = new Set(['a', 'all', 'an', 'and', 'any', 'for', 'from', 'in', 'of', 'on', 'or', 'that', 'the', 'to', 'which', 'with', 'piece', 'pieces', 'band'])

/** The words of a line that name something, in lower case. */
export function searchWords(words: string): string[] {
  return words.toLowerCase().split(/[\s,;]+/).filter(word => word !== '' && !JOINING.has(word)).slice(0, 10)
}

/** What is looked through for words, in the shape that a fuzzy index takes. */
export interface SearchRecord {
  tag: string
  shownTag: string
  name: string
  kind: string
  serial: string
  place: string
}

/** A unit as its words. */
export function searchRecord(unit: UnitSummary): SearchRecord {
  return {
    tag: unit.tag,
    shownTag: formatTag(unit.tag),
    name: `${unit.model.maker} ${unit.model.designation}`,
    kind: `${EQUIPMENT_KIND_LABELS[unit.model.kind]} ${EQUIPMENT_KIND_WORDS[unit.model.kind]}`,
    serial: unit.serial.text ?? '',
    place: unit.place?.path ?? '',
  }
}

/** How the fuzzy index is to be set up: a slip or two in a word of some length is forgiven, wherever the word stands. */
export const STOCK_INDEX_OPTIONS = {
  keys: [
    { name: 'name', weight: 3 }, { name: 'tag', weight: 3 }, { name: 'shownTag', weight: 2 }, { name: 'kind', weight: 2 },
    { name: 'serial', weight: 2 }, { name: 'place', weight: 1 },
  ],
  includeScore: true,
  ignoreLocation: true,
  ignoreFieldNorm: true,
  threshold: 0.3,
}

/** Words shorter than this have no room for a slip: they must be found as they stand. */
const SHORTEST_FUZZY = 4

/** The fuzzy index, asked for one word: who has it, the better the lower. */
export type WordIndex = (word: string) => readonly { tag: string, score: number }[]

/**
 * How well each unit has all the words, the better the lower; units that lack one are left out. Null without words:
 * then every unit does.
 */
export function rankByWords(words: readonly string[], records: readonly SearchRecord[], index: WordIndex): Map<string, number> | null {
  if (words.length === 0) return null
  const found = words.map(word => word.length < SHORTEST_FUZZY || /\d/.test(word) ? exactly(word, records) : new Map(index(word).map(({ tag, score }) => [tag, score])))
  const ranks = new Map<string, number>()
  for (const { tag } of records) {
    const scores = found.map(each => each.get(tag))
    if (scores.every(score => score !== undefined)) ranks.set(tag, scores.reduce((sum, score) => sum + score, 0))
  }
  return ranks
}

/** Short words and those with figures are types, serials and tags: one figure off is another thing. */
function exactly(word: string, records: readonly SearchRecord[]): Map<string, number> {
  const found = new Map<string, number>()
  for (const record of records) {
    const texts = [record.name, record.tag, record.serial, record.kind, record.place].map(text => text.toLowerCase())
    if (texts.some(text => text.split(/[\s/–-]+/).includes(word))) found.set(record.tag, 0)
    else if (texts.some(text => text.includes(word))) found.set(record.tag, 0.1)
  }
  return found
}

/** The pieces that answer, wholly first, then nearly, each by rank; equals keep the order given. */
export function searchStock(units: readonly UnitSummary[], asked: AskedOfCoverage, ranks: Map<string, number> | null): StockHit[] {
  const hits = units.flatMap((unit): StockHit[] => {
    const rank = ranks === null ? 0 : ranks.get(unit.tag)
    if (rank === undefined) return []
    if (!asksOfCoverage(asked)) return [{ unit, answer: 'full', note: null, rank }]
    const found = answerCoverage(unit.bands, asked)
    return found ? [{ unit, answer: found.answer, note: found.note, rank: found.answer === 'full' ? rank : found.missingOctaves }] : []
  })
  return hits.sort((a, b) => Number(a.answer === 'nearly') - Number(b.answer === 'nearly') || a.rank - b.rank)
}

/** "3 pieces cover it, 2 nearly · of 60 in stock". `among` names what was looked through: "in stock", "sold". */
export function countInWords(hits: readonly StockHit[], total: number, asksFrequency: boolean, among: string): string {
  const full = hits.filter(hit => hit.answer === 'full').length
  const nearly = hits.length - full
  const pieces = full === 0 ? 'no piece' : full === 1 ? '1 piece' : `${full} pieces`
  const verb = asksFrequency ? full === 1 || full === 0 ? ' covers it' : ' cover it' : ''
  const said = `${pieces}${verb}${nearly > 0 ? `, ${nearly} nearly` : ''}`
  const whole = full === total && !asksFrequency ? '' : ` · of ${total}`
  return `${said.charAt(0).toUpperCase()}${said.slice(1)}${whole} ${among}`
}
