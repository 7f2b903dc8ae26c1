/**
 * The chart of a sheet's readings against frequency, laid out for a size: how far off a dial reads in per cent of the
 * setting, or a level in dB, with its limits and guard bands as grounds, before and after adjustment, and the sheets
 * before it. Geometry only: the page and the PDF draw the same.
 */
import { scaleLinear, scaleLog } from 'd3-scale'
import type { EarlierReading, EarlierSheet, ReadingView } from '../types/bench'
import type { Section } from './checkpoint'
import { checkpointInWords } from './checkpoint'
import type { Result } from './evaluation'
import { formatFrequency, NARROW_SPACE } from './frequency'
import { boundsOf } from './limits'
import { decadeLabel } from './log-scale'

/** Sections that are drawn against frequency, and what is drawn up. */
export const CHART_SECTIONS = ['dial', 'output_level'] as const satisfies readonly Section[]
export type ChartSection = (typeof CHART_SECTIONS)[number]
const UNITS: Record<ChartSection, string> = { dial: '%', output_level: 'dB' }

/** A reading as drawn: hertz across; `y`, limits and guard band in per cent of the setting or in dB. */
export interface ChartPoint {
  key: string
  bandLabel: string
  atHz: number
  y: number | null
  lower: number | null
  upper: number | null
  guard: number
  within: boolean | null
  title: string
}

export interface ChartMark { key: string, x: number, y: number, within: boolean, beyond: 'above' | 'below' | null, title: string }
export interface ChartLine { key: string, path: string, marks: ChartMark[] }
export interface ChartLabel { key: string, x: number, y: number, text: string }
export interface ChartSize { width: number, height: number }

const MARGIN = { left: 58, right: 18, top: 14, bottom: 34 }
/** No more than this many times the widest limit is drawn; what lies further stands at the edge, with its label. */
const MOST_LIMITS = 4
/** Room that a label takes, in pixels per character and per line. */
const LABEL_WIDTH = 7.1
const LABEL_HEIGHT = 16
const MOST_LABELS = 24

/** How far a value is off its nominal, as the section draws it; null where it can't be said. */
function offset(section: ChartSection, value: number, nominal: number | null): number | null {
  if (nominal === null) return section === 'output_level' ? value : null
  if (section === 'output_level') return value - nominal
  return nominal === 0 ? null : (value - nominal) * 100 / Math.abs(nominal)
}

function toPoint(section: ChartSection, reading: ReadingView, result: Result | null, text: string): ChartPoint[] {
  const { atHz, nominal } = reading
  if (atHz === null || !(atHz > 0)) return []
  const limits = reading.limit === null ? null : boundsOf(reading.limit, reading)
  const limit = (edge: number | null | undefined) => edge === null || edge === undefined ? null : offset(section, edge, nominal)
  const guard = result?.judgement?.guardBand ?? 0
  return [{
    key: String(reading.position),
    bandLabel: reading.bandLabel,
    atHz,
    y: result ? offset(section, result.value, nominal) : null,
    lower: limit(limits?.ok ? limits.bounds.lower : null),
    upper: limit(limits?.ok ? limits.bounds.upper : null),
    guard: section === 'dial' && nominal ? guard * 100 / Math.abs(nominal) : guard,
    within: result?.judgement?.within ?? null,
    title: `${[reading.bandLabel, checkpointInWords(reading)].filter(Boolean).join(' ')} reads ${text}`,
  }]
}

/** What a section of a sheet gives to draw: the readings that stand, and those as found where they were adjusted since. */
export function chartPoints(section: ChartSection, readings: readonly ReadingView[]): { standing: ChartPoint[], found: ChartPoint[] } {
  const own = readings.filter(reading => reading.section === section)
  return {
    standing: own.flatMap((reading) => {
      const taken = reading.left ?? reading.found
      return toPoint(section, reading, taken?.result ?? null, taken?.text ?? '')
    }),
    found: own.flatMap(reading => reading.left && reading.found ? toPoint(section, reading, reading.found.result, reading.found.text) : []),
  }
}

/** Consecutive points of one band: they are joined by a line, and bands are not joined to each other. */
function byBand<Point extends { bandLabel: string }>(points: readonly Point[]): Point[][] {
  const bands: Point[][] = []
  for (const point of points) {
    const last = bands.at(-1)
    if (last?.[0]?.bandLabel === point.bandLabel) last.push(point)
    else bands.push([point])
  }
  return bands
}

const signed = (value: number, unit: string): string => `${value > 0 ? '+' : value < 0 ? '\u2212' : ''}${Math.abs(value)}${NARROW_SPACE}${unit}`

