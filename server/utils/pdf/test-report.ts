import type { TestReport } from '../../../shared/domain/test-report'
import { safetyLines } from '../../../shared/domain/provenance'
import { CHECK_RESULT_LABELS } from '../../../shared/domain/sheet-checks'
import type { TestSheetView } from '../../../shared/types/bench'
import type { Flow } from './flow'
import { startFlow } from './flow'
import { createPdf } from './index'
import { PALETTE } from './palette'
import { drawBudgets, drawResults } from './report-results'

const TERM_WIDTH = 100
const SMALL = { size: 8.5, colour: PALETTE.inkSoft } as const

/** The report of a signed sheet on A4: who, what, how and with what, then the results, and as an annex what they rest on. */
export async function printTestReport(report: TestReport, sheet: TestSheetView, shopName: string): Promise<Buffer> {
  const pdf = await createPdf({ title: `${report.title} ${report.number}`, author: shopName })
  const flow = startFlow(pdf)
  head(flow, report, shopName)
  instruments(flow, report)
  flow.heading('Results')
  flow.paragraph(report.outcome ? `${report.outcome}.` : 'Nothing was measured; what was checked stands below.', { weight: 600 })
  flow.paragraph(report.rule, SMALL)
  drawResults(pdf, flow, report.tables, sheet)
  findings(flow, report)
  checks(flow, sheet)
  safety(flow, sheet)
  flow.heading('What this report says, and does not')
  for (const statement of report.statements) {
    flow.paragraph(statement)
    flow.space(2)
  }
  drawBudgets(flow, report.budgets)
  flow.space(10)
  flow.paragraph(`End of test report ${report.number}`, { weight: 600, align: 'centre' })
  flow.footer(`${shopName} · ${report.title} ${report.number}`)
  return pdf.finish()
}

function head(flow: Flow, report: TestReport, shopName: string): void {
  flow.paragraph(shopName, { size: 11, weight: 600, colour: PALETTE.enamel })
  flow.title(report.title)
  flow.paragraph(`Number ${report.number}`, { weight: 600 })
  flow.paragraph(report.standing, SMALL)
  for (const warning of report.warnings) {
    flow.space(3)
    flow.paragraph(warning, { weight: 600, colour: PALETTE.fault })
  }
  flow.space(6)
  flow.keyValues(report.terms.map(({ term, words }) => [term, words] as const), TERM_WIDTH)
  flow.heading('How it was tested')
  flow.keyValues(report.conditions.map(({ term, words }) => [term, words] as const), TERM_WIDTH)
}

function instruments(flow: Flow, { instruments: used }: TestReport): void {
  flow.heading('Instruments')
  if (used.length === 0) return flow.paragraph('No instrument is named.', { colour: PALETTE.inkSoft })
  flow.table(
    [{ heading: 'Instrument', share: 24 }, { heading: 'Stated accuracy', share: 24 }, { heading: 'Serial', share: 13 }, { heading: 'Reference', share: 27 }, { heading: 'On the day', share: 12 }],
    used.map(({ name, accuracy, serial, certificate, state }) => [name, accuracy, serial, certificate, state]), 8.5,
  )
}

function findings(flow: Flow, report: TestReport): void {
  if (report.findings.length === 0) return
  flow.heading('The readings taken together')
  for (const { sentence, isFault } of report.findings) flow.paragraph(sentence, isFault ? { weight: 600, colour: PALETTE.fault } : {})
}

function checks(flow: Flow, sheet: TestSheetView): void {
  if (sheet.checks.length === 0) return
  flow.heading('Checks')
  flow.table([{ heading: 'Check', share: 52 }, { heading: 'Result', share: 16 }, { heading: 'Note', share: 32 }], sheet.checks.map(({ name, result, note }) =>
    [name, result === 'fail' ? { text: CHECK_RESULT_LABELS[result], weight: 600 as const, colour: PALETTE.fault } : CHECK_RESULT_LABELS[result], note]))
}

function safety(flow: Flow, { safety: check }: TestSheetView): void {
  if (!check) return
  flow.heading('Electrical safety check of this sitting')
  flow.paragraph(check.passed ? 'Within the limits stated' : 'Not within the limits stated', { weight: 600, colour: check.passed ? PALETTE.ink : PALETTE.fault })
  for (const line of safetyLines(check)) flow.paragraph(line, { colour: PALETTE.inkSoft })
}
