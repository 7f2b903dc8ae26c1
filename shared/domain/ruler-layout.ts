/**
 * How a coverage is laid out on the ruler: a bar for each band, and which of the words along it fit at a given width.
 * Places run from 0 (left) to 1 (right); widths are in CSS pixels. Nothing here draws.
 */
import type { CoverageBand } from './coverage'
import { FUNCTIONS } from './functions'
import type { CoverageFunction } from './functions'
import { logScale } from './log-scale'
import type { LogScale } from './log-scale'

/** One band as it is drawn. */
export interface BandBar {
  label: string
  from: number
  to: number
  /** Neighbours stand alternately in row 0 and 1, so that they can be told apart where they meet or overlap. */
  row: 0 | 1
  /** Begins at DC, which has no place on a log scale: the bar runs to the left edge and says so. */
  fromDc: boolean
  /** Too narrow to be seen as a bar: a spot frequency, or nearly one. */
  isSpot: boolean
}

/** The bands of one function. */
export interface BandGroup<Band extends CoverageBand> {
  function: CoverageFunction
  bands: Band[]
}

/** A word along the ruler: where its middle stands and how wide it is in pixels. */
export interface PlacedWord {
  at: number
  width: number
}

/** Ruler widths for which the words that fit are worked out; a drawing uses the widest that is not wider than itself. */
export const RULER_WIDTHS = { narrow: 260, middle: 480, wide: 760 } as const
export type RulerWidth = keyof typeof RULER_WIDTHS

/** Of a ruler's length, below which a band is drawn as a mark rather than a bar. */
const SPOT = 0.006

/** What a ruler shows when nothing is asked for: from 10 Hz to 1 GHz. */
export const USUAL_DOMAIN: readonly [number, number] = [10, 1e9]

/** Groups bands by function, in the order of `FUNCTIONS`; functions without bands are left out. */
export function groupByFunction<Band extends CoverageBand>(bands: readonly Band[]): BandGroup<Band>[] {
  return FUNCTIONS
    .map(name => ({ function: name, bands: bands.filter(band => band.function === name) }))
    .filter(group => group.bands.length > 0)
}

/** The ruler for some bands: the usual domain, widened to whole decades wherever a band goes beyond it. */
export function rulerFor(bands: readonly { lowerHz: number, upperHz: number }[], domain: readonly [number, number] = USUAL_DOMAIN): LogScale {
  const lowest = bands.reduce((low, band) => band.lowerHz > 0 ? Math.min(low, band.lowerHz) : low, domain[0])
  const highest = bands.reduce((high, band) => Math.max(high, band.upperHz), domain[1])
  return logScale(lowest, highest)
}

/** A bar for each band, by rising lower edge. `scale` is the ruler that they stand on. */
export function layBars(bands: readonly (CoverageBand & { label: string })[], scale: LogScale): BandBar[] {
  return [...bands]
    .sort((a, b) => a.lowerHz - b.lowerHz || a.upperHz - b.upperHz)
    .map((band, index) => {
      const from = scale.position(band.lowerHz)
      const to = scale.position(band.upperHz)
      return { label: band.label, from, to, row: index % 2 === 0 ? 0 : 1, fromDc: band.lowerHz === 0, isSpot: to - from < SPOT }
    })
}

/**
 * For each word, the ruler widths at which it fits: from left to right, a word is left out where it would touch the
 * one before it. With `spans`, a word must also fit within its own stretch of the ruler.
 */
export function wordsThatFit(words: readonly PlacedWord[], spans?: readonly number[]): RulerWidth[][] {
  const fits: RulerWidth[][] = words.map(() => [])
  for (const width of ['narrow', 'middle', 'wide'] as const) {
    const pixels = RULER_WIDTHS[width]
    let taken = Number.NEGATIVE_INFINITY
    words.forEach((word, index) => {
      const span = spans?.[index]
      const left = Math.min(Math.max(word.at * pixels - word.width / 2, 0), pixels - word.width)
      if (left < taken || (span !== undefined && span * pixels < word.width)) return
      fits[index]?.push(width)
      taken = left + word.width + 6
    })
  }
  return fits
}

/** For a ruler's decades, the widths at which each is labelled: every one, every second or every third, whichever fits. */
export function decadesThatFit(labels: readonly string[]): RulerWidth[][] {
  const fits: RulerWidth[][] = labels.map(() => [])
  const spaces = Math.max(labels.length - 1, 1)
  for (const width of ['narrow', 'middle', 'wide'] as const) {
    const needed = Math.max(...labels.map(label => wordWidth(label))) + 8
    const step = Math.max(1, Math.ceil(needed / (RULER_WIDTHS[width] / spaces)))
    labels.forEach((_, index) => {
      if (index % step === 0) fits[index]?.push(width)
    })
  }
  return fits
}

/** A band's label beneath its bar: on which line, and at which ruler widths it fits. */
export interface BarLabel {
  line: 0 | 1
  fits: RulerWidth[]
}

/**
 * Where the labels of bars stand: all on one line if they fit at the middle width, else alternately on two. A label
 * that would still touch its neighbour is left out, and stands in the text alternative.
 */
export function placeLabels(bars: readonly BandBar[]): BarLabel[] {
  const words = bars.map(bar => ({ at: (bar.from + bar.to) / 2, width: wordWidth(bar.label) }))
  const single = wordsThatFit(words)
  if (single.every(fits => fits.includes('middle'))) return single.map(fits => ({ line: 0, fits }))
  const lines = ([0, 1] as const).map(line => wordsThatFit(words.filter((_, index) => index % 2 === line)))
  return words.map((_, index) => ({ line: index % 2 === 0 ? 0 : 1, fits: lines[index % 2]?.[Math.floor(index / 2)] ?? [] }))
}

/** Rough width in pixels of a word set in the ruler's small type. */
export function wordWidth(text: string, perCharacter = 7): number {
  return text.length * perCharacter
}

/** A place as the percentage that SVG and CSS take. */
export function percent(place: number): string {
  return `${Number((place * 100).toFixed(3))}%`
}
