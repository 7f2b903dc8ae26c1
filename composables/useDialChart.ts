import { scaleLinear, scaleLog } from 'd3-scale'
import { formatFrequency, NARROW_SPACE } from '#shared/domain/frequency'
import { decadeLabel } from '#shared/domain/log-scale'

/** A point of a dial check as the chart draws it. Settings in hertz; error and tolerance in per cent of the setting. */
export interface ChartPoint {
  bandLabel: string
  settingHz: number
  tolerancePercent: number
  readingText: string | null
  errorPercent: number | null
  within: boolean | null
}

export interface ChartMark { key: string, x: number, y: number, within: boolean, beyond: 'above' | 'below' | null, title: string }
export interface ChartLine { key: string, path: string, marks: ChartMark[] }
export interface ChartLabel { key: string, x: number, y: number, text: string }

export const CHART_HEIGHT = 330
const MARGIN = { left: 58, right: 18, top: 14, bottom: 34 }
/** No more than this many times the widest tolerance is drawn; what lies further stands at the edge, with its label. */
const MOST_TOLERANCES = 4
/** Room that a label takes, in pixels per character and per line. */
const LABEL_WIDTH = 7.1
const LABEL_HEIGHT = 16

/** Consecutive points of one band: they are joined by a line, and bands are not joined to each other. */
function byBand(points: readonly ChartPoint[]): ChartPoint[][] {
  const bands: ChartPoint[][] = []
  for (const point of points) {
    const last = bands.at(-1)
    if (last?.[0]?.bandLabel === point.bandLabel) last.push(point)
    else bands.push([point])
  }
  return bands
}

const signed = (value: number): string => `${value > 0 ? '+' : value < 0 ? '\u2212' : ''}${Math.abs(value)}${NARROW_SPACE}%`

/** The frequencies marked below: decades, or with fewer than two of them also their twos and fives. */
function settingTicks(lowestHz: number, highestHz: number): number[] {
  const powers = Array.from({ length: 14 }, (_, power) => Number(`1e${power}`))
  const within = (hz: number) => hz >= lowestHz && hz <= highestHz
  const decades = powers.filter(within)
  return decades.length > 1 ? decades : powers.flatMap(decade => [decade, 2 * decade, 5 * decade]).filter(within)
}

function scalesFor(points: readonly ChartPoint[], earlier: readonly ChartPoint[], width: number) {
  const settings = points.map(point => point.settingHz)
  const lowest = Math.min(...settings) / 1.25
  const highest = Math.max(...settings) * 1.25
  const tolerance = Math.max(...points.map(point => point.tolerancePercent))
  const errors = [...points, ...earlier].map(point => Math.abs(point.errorPercent ?? 0))
  const most = Math.min(Math.max(tolerance * 1.6, Math.max(...errors) * 1.12), tolerance * MOST_TOLERANCES)
  const x = scaleLog([lowest, highest], [MARGIN.left, width - MARGIN.right])
  const y = scaleLinear([-most, most], [CHART_HEIGHT - MARGIN.bottom, MARGIN.top])
  return { x, y, lowest, highest, most }
}

type Scales = ReturnType<typeof scalesFor>

function lineOf(band: readonly ChartPoint[], { x, y, most }: Scales): ChartLine {
  const read = band.filter((point): point is ChartPoint & { errorPercent: number } => point.errorPercent !== null)
  const marks = read.map((point): ChartMark => ({
    key: `${point.bandLabel}-${point.settingHz}`,
    x: x(point.settingHz),
    y: y(Math.min(most, Math.max(-most, point.errorPercent))),
    within: point.within ?? false,
    beyond: point.errorPercent > most ? 'above' : point.errorPercent < -most ? 'below' : null,
    title: `${formatFrequency(point.settingHz)} reads ${point.readingText ?? ''}`,
  }))
  return { key: read[0] ? `${read[0].bandLabel}-${read[0].settingHz}` : 'none', path: marks.map((mark, index) => `${index ? 'L' : 'M'}${mark.x.toFixed(1)} ${mark.y.toFixed(1)}`).join(''), marks }
}

/**
 * Labels of the points out of tolerance, away from the zero line, as many as find room without covering each other or
 * another point; the table has them all.
 */
function labelsOf(lines: readonly ChartLine[], width: number): ChartLabel[] {
  const all = lines.flatMap(line => line.marks)
  const placed: { left: number, right: number, y: number }[] = []
  const zero = (MARGIN.top + CHART_HEIGHT - MARGIN.bottom) / 2
  return all.filter(mark => !mark.within).flatMap((mark) => {
    const text = `${mark.title}: out`
    const room = text.length * LABEL_WIDTH
    const left = Math.min(Math.max(mark.x - room / 2, MARGIN.left + 2), width - MARGIN.right - room)
    const offsets = mark.y > zero ? [24, -14, 40, -30] : [-14, 24, -30, 40]
    const y = offsets.map(offset => mark.y + offset).find(candidate =>
      candidate > MARGIN.top + 8 && candidate < CHART_HEIGHT - MARGIN.bottom - 2
      && !placed.some(other => left < other.right && left + room > other.left && Math.abs(candidate - other.y) < LABEL_HEIGHT)
      && !all.some(other => other.x > left - 6 && other.x < left + room + 6 && other.y > candidate - LABEL_HEIGHT && other.y < candidate + 8))
    if (y === undefined || left < MARGIN.left) return []
    placed.push({ left, right: left + room, y })
    return [{ key: mark.key, x: left + room / 2, y, text }]
  })
}

/** The tolerance as shaded ground: across the whole chart where it is one, else over each band's own width. */
function shadesOf(bands: readonly ChartPoint[][], { x, y, lowest, highest }: Scales) {
  const shade = (fromHz: number, toHz: number, tolerance: number) => ({
    key: `${fromHz}-${tolerance}`, x: x(fromHz), width: x(toHz) - x(fromHz), y: y(tolerance), height: y(-tolerance) - y(tolerance),
  })
  const tolerances = new Set(bands.flat().map(point => point.tolerancePercent))
  const [only] = tolerances
  if (tolerances.size === 1 && only !== undefined) return [shade(lowest, highest, only)]
  return bands.map((band) => {
    const settings = band.map(point => point.settingHz)
    return shade(Math.min(...settings) / 1.02, Math.max(...settings) * 1.02, band[0]?.tolerancePercent ?? 0)
  })
}

/** Error against frequency, laid out for a width in pixels; null where there is no dial to draw. */
export function layDialChart(points: readonly ChartPoint[], earlier: readonly ChartPoint[], width: number) {
  if (points.length === 0) return null
  const scales = scalesFor(points, earlier, width)
  const bands = byBand(points)
  const lines = bands.map(band => lineOf(band, scales)).filter(line => line.marks.length > 0)
  const inRange = earlier.filter(point => point.settingHz >= scales.lowest && point.settingHz <= scales.highest)
  return {
    plot: { left: MARGIN.left, right: width - MARGIN.right, top: MARGIN.top, bottom: CHART_HEIGHT - MARGIN.bottom },
    errorTicks: scales.y.ticks(7).map(value => ({ value, y: scales.y(value), label: signed(value) })),
    settingTicks: settingTicks(scales.lowest, scales.highest)
      .map(hz => ({ hz, x: scales.x(hz), label: Number.isInteger(Math.log10(hz)) ? decadeLabel(hz) : formatFrequency(hz) })),
    shades: shadesOf(bands, scales),
    earlierLines: byBand(inRange).map(band => lineOf(band, scales)).filter(line => line.marks.length > 0),
    lines,
    labels: labelsOf(lines, width),
  }
}
