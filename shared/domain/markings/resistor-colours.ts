/**
 * The colour code of resistors, three to six bands, both ways: IEC 60062, and the RETMA chart of 1956 for three and four bands.
 *
 * Figures, multipliers and the tolerances of brown, red, green, blue, violet, gold, silver and none are as all editions give them.
 * Doubtful: grey (0.05 % in the edition of 2004, 0.01 % by tables of the one of 2016), orange and yellow (only in the one of 2016);
 * such a reading carries a note. Temperature coefficients are those of public tables of the code; the standard itself was not seen.
 */
import { formatAmount } from '../amount'
import { NARROW_SPACE } from '../frequency'
import type { PreferredNote } from './preferred-values'
import { preferredNote } from './preferred-values'

/** The colours of bands and dots; the first ten are the figures 0 to 9. */
export const COLOURS = ['black', 'brown', 'red', 'orange', 'yellow', 'green', 'blue', 'violet', 'grey', 'white', 'gold', 'silver'] as const
export type Colour = (typeof COLOURS)[number]

/** What a colour stands for: a figure, a power of ten, ± per cent, ppm/K. Absent: it stands for none. */
interface Meaning { figure?: number, power: number, tolerance?: number, ppm?: number, doubt?: string }

const GREY_DOUBT = `Grey as a tolerance is ±0.05${NARROW_SPACE}% in older charts and ±0.01${NARROW_SPACE}% in newer ones: measure if it matters.`
const newer = (colour: string): string => `${colour} as a tolerance is only in the newest charts: on an older part, check the order of the bands.`

/** The table of the code. */
export const COLOUR_MEANINGS: Readonly<Record<Colour, Meaning>> = {
  black: { figure: 0, power: 0, ppm: 250 },
  brown: { figure: 1, power: 1, tolerance: 1, ppm: 100 },
  red: { figure: 2, power: 2, tolerance: 2, ppm: 50 },
  orange: { figure: 3, power: 3, tolerance: 0.05, ppm: 15, doubt: newer('Orange') },
  yellow: { figure: 4, power: 4, tolerance: 0.02, ppm: 25, doubt: newer('Yellow') },
  green: { figure: 5, power: 5, tolerance: 0.5, ppm: 20 },
  blue: { figure: 6, power: 6, tolerance: 0.25, ppm: 10 },
  violet: { figure: 7, power: 7, tolerance: 0.1, ppm: 5 },
  grey: { figure: 8, power: 8, tolerance: 0.05, ppm: 1, doubt: GREY_DOUBT },
  white: { figure: 9, power: 9 },
  gold: { power: -1, tolerance: 5 },
  silver: { power: -2, tolerance: 10 },
}

/** Without a tolerance band: RETMA, 1956. */
export const TOLERANCE_WITHOUT_BAND = 20

export type Place = 'figure' | 'multiplier' | 'tolerance' | 'coefficient'
export type BandCount = 3 | 4 | 5 | 6
/** What each band is, from the end that is read first. */
export const BAND_PLACES: Readonly<Record<BandCount, readonly Place[]>> = {
  3: ['figure', 'figure', 'multiplier'],
  4: ['figure', 'figure', 'multiplier', 'tolerance'],
  5: ['figure', 'figure', 'figure', 'multiplier', 'tolerance'],
  6: ['figure', 'figure', 'figure', 'multiplier', 'tolerance', 'coefficient'],
}

export interface ResistorReading {
  ohms: number
  /** ± per cent. */
  tolerancePercent: number
  /** Parts per million per kelvin; null where no band says so. */
  ppmPerKelvin: number | null
  /** The bands in the order they were read. */
  bands: readonly Colour[]
  preferred: PreferredNote
  /** What is doubtful about it, in sentences. */
  notes: readonly string[]
}

export type BandsReading
  = | { ok: true, reading: ResistorReading, otherEnd: ResistorReading | null }
    | { ok: false, sentence: string, otherEnd: ResistorReading | null }

const meansAt = (place: Place, { figure, power, tolerance, ppm }: Meaning): number | undefined =>
  ({ figure, multiplier: power, tolerance, coefficient: ppm })[place]