/** The frequencies marked below: decades, or with fewer than two of them also their twos and fives. */
function settingTicks(lowestHz: number, highestHz: number): number[] {
  const powers = Array.from({ length: 14 }, (_, power) => Number(`1e${power}`))
  const within = (hz: number) => hz >= lowestHz && hz <= highestHz
  const decades = powers.filter(within)
  return decades.length > 1 ? decades : powers.flatMap(decade => [decade, 2 * decade, 5 * decade]).filter(within)
}

const least = (values: readonly number[], start: number) => values.reduce((most, value) => Math.min(most, value), start)
const greatest = (values: readonly number[], start: number) => values.reduce((most, value) => Math.max(most, value), start)

function scalesFor(points: readonly ChartPoint[], others: readonly number[], { width, height }: ChartSize) {
  const settings = points.map(point => point.atHz)
  const lowest = least(settings, Number.POSITIVE_INFINITY) / 1.25
  const highest = greatest(settings, 0) * 1.25
  const limit = greatest(points.flatMap(({ lower, upper }) => [Math.abs(lower ?? 0), Math.abs(upper ?? 0)]), 0)
  const furthest = greatest([...points.flatMap(({ y }) => y === null ? [] : [Math.abs(y)]), ...others.map(Math.abs)], 0)
  const most = limit > 0 ? Math.min(Math.max(limit * 1.6, furthest * 1.12), limit * MOST_LIMITS) : Math.max(furthest * 1.2, 1)
  const x = scaleLog([lowest, highest], [MARGIN.left, width - MARGIN.right])
  const y = scaleLinear([-most, most], [height - MARGIN.bottom, MARGIN.top])
  return { x, y, lowest, highest, most }
}

type Scales = ReturnType<typeof scalesFor>
const at = (x: number, y: number) => `${x.toFixed(1)} ${y.toFixed(1)}`

function lineOf(band: readonly ChartPoint[], { x, y, most }: Scales): ChartLine {
  const marks = band.flatMap((point): ChartMark[] => point.y === null
    ? []
    : [{
        key: point.key,
        x: x(point.atHz),
        y: y(Math.min(most, Math.max(-most, point.y))),
        within: point.within ?? true,
        beyond: point.y > most ? 'above' : point.y < -most ? 'below' : null,
        title: point.title,
      }])
  return { key: marks[0]?.key ?? 'none', path: marks.map((mark, index) => `${index ? 'L' : 'M'}${at(mark.x, mark.y)}`).join(''), marks }
}

/** An earlier sheet as two strokes, whatever the number of its points: its lines, and its points as small rings. */
export interface EarlierStroke { key: number, lines: string, rings: string }
const RING = 3

function strokeOf(section: ChartSection, { number, readings }: EarlierSheet, { x, y, most, lowest, highest }: Scales): EarlierStroke[] {
  const drawn = readings.flatMap((reading) => {
    const height = reading.section === section ? offset(section, reading.value, reading.nominal) : null
    return height === null || reading.atHz === null || reading.atHz < lowest || reading.atHz > highest
      ? []
      : [{ bandLabel: reading.bandLabel, x: x(reading.atHz), y: y(Math.min(most, Math.max(-most, height))) }]
  })
  if (drawn.length === 0) return []
  return [{
    key: number,
    lines: byBand(drawn).map(band => band.map((point, index) => `${index ? 'L' : 'M'}${at(point.x, point.y)}`).join('')).join(''),
    rings: drawn.map(point => `M${at(point.x - RING, point.y)}a${RING} ${RING} 0 1 0 ${RING * 2} 0a${RING} ${RING} 0 1 0 ${-RING * 2} 0`).join(''),
  }]
}

/**
 * Labels of the points out of limits, away from the zero line, as many as find room without covering each other or
 * another point; the table has them all.
 */
function labelsOf(lines: readonly ChartLine[], others: readonly ChartLine[], { width, height }: ChartSize): ChartLabel[] {
  const own = lines.flatMap(line => line.marks)
  const all = [...own, ...others.flatMap(line => line.marks)]
  const placed: { left: number, right: number, y: number }[] = []
  const zero = (MARGIN.top + height - MARGIN.bottom) / 2
  return own.filter(mark => !mark.within).slice(0, MOST_LABELS).flatMap((mark) => {
    const text = `${mark.title}: out`
    const room = text.length * LABEL_WIDTH
    const left = Math.min(Math.max(mark.x - room / 2, MARGIN.left + 2), width - MARGIN.right - room)
    const offsets = mark.y > zero ? [24, -14, 40, -30] : [-14, 24, -30, 40]
    const y = offsets.map(each => mark.y + each).find(candidate =>
      candidate > MARGIN.top + 8 && candidate < height - MARGIN.bottom - 2
      && !placed.some(other => left < other.right && left + room > other.left && Math.abs(candidate - other.y) < LABEL_HEIGHT)
      && !all.some(other => other.x > left - 6 && other.x < left + room + 6 && other.y > candidate - LABEL_HEIGHT && other.y < candidate + 8))
    if (y === undefined || left < MARGIN.left) return []
    placed.push({ left, right: left + room, y })
    return [{ key: mark.key, x: left + room / 2, y, text }]
  })
}

