/**
 * One typed line, understood as far as it speaks of frequencies: "covers 455 kc", "88-108 Mc", "up to 30 MHz".
 * What is not understood stays in `words`, to be searched for as text: nothing typed is ever dropped.
 */
import { bandNamed } from './band-names'
import { covers, overlaps } from './coverage'
import type { CoverageFunction, Interval } from './coverage'
import { formatFrequency, formatFrequencyRange, HIGHEST_HZ } from './frequency'
import { readOne, readRange, ONE_FREQUENCY, RANGE_SEPARATOR } from './frequency-range'
import type { RangeReading } from './frequency-range'
import { FUNCTIONS, FUNCTION_LABELS } from './functions'

export type QueryChipKind = 'covers' | 'overlaps' | 'reaches-up' | 'reaches-down' | 'function'

/** One thing that was understood, as shown beneath the line; taking `typed` out of the line takes it back. */
export interface QueryChip {
  kind: QueryChipKind
  /** What it was understood as: "covers 455 kHz". */
  text: string
  /** The part of the line it came from. */
  typed: string
  /** True when the line named no unit and one was taken by convention. */
  unitAssumed: boolean
}

export interface FrequencyQuery {
  /** Each must be covered wholly. Whole hertz, both ends included. */
  wholly: Interval[]
  /** Of each, some part must be covered. */
  overlapping: Interval[]
  /** The highest frequency covered must be at least this many Hz. */
  reachesUpToHz: number | null
  /** The lowest frequency covered must be at most this many Hz. */
  reachesDownToHz: number | null
  /** One of these functions, if any is named. */
  functions: CoverageFunction[]
  chips: QueryChip[]
  /** What looked like a frequency and makes no sense, and why, in plain sentences. */
  notes: string[]
  /** The rest of the line. */
  words: string
}

type Asks = 'covers' | 'overlaps' | 'up' | 'past' | 'down' | 'below'

/** What may stand before a frequency, and what it asks; longest first. */
const ASKING: readonly [string, Asks][] = [
  ['goes\\s+down\\s+to|down\\s+to|starts\\s+at', 'down'],
  ['goes\\s+up\\s+to|goes\\s+to|up\\s+to|reaches|at\\s+least', 'up'],
  ['past|beyond|above|over', 'past'],
  ['below|under', 'below'],
  ['overlaps|overlapping|touches|partly\\s+covers', 'overlaps'],
  ['covers|covering|cover|wholly\\s+covers|from|at', 'covers'],
]
/** Any of them. */
const VERB = ASKING.map(([pattern]) => pattern).join('|')
/** After a range, what says that it isn't one of frequencies: "6-12 V". */
const OTHER_UNIT = '\\s*(?:[munµ]?[vaw]|ohms?|[µu]f|pf|nf|db|%|mm|cm|kg|lb|inch|in|\\u2126|Ω)(?![a-z0-9])'
/** The ITU band symbols, which speak for themselves even without a verb. */
const BAND = 'VLF|LF|MF|HF|VHF|UHF|SHF|EHF'

/** Perhaps a verb, then a range, a frequency or the symbol of a band. */
const PHRASE = new RegExp(
  `(?<=^|[\\s,;])(?:(?<verb>${VERB})\\s+)?(?:`
  + `(?<range>${ONE_FREQUENCY}${RANGE_SEPARATOR}${ONE_FREQUENCY})(?!${OTHER_UNIT})`
  + `|(?<one>${ONE_FREQUENCY})`
  + `|(?<band>${BAND})(?:\\s+band)?`
  + `)(?=$|[\\s,;])`, 'gi')
const NAMED_AFTER_VERB = new RegExp(`(?<=^|[\\s,;])(?<verb>${VERB})\\s+(?<band>audio|${BAND})(?=$|[\\s,;])`, 'gi')
const FUNCTION_WORD = new RegExp(`(?<=^|[\\s,;])(?:${FUNCTIONS.join('|')})(?=$|[\\s,;])`, 'gi')

function whatAsked(verb: string | undefined): Asks | null {
  if (verb === undefined) return null
  return ASKING.find(([pattern]) => new RegExp(`^(?:${pattern})$`, 'i').test(verb))?.[1] ?? null
}

function understand(query: FrequencyQuery, asks: Asks, range: Interval, typed: string, unitAssumed: boolean, name?: string): void {
  const words = name ?? formatFrequencyRange(range.lowerHz, range.upperHz)
  const add = (kind: QueryChipKind, text: string): void => {
    query.chips.push({ kind, text, typed, unitAssumed })
  }
  if (asks === 'covers') {
    query.wholly.push(range)
    add('covers', `covers ${words}`)
  } else if (asks === 'overlaps') {
    query.overlapping.push(range)
    add('overlaps', `overlaps ${words}`)
  } else if (asks === 'up' || asks === 'past') {
    const least = asks === 'past' ? range.upperHz + 1 : range.upperHz
    query.reachesUpToHz = Math.max(query.reachesUpToHz ?? 0, least)
    add('reaches-up', asks === 'past' ? `goes past ${formatFrequency(range.upperHz)}` : `goes up to ${formatFrequency(range.upperHz)}`)
  } else {
    const most = asks === 'below' ? Math.max(0, range.lowerHz - 1) : range.lowerHz
    query.reachesDownToHz = Math.min(query.reachesDownToHz ?? HIGHEST_HZ, most)
    add('reaches-down', asks === 'below' ? `goes below ${formatFrequency(range.lowerHz)}` : `goes down to ${formatFrequency(range.lowerHz)}`)
  }
}

/** "1950-1960" standing alone is years, not kilohertz. */
function looksLikeYears(text: string): boolean {
  return /^(?:19|20)\d\d\s*[-–—]\s*(?:19|20)\d\d$/.test(text.trim())
}

