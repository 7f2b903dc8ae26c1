import type { ReportBudget, TestReport } from '../../../shared/domain/test-report'
import { safetyLines } from '../../../shared/domain/provenance'
import { CHECK_RESULT_LABELS } from '../../../shared/domain/sheet-checks'
import type { TestSheetView } from '../../../shared/types/bench'
import { drawErrorCharts } from './error-charts'
import type { Flow } from './flow'
import { startFlow } from './flow'
import { createPdf } from './index'
import { drawReadings } from './measurements'
import { PALETTE } from './palette'

const TERM_WIDTH = 100
const SMALL = { size: 8.5, colour: PALETTE.inkSoft } as const

/** The report of a signed sheet on A4: who, what, how and with what, then the results, then what they rest on. */
export async function printTestReport(report: TestReport, sheet: TestSheetView, shopName: string): Promise<Buffer> {
  const pdf = await createPdf({ title: `${report.title} ${report.number}`, author: shopName })
  const flow = startFlow(pdf)
  flow.title(report.title)
  flow.paragraph(`Number ${report.number}`, { weight: 600 })
  for (const warning of report.warnings) flow.paragraph(warning, { weight: 600, colour: PALETTE.fault })
  flow.space(4)
  flow.keyValues(report.terms.map(({ term, words }) => [term, words] as const), TERM_WIDTH)
  flow.heading('How it was tested')
  flow.keyValues(report.conditions.map(({ term, words }) => [term, words] as const), TERM_WIDTH)
  instruments(flow, report)
  flow.heading('Results')
  flow.paragraph(report.outcome ? `${report.outcome}.` : 'Nothing was measured; what was checked stands below.', { weight: 600 })
  flow.paragraph(report.rule, SMALL)
  drawErrorCharts(pdf, flow, sheet)
  drawReadings(flow, sheet.readings)
  if (report.findings.length > 0) {
    flow.heading('Taken together')
    for (const { sentence, isFault } of report.findings) flow.paragraph(sentence, isFault ? { weight: 600, colour: PALETTE.fault } : {})
  }
  checks(flow, sheet)
  budgets(flow, report.budgets)
  flow.heading('What this report says, and does not')
  for (const statement of report.statements) flow.paragraph(statement)
  flow.space(6)
  flow.paragraph('End of the report', { weight: 600, align: 'centre' })
  flow.footer(`${shopName} · ${report.title} ${report.number}`)
  return pdf.finish()
}

function instruments(flow: Flow, { instruments: used }: TestReport): void {
  flow.heading('Instruments')
  if (used.length === 0) return flow.paragraph('No instrument is named.', { colour: PALETTE.inkSoft })
  flow.table(
    [{ heading: 'Instrument', share: 40 }, { heading: 'Serial', share: 12 }, { heading: 'Reference', share: 34 }, { heading: 'On the day', share: 14 }],
    used.map(({ name, serial, certificate, state }) => [name, serial, certificate, state]),
  )
}

function checks(flow: Flow, sheet: TestSheetView): void {
  if (sheet.checks.length > 0) {
    flow.heading('Checks')
    flow.table([{ heading: 'Check', share: 52 }, { heading: 'Result', share: 16 }, { heading: 'Note', share: 32 }], sheet.checks.map(({ name, result, note }) =>
      [name, result === 'fail' ? { text: CHECK_RESULT_LABELS[result], weight: 600 as const, colour: PALETTE.fault } : CHECK_RESULT_LABELS[result], note]))
  }
  if (sheet.safety) {
    flow.heading('Electrical safety check of this sitting')
    flow.paragraph(sheet.safety.passed ? 'Within the limits stated' : 'Not within the limits stated', { weight: 600, colour: sheet.safety.passed ? PALETTE.ink : PALETTE.fault })
    flow.paragraph(safetyLines(sheet.safety).join(' · '), { colour: PALETTE.inkSoft })
  }
}

/** The uncertainty of each range used, at its widest reading, so that every figure can be followed. */
function budgets(flow: Flow, all: readonly ReportBudget[]): void {
  if (all.length === 0) return
  flow.heading('How the uncertainty comes about')
  flow.paragraph('One budget for each range used, at the reading where it is widest.', SMALL)
  for (const budget of all) {
    flow.need(90)
    flow.space(4)
    flow.paragraph(`${budget.instrument}: ${budget.accuracy}`, { weight: 600 })
    flow.paragraph(budget.reading, SMALL)
    flow.table([{ heading: 'Component', share: 50 }, { heading: 'Evaluated', share: 28 }, { heading: 'Standard uncertainty', share: 22, align: 'right' }], [
      ...budget.lines.map(({ label, evaluation, standard }) => [label, evaluation, standard]),
      ['Combined standard uncertainty', 'root sum of squares', budget.combined],
      [{ text: 'Expanded uncertainty U', weight: 600 as const }, budget.coverage, { text: budget.expanded, weight: 600 as const }],
    ])
  }
}