/** A ground between two edges over a band's width: its outline, and its two edges as lines. */
export interface ChartGround { key: string, area: string, edges: string }

function groundOf(band: readonly ChartPoint[], { x, y, most }: Scales, inset: (point: ChartPoint) => number): ChartGround[] {
  const points = band.filter(point => point.lower !== null || point.upper !== null)
  const [first, last] = [points[0], points.at(-1)]
  if (!first || !last) return []
  const height = (value: number) => y(Math.min(most, Math.max(-most, value)))
  const widened = [{ ...first, atHz: first.atHz / 1.02 }, ...points, { ...last, atHz: last.atHz * 1.02 }]
  const lower = widened.map(point => ({ x: x(point.atHz), y: height((point.lower ?? -most * 2) + inset(point)) }))
  const upper = widened.map(point => ({ x: x(point.atHz), y: height((point.upper ?? most * 2) - inset(point)) }))
  // Where the guard bands meet there is no sure ground at all.
  if (widened.some(point => (point.upper ?? most * 2) - inset(point) <= (point.lower ?? -most * 2) + inset(point))) return []
  const along = (edge: readonly { x: number, y: number }[]) => edge.map((point, index) => `${index ? 'L' : 'M'}${at(point.x, point.y)}`).join('')
  return [{
    key: `${first.key}-${first.bandLabel}`,
    area: `${along(upper)}${[...lower].reverse().map(point => `L${at(point.x, point.y)}`).join('')}Z`,
    edges: `${first.upper === null ? '' : along(upper)}${first.lower === null ? '' : along(lower)}`,
  }]
}

export interface ErrorChart {
  plot: { left: number, right: number, top: number, bottom: number }
  unit: string
  valueTicks: { value: number, y: number, label: string }[]
  settingTicks: { hz: number, x: number, label: string }[]
  /** Between the limits, and inside them by the guard band. */
  limits: ChartGround[]
  sure: ChartGround[]
  earlier: EarlierStroke[]
  found: ChartLine[]
  standing: ChartLine[]
  labels: ChartLabel[]
}

/** Lays out a section's chart; null where it has nothing that could be drawn against frequency. */
export function layErrorChart(section: ChartSection, readings: readonly ReadingView[], earlier: readonly EarlierSheet[], size: ChartSize): ErrorChart | null {
  const { standing, found } = chartPoints(section, readings)
  if (standing.length === 0) return null
  const before = earlier.flatMap(sheet => sheet.readings.flatMap((reading: EarlierReading) => reading.section === section ? offset(section, reading.value, reading.nominal) ?? [] : []))
  const scales = scalesFor(standing, [...before, ...found.flatMap(({ y }) => y ?? [])], size)
  const bands = byBand(standing)
  const lines = (points: readonly ChartPoint[]) => byBand(points).map(band => lineOf(band, scales)).filter(line => line.marks.length > 0)
  const standingLines = lines(standing)
  /** What is not read yet is drawn with the widest guard band of what is. */
  const widest = greatest(standing.map(({ guard }) => guard), 0)
  return {
    plot: { left: MARGIN.left, right: size.width - MARGIN.right, top: MARGIN.top, bottom: size.height - MARGIN.bottom },
    unit: UNITS[section],
    valueTicks: scales.y.ticks(7).map(value => ({ value, y: scales.y(value), label: signed(value, UNITS[section]) })),
    settingTicks: settingTicks(scales.lowest, scales.highest)
      .map(hz => ({ hz, x: scales.x(hz), label: Number.isInteger(Math.log10(hz)) ? decadeLabel(hz) : formatFrequency(hz) })),
    limits: bands.flatMap(band => groundOf(band, scales, () => 0)),
    sure: widest > 0 ? bands.flatMap(band => groundOf(band, scales, point => point.y === null ? widest : point.guard)) : [],
    earlier: earlier.flatMap(sheet => strokeOf(section, sheet, scales)),
    found: lines(found),
    standing: standingLines,
    labels: labelsOf(standingLines, lines(found), size),
  }
}