/** Whether a bare number is worth a note: only where a verb asked for a frequency, or the line is nothing else. */
function worthANote(reading: RangeReading, verb: string | undefined, wholeLine: boolean): boolean {
  if (reading.ok) return false
  if (reading.reason === 'unit-missing') return verb !== undefined
  return verb !== undefined || wholeLine || reading.reason !== 'not-a-frequency'
}

/** Takes every phrase that `pattern` finds and `take` understands out of the line. */
function takeOut(line: string, pattern: RegExp, take: (match: RegExpExecArray) => boolean): string {
  let left = ''
  let from = 0
  for (const match of line.matchAll(pattern)) {
    if (!take(match)) continue
    left += `${line.slice(from, match.index)} `
    from = match.index + match[0].length
  }
  return left + line.slice(from)
}

function takePhrase(query: FrequencyQuery, line: string, match: RegExpExecArray): boolean {
  const { verb, range, one, band } = match.groups ?? {}
  const asks = whatAsked(verb)
  if (band !== undefined) {
    const named = bandNamed(band)
    if (named) {
      const { lowerHz, upperHz, name } = named
      understand(query, asks ?? 'overlaps', { lowerHz, upperHz }, match[0], false, name === 'AUDIO' ? 'audio' : name)
    }
    return named !== null
  }
  const text = range ?? one ?? ''
  if (verb === undefined && looksLikeYears(text)) return false
  const reading = range === undefined ? readOne(text) : readRange(text)
  if (reading.ok) {
    understand(query, asks ?? 'covers', reading.range, match[0], reading.unitAssumed)
    return true
  }
  if (worthANote(reading, verb, line.trim() === match[0])) query.notes.push(reading.sentence)
  return false
}

/** "covers banana": a line that begins by asking for a frequency and then names none. */
function noteWhatIsNoFrequency(query: FrequencyQuery, line: string): void {
  const asked = /^\s*(?:covers|overlaps|up\s+to|down\s+to|goes\s+to|goes\s+up\s+to|goes\s+down\s+to)\s+(\S+)/i.exec(line)
  if (!asked?.[1] || query.notes.length > 0) return
  query.notes.push(`"${asked[1].slice(0, 40)}" is not a frequency, so it is looked for as a word. Write a frequency like 455 kc or 88-108 Mc.`)
}

/**
 * Understands one typed line. Never throws. A frequency that makes no sense (nought, below zero, beyond 3 000 GHz, a
 * range that runs backwards) gives a note and stays among the words.
 *
 * A range without units goes by convention: "88-108" is MHz, "540-1600" is kHz, "20-20000" is Hz; the chip says that
 * the unit was assumed. A single number without a unit is a word: it is more often a serial or a type.
 */
export function parseFrequencyQuery(typed: string): FrequencyQuery {
  const line = typed.slice(0, 500)
  const query: FrequencyQuery = {
    wholly: [], overlapping: [], reachesUpToHz: null, reachesDownToHz: null, functions: [], chips: [], notes: [], words: '',
  }
  const withoutBands = takeOut(line, NAMED_AFTER_VERB, match => takePhrase(query, line, match))
  const withoutFrequencies = takeOut(withoutBands, PHRASE, match => takePhrase(query, line, match))
  const left = takeOut(withoutFrequencies, FUNCTION_WORD, (match) => {
    const name = FUNCTIONS.find(known => known === match[0].toLowerCase())
    if (!name) return false
    if (!query.functions.includes(name)) query.functions.push(name)
    query.chips.push({ kind: 'function', text: FUNCTION_LABELS[name].toLowerCase(), typed: match[0], unitAssumed: false })
    return true
  })
  noteWhatIsNoFrequency(query, left)
  query.words = (left + typed.slice(500)).replace(/\s+/g, ' ').replace(/^[\s,;]+|[\s,;]+$/g, '')
  return query
}

/** Whether a line asked for anything but words. */
export function asksForFrequencies(query: FrequencyQuery): boolean {
  return query.chips.length > 0
}

/**
 * Whether coverage (per function) answers what was asked. All that is asked must be answered by one function:
 * generating 455 kHz and measuring 30 MHz is not generating both.
 */
export function answersQuery(coverage: Partial<Record<CoverageFunction, readonly Interval[]>>, query: FrequencyQuery): boolean {
  const wanted = query.functions.length > 0 ? query.functions : FUNCTIONS
  return wanted.some((name) => {
    const intervals = coverage[name] ?? []
    if (intervals.length === 0) return false
    const { reachesUpToHz: up, reachesDownToHz: down } = query
    return query.wholly.every(range => covers(intervals, range))
      && query.overlapping.every(range => overlaps(intervals, range))
      && (up === null || intervals.some(interval => interval.upperHz >= up))
      && (down === null || intervals.some(interval => interval.lowerHz <= down))
  })
}

/**
 * Reads the API's `covers` or `overlaps`: one frequency or a range ("455 kc", "88-108 MHz", "88000000..108000000",
 * "DC-10 MHz"). A number without a unit is hertz. Strict: anything else is refused with a sentence.
 */
export function parseCoverageParameter(text: string): { ok: true, range: Interval } | { ok: false, sentence: string } {
  const trimmed = text.trim()
  if (trimmed.length > 100) return { ok: false, sentence: 'This is too long for a frequency or a range of frequencies.' }
  const isRange = new RegExp(`^${ONE_FREQUENCY}${RANGE_SEPARATOR}${ONE_FREQUENCY}$`, 'i').test(trimmed)
  const reading = isRange ? readRange(trimmed, 'Hz') : readOne(trimmed, 'Hz')
  return reading.ok ? { ok: true, range: reading.range } : { ok: false, sentence: reading.sentence }
}
