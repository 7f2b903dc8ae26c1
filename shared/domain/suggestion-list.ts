/**
 * Lists of amounts as a technician types them: "3, 10, 30 V", "HT 250 V ±10 %, heaters 6.3 V", "20 dB × 5".
 * Nothing is guessed: what could mean two things is a sentence that names the entry.
 */
import { NARROW_SPACE } from './frequency'
import type { SimpleLimit } from './limits'
import { parseDecimal, toNumber } from './decimal'
import type { Quantity, ReadingResult } from './reading'
import { parseReading } from './reading'

/** One entry: what stood before its amount ("HT"), the amount in the base unit, and the limit of its own if it has one. */
export interface ListEntry { label: string, value: number, quantity: Quantity, limit: SimpleLimit | null }
export interface ListRead { entries: ListEntry[], problems: string[] }
type EntryRead = { ok: true, entry: ListEntry } | { ok: false, sentence: string }

/** The most steps "20 dB × 5" may make. */
const MOST_STEPS = 30

/** Commas, semicolons and lines part the entries; a comma between two digits does not. */
const partsOf = (list: string): string[] => list.split(/[;\n]|(?<!\d),|,(?!\d)/u).map(part => part.trim()).filter(Boolean)

const BARE = /^[-+\u2212]?[\d.]+$/u
/** The unit at the end of an entry, or nothing. */
const unitAt = (part: string): string => /\d\s*([a-z%µμΩω\u2126]+)$/iu.exec(part)?.[1] ?? ''

/** "0, -20, -40 dB": bare numbers take the unit of the next entry that has one. */
function withUnits(parts: readonly string[]): string[] {
  return parts.map((part, index) => BARE.test(part) ? `${part} ${parts.slice(index + 1).map(unitAt).find(Boolean) ?? ''}`.trim() : part)
}

/** The first of the quantities that the text is an amount of; with several, its unit must be typed. */
function readAs(text: string, quantities: readonly Quantity[]): ReadingResult {
  const readings = quantities.map(quantity => parseReading(text, quantity))
  const fitting = readings.find(reading => reading.ok && Number.isFinite(reading.value) && (quantities.length === 1 || !reading.unitAssumed))
  return fitting ?? readings.find(reading => !reading.ok) ?? { ok: false, reason: 'unit-missing', sentence: 'Write its unit.' }
}

/** "3 V 10 V": a comma was forgotten, and 3 V is no name. A bare number may end a name, as in "range 1". */
function endsInAmount(words: readonly string[], quantities: readonly Quantity[]): boolean {
  return words.some((_, from) => {
    const reading = readAs(words.slice(from).join(' '), quantities)
    return reading.ok && !reading.unitAssumed
  })
}

/** Takes "HT 250 V" apart: the longest end that is an amount, and the words before it. */
function readNamed(text: string, quantities: readonly Quantity[]): EntryRead {
  const words = text.split(/\s+/u)
  for (let from = 0; from < words.length; from += 1) {
    const reading = readAs(words.slice(from).join(' '), quantities)
    if (reading.ok && endsInAmount(words.slice(0, from), quantities)) return { ok: false, sentence: 'There are two amounts in it. Put a comma between them.' }
    if (reading.ok) return { ok: true, entry: { label: words.slice(0, from).join(' ').replace(/\s*[:=]$/u, ''), value: reading.value, quantity: reading.quantity, limit: null } }
  }
  const last = readAs(words.slice(-2).join(' '), quantities)
  return { ok: false, sentence: last.ok ? 'This is not an amount.' : last.sentence }
}

/** A limit of the entry's own at its end: "HT 250 V ±10 %". */
function ownLimit(text: string): { rest: string, limit: SimpleLimit | null, sentence: string | null } {
  const parts = /^(.*?)\s*(?:±|\+\/?-)\s*([\d.,]+)\s*(%|per cent|dB)?$/iu.exec(text)
  if (!parts) return { rest: text, limit: null, sentence: null }
  const [, rest = '', figure = '', unit = ''] = parts
  const read = parseDecimal(figure)
  if (!read.ok) return { rest, limit: null, sentence: read.sentence }
  if (unit === '') return { rest, limit: null, sentence: `Say whether ±${figure} is in % or in dB.` }
  return { rest, limit: { kind: unit.toLowerCase() === 'db' ? 'decibel' : 'percent_of_setting', amount: toNumber(read.decimal) }, sentence: null }
}

function readPart(part: string, quantities: readonly Quantity[]): EntryRead {
  const { rest, limit, sentence } = ownLimit(part)
  if (sentence !== null) return { ok: false, sentence }
  const read = readNamed(rest, quantities)
  return read.ok ? { ok: true, entry: { ...read.entry, limit } } : read
}

const naming = (part: string, sentence: string): string => `“${part}”: ${sentence}`

/** A comma between two digits can part two entries or be a decimal comma; the latter where semicolons or lines part them. */
const TWO_WAYS = 'The comma can part two entries or be a decimal comma. Put a space after a comma that parts entries, and write decimals with a point.'
const isTwoWays = (part: string, list: string): boolean => !/[;\n]/u.test(list) && /\d,\d/u.test(part)

/** Reads a list of amounts of one of some quantities, each with a name before it or none. */
export function readList(list: string, quantities: readonly Quantity[]): ListRead {
  const parts = partsOf(list)
  const read = withUnits(parts).map((text, index): EntryRead => {
    const part = parts[index] ?? text
    if (isTwoWays(part, list)) return { ok: false, sentence: naming(part, TWO_WAYS) }
    const entry = readPart(text, quantities)
    return entry.ok ? entry : { ok: false, sentence: naming(part, entry.sentence) }
  })
  return { entries: read.flatMap(each => each.ok ? [each.entry] : []), problems: read.flatMap(each => each.ok ? [] : [each.sentence]) }
}

/** "20 dB × 5": five steps of 20 dB below the first setting, which are the six settings 0, −20 … −100 dB. */
function repeated(part: string): number[] | string | null {
  const parts = /^(.*\S)\s*[×x*]\s*(\d+)$/iu.exec(part)
  if (!parts) return null
  const step = parseReading(parts[1] ?? '', 'level')
  const times = Number(parts[2])
  if (!step.ok) return step.sentence
  if (step.value === 0 || times < 1 || times > MOST_STEPS) return `Give a step above 0${NARROW_SPACE}dB and 1 to ${MOST_STEPS} steps, like 20 dB × 5.`
  return Array.from({ length: times + 1 }, (_, index) => index === 0 ? 0 : -Math.abs(step.value) * index)
}

/**
 * The settings of an attenuator in dB, from 0 down: "20 dB × 5" or one by one, "0, 20, 40 dB". An attenuator never raises,
 * so the sign may be left out.
 */
export function readSteps(list: string): ListRead {
  const entries: ListEntry[] = []
  const problems: string[] = []
  const asEntry = (value: number): ListEntry => ({ label: '', value, quantity: 'level', limit: null })
  for (const part of partsOf(list)) {
    const steps = repeated(part)
    if (typeof steps === 'string') problems.push(naming(part, steps))
    else if (steps) entries.push(...steps.map(asEntry))
    else {
      const read = readList(part, ['level'])
      entries.push(...read.entries.map(entry => ({ ...entry, value: entry.value === 0 ? 0 : -Math.abs(entry.value) })))
      problems.push(...read.problems)
    }
  }
  return { entries, problems }
}
