/** What a typed marking may be, in every code that is known here. Which of several is likelier is common practice, no source. */
import { NARROW_SPACE } from '../frequency'
import type { YearsMade } from './date-codes'
import type { Heard, MarkingReading } from './marking-readers'
import { hearCapacitanceCode, hearColours, hearDate, hearMicaDots, hearOldNumber, hearPlainResistance, hearResistanceCode, hearResistorDigits, hearThreeDigits } from './marking-readers'

export type { MarkingCode, MarkingReading } from './marking-readers'
export { MARKING_CODE_LABELS } from './marking-readers'

export interface MarkingHints {
  /** What the part is known to be: its readings come first. Dots are read only for a capacitor. */
  kind?: 'resistor' | 'capacitor' | 'date'
  /** The day of reading, ISO 8601; without it no dates are read. */
  today?: string
  made?: YearsMade
}
export type MarkingResult = { ok: true, readings: readonly MarkingReading[] } | { ok: false, sentence: string }

const LONGEST = 60

/** The rated voltage behind the marking: ".1 MFD 400 V". */
function withoutVolts(text: string): { marking: string, volts: string | null } {
  const [, marking, volts] = /^(.*\S)[\s,/]+(\d{1,5})\s*V(?:\s*[DA]\.?C\.?)?W?$/i.exec(text) ?? []
  return marking === undefined || volts === undefined ? { marking: text, volts: null } : { marking, volts }
}

function heardIn(text: string, { kind, today, made }: MarkingHints): Heard[] {
  const readers = [hearColours, hearResistanceCode, hearCapacitanceCode, hearThreeDigits, hearOldNumber, hearPlainResistance, hearResistorDigits]
  return [
    ...readers.map(reader => reader(text)),
    ...(kind === 'capacitor' ? [hearMicaDots(text)] : []),
    ...(today === undefined ? [] : [hearDate(text, { today, made })]),
  ]
}

/** The same value of the same kind of part, read by two codes, is told once, by the first. */
function onlyDifferent(readings: readonly MarkingReading[]): MarkingReading[] {
  return readings.filter((reading, index) => readings.findIndex(({ kind, words }) => kind === reading.kind && words === reading.words) === index)
}

/**
 * Every reading of a marking as typed: colours by name, letter codes, three-digit codes, numbers with old units, date codes. The
 * likeliest first, those of the kind of part that is hinted at before all others. A rated voltage behind the marking is noted. Refused
 * with a sentence: nothing typed, and what is in no code; where it is of one code and can't be, with that code's sentence.
 */
export function readMarking(text: string, hints: MarkingHints = {}): MarkingResult {
  const typed = text.trim()
  if (typed === '') return { ok: false, sentence: 'Type what stands on the part, like 4K7, 104K or yellow violet red gold.' }
  const { marking, volts } = withoutVolts(typed)
  const all = typed.length > LONGEST ? [] : heardIn(marking, hints)
  const order = (reading: MarkingReading): number => reading.likelihood + (reading.kind === hints.kind ? 10 : 0)
  const readings = onlyDifferent(all.flatMap(({ readings: some }) => some).sort((a, b) => order(b) - order(a)))
  const refused = all.map(({ refused: sentence }) => sentence).find(sentence => sentence !== null)
  if (readings.length === 0) return { ok: false, sentence: refused ?? `“${typed.slice(0, 40)}” is in none of the codes that can be read here. Check the letters and figures on the part.` }
  return { ok: true, readings: volts === null ? readings : readings.map(reading => ({ ...reading, notes: [...reading.notes, `Marked ${volts}${NARROW_SPACE}V.`] })) }
}
