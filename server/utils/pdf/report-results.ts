import type { ReportBudget } from '../../../shared/domain/report-budgets'
import type { ReportRow, ReportTable } from '../../../shared/domain/report-results'
import type { Charted } from './error-charts'
import { drawErrorChart } from './error-charts'
import type { Cell, Column, Flow } from './flow'
import type { Pdf } from './index'
import { VERDICT_COLOURS } from './measurements'
import { PALETTE } from './palette'

const FIGURES = 8
const NOTE = { size: 8, colour: PALETTE.inkSoft } as const
const right = (heading: string, share: number): Column => ({ heading, share, align: 'right' })

function columnsOf({ isAdjusted, title }: ReportTable): Column[] {
  return [
    { heading: title, share: isAdjusted ? 72 : 117 }, ...isAdjusted ? [{ heading: 'State', share: 45 }] : [], right('Limit', 38), right('Read', 72), right('Error', 44),
    right('U', 47), right('k', 28), right('Within', 46), right('TUR', 33), { heading: 'Verdict', share: 75 },
  ]
}

function verdictCell({ verdict, verdictWords }: ReportRow): Cell {
  return verdict === null ? verdictWords : { text: verdictWords, weight: verdict === 'pass' ? undefined : 600, colour: VERDICT_COLOURS[verdict] }
}

function cellsOf(row: ReportRow, isAdjusted: boolean): Cell[] {
  return [
    row.point, ...isAdjusted ? [row.phase] : [], row.limit, { text: row.read, weight: 600 }, row.error, row.uncertainty, row.factor, row.conformance, row.ratio, verdictCell(row),
  ]
}

/** What the headings of the results mean. */
const KEY = 'U: expanded uncertainty, with its coverage factor k. Within: the probability that what was measured is within its limits (JCGM 106:2012). TUR: the limits as a multiple of U; 4 or more is usual.'

/** The results, a table for each part of the piece, beneath it what is to be known of its rows, and its chart if it has one. */
export function drawResults(pdf: Pdf, flow: Flow, tables: readonly ReportTable[], charted: Charted): void {
  if (tables.length === 0) return
  flow.paragraph(KEY, NOTE)
  for (const table of tables) {
    flow.space(6)
    flow.table(columnsOf(table), table.rows.map(row => cellsOf(row, table.isAdjusted)), FIGURES)
    flow.space(2)
    for (const note of table.notes) flow.paragraph(note, NOTE)
    drawErrorChart(pdf, flow, table.section, charted)
  }
}

/** Points that a row and the words about a budget take. */
const ROW_HEIGHT = 17
const AROUND = 60
const heightOf = ({ lines }: ReportBudget): number => AROUND + ROW_HEIGHT * (lines.length + 3)
const BUDGET_COLUMNS: Column[] = [{ heading: 'Component', share: 46 }, { heading: 'Evaluated', share: 24 }, right('Degrees of freedom', 14), right('Standard uncertainty', 16)]

function drawBudget(flow: Flow, budget: ReportBudget): void {
  flow.need(heightOf(budget))
  flow.space(6)
  flow.paragraph(`${budget.instrument}: ${budget.accuracy}`, { size: 9, weight: 600 })
  flow.paragraph(budget.reading, NOTE)
  flow.table(BUDGET_COLUMNS, [
    ...budget.lines.map(({ label, evaluation, degrees, standard }) => [label, evaluation, degrees, standard]),
    ['Combined standard uncertainty u', 'root sum of squares', budget.degrees, budget.combined],
    [{ text: 'Expanded uncertainty U = k u', weight: 600 as const }, `k = ${budget.factor}`, '', { text: budget.expanded, weight: 600 as const }],
  ], FIGURES)
  flow.space(2)
  flow.paragraph(`${budget.coverage}.`, NOTE)
}

/** The uncertainty of each range used, at its widest reading, so that every figure can be followed. */
export function drawBudgets(flow: Flow, budgets: readonly ReportBudget[]): void {
  const [first] = budgets
  if (!first) return
  flow.need(AROUND + heightOf(first))
  flow.heading('Annex: how the uncertainties come about')
  flow.paragraph('One budget for each range used, at the reading where it is widest (JCGM 100:2008). A stated accuracy is taken as limits within which any value is as likely as another: its half-width over √3.', NOTE)
  for (const budget of budgets) drawBudget(flow, budget)
}