const PLACE_WORDS: Record<Exclude<Place, 'multiplier'>, string> = {
  figure: 'it is a figure of the value', tolerance: 'it gives the tolerance', coefficient: 'it gives the temperature coefficient',
}

/** Why a band can't have its colour; null where it can. */
function refusal(colour: Colour, place: Place, at: number): string | null {
  if (at === 0 && colour === 'black') return 'Band 1 can’t be black: no value begins with 0.'
  if (place === 'multiplier' || meansAt(place, COLOUR_MEANINGS[colour]) !== undefined) return null
  return `Band ${at + 1} can’t be ${colour}: ${PLACE_WORDS[place]}, and ${colour} stands for none.`
}

const isBandCount = (count: number): count is BandCount => count in BAND_PLACES

/** The reading from one end, or why there is none. */
function readFrom(bands: readonly Colour[]): ResistorReading | string {
  if (bands.length === 1 && bands[0] === 'black') return `One black band marks a bridge of 0${NARROW_SPACE}Ω, not a value.`
  if (!isBandCount(bands.length)) return `A resistor has three to six bands. Give all of them, not ${bands.length}.`
  const places = BAND_PLACES[bands.length]
  const refused = bands.map((colour, at) => refusal(colour, places[at] ?? 'figure', at)).find(Boolean)
  if (refused) return refused
  const at = (place: Place) => bands.flatMap((colour, index) => places[index] === place ? meansAt(place, COLOUR_MEANINGS[colour]) ?? [] : [])
  const ohms = Number(`${at('figure').join('')}e${at('multiplier').join('')}`)
  const tolerancePercent = at('tolerance')[0] ?? TOLERANCE_WITHOUT_BAND
  const toleranceColour = bands[places.indexOf('tolerance')]
  const doubt = toleranceColour && COLOUR_MEANINGS[toleranceColour].doubt
  return { ohms, tolerancePercent, ppmPerKelvin: at('coefficient')[0] ?? null, bands, preferred: preferredNote(ohms, tolerancePercent, 'resistance'), notes: doubt ? [doubt] : [] }
}

/** A reading in words: "4.7 kΩ ±5 %", "10 kΩ ±1 %, 50 ppm/K". */
export function resistorWords({ ohms, tolerancePercent, ppmPerKelvin }: Pick<ResistorReading, 'ohms' | 'tolerancePercent' | 'ppmPerKelvin'>): string {
  const coefficient = ppmPerKelvin === null ? '' : `, ${ppmPerKelvin}${NARROW_SPACE}ppm/K`
  return `${formatAmount(ohms, 'resistance')} ±${tolerancePercent}${NARROW_SPACE}%${coefficient}`
}

/**
 * Reads three to six bands, and the same bands from the other end where that is possible too and says another thing. Refused with a
 * sentence that names the band: a colour that stands for nothing in its place, black first, too few or too many bands.
 */
export function readBands(bands: readonly Colour[]): BandsReading {
  const reading = readFrom(bands)
  const turned = [...bands].reverse()
  const fromOtherEnd = turned.every((colour, index) => colour === bands[index]) ? null : readFrom(turned)
  const otherEnd = typeof fromOtherEnd === 'string' ? null : fromOtherEnd
  if (typeof reading !== 'string') return { ok: true, reading, otherEnd }
  return { ok: false, sentence: otherEnd ? `${reading} Read from the other end it is ${resistorWords(otherEnd)}.` : reading, otherEnd }
}

/**
 * The old body–end–dot marking, which reads as bands in that order: body first figure, end second figure, dot multiplier, and the other
 * end the tolerance; null where that end has the colour of the body. Source: the RETMA chart of 1956. It has no other end to read from.
 */
export function readBodyEndDot(body: Colour, end: Colour, dot: Colour, otherEnd: Colour | null): BandsReading {
  const reading = readFrom(otherEnd ? [body, end, dot, otherEnd] : [body, end, dot])
  const named = ['The body', 'The end', 'The dot', 'The other end']
  if (typeof reading !== 'string') return { ok: true, reading, otherEnd: null }
  return { ok: false, sentence: reading.replace(/^Band (\d)/, (_, band: string) => named[Number(band) - 1] ?? 'A colour'), otherEnd: null }
}
