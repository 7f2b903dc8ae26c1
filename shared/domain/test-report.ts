/**
 * What a test report says besides its figures: the items that ISO/IEC 17025:2017, 7.8.2.1 (a to p) asks of a report, for a shop
 * that does not claim accreditation and says so. Plain data; the PDF only lays it out. It is a test report: it is never called
 * a calibration certificate, since it does not bring the piece to a reference.
 */
import type { InstrumentView, TestSheetView } from '../types/bench'
import type { Fact } from '../types/unit'
import { accuracyInWords } from './accuracy'
import type { Ownership } from './acquisition'
import { formatAmount } from './amount'
import { CALIBRATION_STATE_LABELS } from './calibration'
import { decisionRuleInWords } from './decision'
import type { Result } from './evaluation'
import { factInWords } from './knowledge'
import type { Quantity } from './reading'
import { checkpointTitle, uncertaintyInWords, valueInWords } from './result-words'
import type { Finding } from './sheet-findings'
import { coverageFindings, levelFindings } from './sheet-findings'
import { tallyInWords } from './sheet-tally'
import { formatTag } from './tag'
import { warmUpOf } from './warm-up'

export interface TestReportFacts {
  shop: { name: string, address: string }
  tag: string
  maker: string
  designation: string
  kind: string
  serial: Fact
  condition: string
  /** Days in the shop's zone. */
  receivedOn: string
  issuedOn: string
  ownership: Ownership
  sheet: TestSheetView
}

/** How one range of one instrument comes to its uncertainty, at the reading where it is widest. */
export interface ReportBudget {
  instrument: string
  accuracy: string
  reading: string
  lines: { label: string, evaluation: string, standard: string }[]
  combined: string
  coverage: string
  expanded: string
}

export interface TestReport {
  title: string
  number: string
  terms: { term: string, words: string }[]
  conditions: { term: string, words: string }[]
  instruments: { name: string, serial: string, certificate: string, state: string }[]
  rule: string
  outcome: string
  /** What the readings say taken together. */
  findings: Finding[]
  warnings: string[]
  budgets: ReportBudget[]
  statements: string[]
}

const FOR_WHOM: Record<TestReportFacts['ownership'], string> = {
  bought: 'The shop’s own stock',
  consigned: 'Its owner, for whom the shop sells it',
}

/** "U 000009 P / T2": unique, and printed on every page. */
export const reportNumber = (tag: string, sheetNumber: number): string => `${formatTag(tag)} / T${sheetNumber}`

function certificateInWords({ certificate }: InstrumentView, day: (iso: string) => string): string {
  if (!certificate) return 'No calibration is recorded'
  const given = [certificate.laboratory, certificate.certificateNumber, certificate.calibratedOn ? day(certificate.calibratedOn) : ''].filter(Boolean).join(', ')
  return certificate.traceableTo ? `Calibrated: ${given}; traceable to ${certificate.traceableTo}` : `Checked against: ${[given, certificate.note].filter(Boolean).join('; ')}; no traceable reference is recorded`
}

interface Budgeted { title: string, quantity: Quantity, result: Result }

function budgetOf({ title, quantity, result }: Budgeted, instruments: readonly InstrumentView[]): ReportBudget[] {
  const { uncertainty } = result
  if (!uncertainty) return []
  const instrument = instruments.find(({ id }) => id === result.instrumentId)
  return [{
    instrument: instrument ? `${instrument.name} (${formatTag(instrument.tag)})` : 'Instrument not on the sheet',
    accuracy: result.accuracy ?? 'not stated',
    reading: `${title}: ${valueInWords(result, quantity)}`,
    lines: uncertainty.components.map(({ label, evaluation, shape, standard }) => ({ label, evaluation: `Type ${evaluation}, ${shape.replace('_', '-')}`, standard: formatAmount(standard, quantity, 3) })),
    combined: formatAmount(uncertainty.standard, quantity, 3),
    coverage: uncertainty.coverage,
    expanded: uncertaintyInWords(result, quantity),
  }]
}

/** A budget for each range used: of its readings the one with the widest uncertainty. */
function budgetsOf(sheet: TestSheetView): ReportBudget[] {
  const widest = new Map<string, Budgeted>()
  for (const reading of sheet.readings) {
    for (const taken of [reading.found, reading.left]) {
      if (!taken?.result.uncertainty) continue
      const key = `${taken.result.instrumentId} ${taken.result.accuracy} ${reading.quantity}`
      const before = widest.get(key)?.result.uncertainty?.expanded ?? 0
      if (taken.result.uncertainty.expanded > before) widest.set(key, { title: checkpointTitle(reading), quantity: reading.quantity, result: taken.result })
    }
  }
  return [...widest.values()].flatMap(each => budgetOf(each, sheet.instrumentList))
}

