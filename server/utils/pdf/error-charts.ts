import type { ChartMark, ErrorChart } from '../../../shared/domain/error-chart'
import { CHART_SECTIONS, layErrorChart } from '../../../shared/domain/error-chart'
import type { Section } from '../../../shared/domain/checkpoint'
import type { EarlierSheet, ReadingView } from '../../../shared/types/bench'
import type { Flow } from './flow'
import type { Pdf } from './index'
import { PALETTE } from './palette'

const HEIGHT = 168
/** Room that the geometry leaves beneath its lowest labels. */
const BENEATH = 12
const LABEL = { size: 7.5, colour: PALETTE.inkSoft } as const
const HEADINGS = { dial: 'Dial error against frequency, per cent of the setting', output_level: 'Level against frequency, dB' } as const

/** What is drawn: a sheet's readings, and the sheets before it behind them. */
export interface Charted { readings: readonly ReadingView[], earlier: readonly EarlierSheet[] }

/** Every chart that a sheet has against frequency, each with its heading and a line that says what its marks mean. */
export function drawErrorCharts(pdf: Pdf, flow: Flow, charted: Charted): void {
  for (const section of CHART_SECTIONS) drawErrorChart(pdf, flow, section, charted)
}

/** The chart of one part of a piece; nothing where it has none, or nothing of it was read against frequency. */
export function drawErrorChart(pdf: Pdf, flow: Flow, part: Section, { readings, earlier }: Charted): void {
  const section = CHART_SECTIONS.find(each => each === part)
  const chart = section && layErrorChart(section, readings, earlier, { width: flow.width, height: HEIGHT })
  if (!chart || chart.standing.length === 0) return
  flow.need(HEIGHT + 40)
  flow.space(4)
  flow.paragraph(HEADINGS[section], { size: 8.5, weight: 600 })
  drawChart(pdf, chart, flow.left, flow.y)
  flow.y += HEIGHT - BENEATH
  flow.paragraph(legendOf(chart), { size: 7.5, colour: PALETTE.inkSoft })
}

function legendOf(chart: ErrorChart): string {
  return [
    chart.sure.length > 0 ? 'Shaded: within the limits, the green part by more than the guard band' : chart.limits.length > 0 ? 'Shaded: within the limits' : '',
    chart.found.length > 0 ? 'hollow: as found' : '',
    'filled: as left, or as found where nothing was adjusted', 'a crossed diamond is out of limits',
    chart.earlier.length > 0 ? 'grey: earlier sheets' : '',
  ].filter(Boolean).join('; ')
}

function drawChart(pdf: Pdf, chart: ErrorChart, left: number, top: number): void {
  const { doc } = pdf
  doc.save()
  doc.translate(left, top)
  for (const ground of chart.limits) doc.path(ground.area).fill(chart.sure.length > 0 ? PALETTE.amberTint : PALETTE.enamelTint)
  for (const ground of chart.sure) doc.path(ground.area).fill(PALETTE.enamelTint)
  drawGrid(pdf, chart)
  for (const ground of chart.limits) if (ground.edges) doc.path(ground.edges).lineWidth(0.8).dash(3, { space: 2.5 }).stroke(PALETTE.amber).undash()
  for (const stroke of chart.earlier) {
    doc.path(stroke.lines).lineWidth(0.7).stroke(PALETTE.lineStrong)
    doc.path(stroke.rings).lineWidth(0.7).fillAndStroke(PALETTE.white, PALETTE.lineStrong)
  }
  for (const line of chart.found) {
    doc.path(line.path).lineWidth(0.8).dash(2, { space: 2 }).stroke(PALETTE.brass).undash()
    for (const mark of line.marks) doc.circle(mark.x, mark.y, 2.6).lineWidth(1).fillAndStroke(PALETTE.white, PALETTE.brass)
  }
  for (const line of chart.standing) {
    doc.path(line.path).lineWidth(1.1).stroke(PALETTE.enamel)
    for (const mark of line.marks) drawMark(doc, mark)
  }
  for (const label of chart.labels) pdf.drawLine(label.text, label.x, label.y, { ...LABEL, colour: PALETTE.fault, weight: 600, align: 'centre' })
  doc.restore()
}

function drawGrid(pdf: Pdf, { plot, valueTicks, settingTicks }: ErrorChart): void {
  const { doc } = pdf
  for (const { y, value, label } of valueTicks) {
    doc.moveTo(plot.left, y).lineTo(plot.right, y).lineWidth(value === 0 ? 0.8 : 0.4).stroke(value === 0 ? PALETTE.lineStrong : PALETTE.line)
    pdf.drawLine(label, plot.left - 6, y + 2.6, { ...LABEL, align: 'right' })
  }
  for (const { x, label } of settingTicks) {
    doc.moveTo(x, plot.top).lineTo(x, plot.bottom).lineWidth(0.4).stroke(PALETTE.line)
    pdf.drawLine(label, x, plot.bottom + 13, { ...LABEL, align: 'centre' })
  }
}

function drawMark(doc: PDFKit.PDFDocument, { x, y, within }: ChartMark): void {
  if (within) {
    doc.circle(x, y, 2.8).fill(PALETTE.enamel)
    return
  }
  doc.path(`M${x} ${y - 5}L${x + 5} ${y}L${x} ${y + 5}L${x - 5} ${y}Z`).fill(PALETTE.fault)
  doc.path(`M${x - 1.6} ${y - 1.6}l3.2 3.2m0 -3.2l-3.2 3.2`).lineWidth(0.9).stroke(PALETTE.white)
}
