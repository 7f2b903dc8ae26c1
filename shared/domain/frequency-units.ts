/**
 * The words people write after a frequency, old and new, and what each multiplies by.
 *
 * c/s, kc, Mc and kMc are Hz, kHz, MHz and GHz: the SI replaced the cycle per second by the hertz in 1960
 * (11th CGPM). "mc" in lower case is period usage for megacycles, never millihertz.
 */

/** What a unit word means: a power of ten of hertz, a wavelength, or one of two things. */
export type FrequencyUnit
  = | { kind: 'hertz', power: number }
    | { kind: 'metres', power: number }
    | { kind: 'ambiguous' }

const HERTZ_WORDS: Record<number, readonly string[]> = {
  0: ['hz', 'hertz', 'c/s', 'cps', 'c.p.s.', 'c/sec', 'c', '~', 'cycle', 'cycles', 'cycles per second', 'cycle per second'],
  3: ['khz', 'kc', 'kc/s', 'kcs', 'kcps', 'kc/sec', 'kilocycle', 'kilocycles', 'kilocycles per second', 'kilohertz', 'k', 'k~'],
  6: ['mhz', 'mc', 'mc/s', 'mcs', 'mcps', 'mc/sec', 'meg', 'megs', 'megacycle', 'megacycles', 'megacycles per second', 'megahertz'],
  9: ['ghz', 'kmc', 'kmc/s', 'gc', 'gc/s', 'kilomegacycle', 'kilomegacycles', 'gigacycle', 'gigacycles', 'gigahertz', 'g'],
  12: ['thz', 'terahertz'],
}
const METRE_WORDS: Record<number, readonly string[]> = {
  0: ['metre', 'metres', 'meter', 'meters'],
  [-2]: ['cm', 'centimetre', 'centimetres', 'centimeter', 'centimeters'],
  [-3]: ['mm', 'millimetre', 'millimetres', 'millimeter', 'millimeters'],
}

function table(kind: 'hertz' | 'metres', words: Record<number, readonly string[]>): [string, FrequencyUnit][] {
  return Object.entries(words).flatMap(([power, names]) =>
    names.map((name): [string, FrequencyUnit] => [name, { kind, power: Number(power) }]))
}

const UNITS = new Map<string, FrequencyUnit>([...table('hertz', HERTZ_WORDS), ...table('metres', METRE_WORDS)])

/**
 * The meaning of a unit word, or null if it is none. Case is ignored, except for a lone letter:
 * "M" is megahertz, while "m" may mean metres or megacycles and is reported as ambiguous.
 */
export function frequencyUnit(word: string): FrequencyUnit | null {
  const compact = word.trim().replace(/\s+/g, ' ')
  if (compact === 'M') return { kind: 'hertz', power: 6 }
  if (compact === 'm') return { kind: 'ambiguous' }
  return UNITS.get(compact.toLowerCase()) ?? UNITS.get(compact.toLowerCase().replace(/\.$/, '')) ?? null
}

const escaped = (word: string): string => word.replace(/[./]/g, '\\$&').replace(/ /g, '\\s+')

/** A regular expression source that matches any unit word, longest first. To be used without regard to case. */
export const FREQUENCY_UNIT_PATTERN = [...UNITS.keys(), 'm']
  .sort((a, b) => b.length - a.length)
  .map(escaped)
  .join('|')