/** Whether every point was read: one that was not stands in the results as not read, and is counted here. */
function samplingInWords({ tally: { points, read } }: TestSheetView): string {
  if (points === 0) return 'None: nothing was measured'
  return read === points ? 'None: every point listed was read' : `None, but ${points - read} of the ${points} points listed were not read`
}

/** The report of a signed sheet. `day` writes a day (`2026-11-30`) as people read it. */
export function makeTestReport(facts: TestReportFacts, day: (iso: string) => string): TestReport {
  const { sheet, shop } = facts
  const wasAdjusted = sheet.readings.some(({ left }) => left !== null)
  const drift = sheet.drift.readings.length > 0 ? [sheet.drift.label, warmUpOf(sheet.drift.readings).sentence].filter(Boolean).join('. ') : ''
  return {
    title: 'Test report',
    number: reportNumber(facts.tag, sheet.number),
    terms: [
      { term: 'Tested by', words: [shop.name, shop.address].filter(Boolean).join(', ') },
      { term: 'Where', words: 'At the above address, on the bench' },
      { term: 'For', words: FOR_WHOM[facts.ownership] },
      { term: 'Item', words: `${facts.maker} ${facts.designation}, ${facts.kind.toLowerCase()}` },
      { term: 'Serial', words: factInWords(facts.serial.answer, facts.serial.text) },
      { term: 'Our tag', words: formatTag(facts.tag) },
      { term: 'Condition', words: facts.condition || 'not recorded' },
      { term: 'Received', words: day(facts.receivedOn) },
      { term: 'Tested on', words: day(sheet.testedOn) },
      { term: 'Issued', words: day(facts.issuedOn) },
    ],
    conditions: [
      { term: 'Method', words: sheet.procedure ? `The shop’s procedure for the model, version ${sheet.procedure.number}${sheet.procedure.origin ? `; limits from ${sheet.procedure.origin}` : ''}` : 'Dial points of the model’s published bands, low, middle and high' },
      { term: 'Done otherwise', words: sheet.deviations || 'Nothing was added, left out or done otherwise' },
      { term: 'Supply', words: sheet.supply || 'not recorded' },
      { term: 'Warm-up', words: sheet.warmUpMinutes === null ? 'not recorded' : `${sheet.warmUpMinutes} minutes` },
      { term: 'Ambient', words: sheet.ambientCelsius === null ? 'not recorded' : `${sheet.ambientCelsius} °C` },
      ...drift ? [{ term: 'While warming', words: drift }] : [],
      { term: 'Sampling', words: samplingInWords(sheet) },
      ...sheet.note ? [{ term: 'Note', words: sheet.note }] : [],
    ],
    instruments: sheet.instrumentList.map(instrument => ({
      name: `${instrument.name} (${formatTag(instrument.tag)})${instrument.capabilities.length > 0 ? `: ${[...new Set(instrument.capabilities.map(accuracyInWords))].slice(0, 2).join('; ')}` : ''}`,
      serial: instrument.serial || 'not recorded',
      certificate: certificateInWords(instrument, day),
      state: CALIBRATION_STATE_LABELS[instrument.calibration],
    })),
    rule: decisionRuleInWords(sheet.decisionRule),
    outcome: tallyInWords(sheet.tally),
    findings: [...coverageFindings(sheet.readings), ...levelFindings(sheet.readings)],
    warnings: [...sheet.staleBecause ? [`This report no longer holds for the piece as it stands. ${sheet.staleBecause}`] : [], ...sheet.instrumentWarnings],
    budgets: budgetsOf(sheet),
    statements: [
      wasAdjusted ? 'Where a reading was adjusted, the result before the adjustment stands as found and that after it as left.' : 'Nothing was adjusted: each result is as found.',
      'The expanded uncertainty U is given for about 95 % coverage, evaluated by the GUM (JCGM 100:2008) from what is stated of the instrument, its last place and any repeat readings.',
      'These results relate only to the item described, as it was on the day of the test.',
      'No result comes from an outside provider.',
      `No accreditation is claimed by ${shop.name}. The content follows ISO/IEC 17025:2017, 7.8; the shop has not been assessed to it.`,
      'This report may be copied only whole.',
      `Authorised by ${sheet.signedBy ?? sheet.testedBy}, ${day(facts.issuedOn)}.`,
    ],
  }
}
