/**
 * What a test report says besides its figures: the items that ISO/IEC 17025:2017, 7.8.2.1 (a to p) asks of a report, for a shop
 * that does not claim accreditation and says so. Plain data; the PDF only lays it out. It is a test report: it is never called
 * a calibration certificate, since it does not bring the piece to a reference.
 */
import type { CalibrationView, InstrumentView, TestSheetView } from '../types/bench'
import type { Fact } from '../types/unit'
import { accuracyInWords } from './accuracy'
import type { Ownership } from './acquisition'
import { CALIBRATION_STATE_LABELS } from './calibration'
import { decisionRuleInWords } from './decision'
import { NARROW_SPACE } from './frequency'
import { factInWords } from './knowledge'
import type { ReportBudget } from './report-budgets'
import { budgetsOf } from './report-budgets'
import type { ReportTable } from './report-results'
import { reportTables } from './report-results'
import { bound, boundTag } from './report-words'
import { checkpointTitle } from './result-words'
import type { Finding } from './sheet-findings'
import { coverageFindings, levelFindings } from './sheet-findings'
import { tallyInWords } from './sheet-tally'
import { warmUpOf } from './warm-up'

/** How often the report was given out: its sheet was opened again and signed anew. */
export interface ReportIssue {
  /** The first is 1. */
  number: number
  /** Why the sheet was last opened again; null of a first issue. */
  because: string | null
}

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
  issue: ReportIssue
  sheet: TestSheetView
}

export interface ReportTerm { term: string, words: string }
export interface ReportInstrument { name: string, accuracy: string, serial: string, certificate: string, state: string }

export interface TestReport {
  title: string
  number: string
  /** Stands under the title: what the report does not claim. */
  standing: string
  terms: ReportTerm[]
  conditions: ReportTerm[]
  instruments: ReportInstrument[]
  /** The decision rule with its risk. */
  rule: string
  outcome: string
  tables: ReportTable[]
  /** What the readings say taken together. */
  findings: Finding[]
  warnings: string[]
  budgets: ReportBudget[]
  statements: string[]
}

type Day = (iso: string) => string

const FOR_WHOM: Record<Ownership, string> = {
  bought: 'The shop’s own stock',
  consigned: 'Its owner, for whom the shop sells it',
}

/** "U 000009 P / T2", and from the second issue on "U 000009 P / T2, issue 2": unique, and printed on every page. */
export const reportNumber = (tag: string, sheetNumber: number, issue = 1): string =>
  `${boundTag(tag)} / T${sheetNumber}${issue > 1 ? `, issue ${issue}` : ''}`

const count = (amount: number, one: string, many: string): string => `${amount} ${amount === 1 ? one : many}`

/** "calibrated" needs a traceable reference; what has none was checked against something. */
function certificateInWords(certificate: CalibrationView | null, day: Day): string {
  if (!certificate) return 'No calibration is recorded'
  const on = certificate.calibratedOn ? ` on ${day(certificate.calibratedOn)}` : ''
  const by = [certificate.laboratory, certificate.certificateNumber].filter(Boolean).join(', ')
  const due = certificate.dueOn ? `; due ${day(certificate.dueOn)}` : ''
  if (certificate.traceableTo) return `Calibrated${on}${by ? ` by ${by}` : ''}, traceable to ${certificate.traceableTo}${due}`
  const against = [certificate.note, by].filter(Boolean).join(', ')
  return `Checked${on} against ${against || 'what is not recorded'}; no traceable reference is recorded${due}`
}

/** The accuracies that its readings rest on; of an instrument that took none, all that is stated of it. */
function accuracyOf({ id, capabilities }: InstrumentView, sheet: TestSheetView): string {
  const used = sheet.readings.flatMap(({ found, left }) => [found, left].flatMap(taken => taken?.result.instrumentId === id ? taken.result.accuracy ?? [] : []))
  return bound([...new Set(used.length > 0 ? used : capabilities.map(accuracyInWords))].join('; ')) || 'accuracy not stated'
}

function instrumentsOf(sheet: TestSheetView, day: Day): ReportInstrument[] {
  return sheet.instrumentList.map(instrument => ({
    name: `${instrument.name} (${boundTag(instrument.tag)})`,
    accuracy: accuracyOf(instrument, sheet),
    serial: instrument.serial || 'not recorded',
    certificate: certificateInWords(instrument.certificate, day),
    state: CALIBRATION_STATE_LABELS[instrument.calibration],
  }))
}

function termsOf(facts: TestReportFacts, day: Day): ReportTerm[] {
  const { sheet, shop } = facts
  return [
    { term: 'Laboratory', words: [shop.name, shop.address || 'address not recorded'].join(', ') },
    { term: 'Where tested', words: shop.address ? 'On the bench at the above address' : 'On the shop’s own bench' },
    { term: 'For', words: FOR_WHOM[facts.ownership] },
    { term: 'Item', words: `${facts.maker} ${facts.designation}, ${facts.kind.toLowerCase()}` },
    { term: 'Serial', words: factInWords(facts.serial.answer, facts.serial.text) },
    { term: 'Our tag', words: boundTag(facts.tag) },
    { term: 'Condition', words: facts.condition || 'not recorded' },
    { term: 'Received', words: day(facts.receivedOn) },
    { term: 'Tested', words: `${day(sheet.testedOn)}, by ${sheet.testedBy}` },
    { term: 'Issued', words: day(facts.issuedOn) },
    ...facts.issue.because === null ? [] : [{ term: 'Replaces', words: `${reportNumber(facts.tag, sheet.number, facts.issue.number - 1)}. Why: ${facts.issue.because}` }],
  ]
}

function methodOf({ procedure }: TestSheetView): string {
  if (!procedure) return 'Dial points of the model’s published bands, low, middle and high'
  return `The shop’s procedure for the model, version ${procedure.number}${procedure.origin ? `; limits from ${procedure.origin}` : ''}`
}

/** What was done otherwise, and which points were not read: a report that keeps still about them would say they were. */
function deviationsOf({ deviations, readings }: TestSheetView): string {
  const unread = readings.filter(({ found, left }) => !found && !left)
  return [
    deviations,
    unread.length > 0 ? `${count(unread.length, 'point was', 'points were')} not read: ${unread.map(checkpointTitle).join('; ')}` : '',
  ].filter(Boolean).join('. ') || 'No addition, deviation or exclusion is recorded'
}

function driftOf({ drift }: TestSheetView): ReportTerm[] {
  if (drift.readings.length === 0) return []
  const read = drift.readings.map(({ minutes, text }) => `${bound(text)} at ${bound(count(minutes, 'minute', 'minutes'))}`).join(', ')
  const warmUp = warmUpOf(drift.readings)
  return [{ term: 'While warming', words: [`${drift.label ? `${bound(drift.label)}: ` : ''}${read}`, warmUp.kind === 'drift' ? warmUp.sentence : ''].filter(Boolean).join('. ') }]
}

function conditionsOf(sheet: TestSheetView): ReportTerm[] {
  return [
    { term: 'Method', words: methodOf(sheet) },
    { term: 'Deviations', words: deviationsOf(sheet) },
    { term: 'Supply', words: bound(sheet.supply) || 'not recorded' },
    { term: 'Warm-up', words: sheet.warmUpMinutes === null ? 'not recorded' : bound(count(sheet.warmUpMinutes, 'minute', 'minutes')) },
    { term: 'Ambient', words: sheet.ambientCelsius === null ? 'not recorded' : `${String(sheet.ambientCelsius).replace('-', '\u2212')}${NARROW_SPACE}°C` },
    ...driftOf(sheet),
    { term: 'Sampling', words: samplingInWords(sheet) },
    ...sheet.note ? [{ term: 'Note', words: sheet.note }] : [],
  ]
}

function statementsOf(facts: TestReportFacts, day: Day): string[] {
  const { sheet, shop } = facts
  const wasAdjusted = sheet.readings.some(({ left }) => left !== null)
  const hasUncertainty = sheet.readings.some(({ found, left }) => found?.result.uncertainty ?? left?.result.uncertainty)
  return [
    'These results relate only to the item described, as it was on the day of the test.',
    'This report may be copied only whole.',
    ...wasAdjusted ? ['Where a reading was adjusted, the result before the adjustment stands as found and that after it as left; the verdict that counts is the one as left.'] : [],
    ...!wasAdjusted && sheet.tally.read > 0 ? ['Nothing was adjusted: each result is as found.'] : [],
    ...hasUncertainty
      ? ['The expanded uncertainty U is given for about 95 % coverage, evaluated by the GUM (JCGM 100:2008) from what is stated of the instrument, its last place and any repeat readings. How the piece itself drifts or is set is not in it.']
      : [],
    'No result comes from an outside provider.',
    `No accreditation is claimed by ${shop.name}. The content follows ISO/IEC 17025:2017, 7.8; the shop has not been assessed to it.`,
    `Authorised by ${sheet.signedBy ?? sheet.testedBy}, ${day(facts.issuedOn)}.`,
  ]
}

/** Whether every point was read: one that was not stands in the results as not read, and is counted here. */
function samplingInWords({ tally: { points, read } }: TestSheetView): string {
  if (points === 0) return 'None: nothing was measured'
  return read === points ? 'None: every point listed was read' : `None, but ${points - read} of the ${points} points listed ${points - read === 1 ? 'was' : 'were'} not read`
}

/** The report of a signed sheet. `day` writes a day (`2026-11-30`) as people read it. */
export function makeTestReport(facts: TestReportFacts, day: Day): TestReport {
  const { sheet } = facts
  return {
    title: 'Test report',
    number: reportNumber(facts.tag, sheet.number, facts.issue.number),
    standing: 'A shop’s own test report. No accreditation is claimed.',
    terms: termsOf(facts, day),
    conditions: conditionsOf(sheet),
    instruments: instrumentsOf(sheet, day),
    rule: bound(decisionRuleInWords(sheet.decisionRule)),
    outcome: tallyInWords(sheet.tally),
    tables: reportTables(sheet.readings, sheet.instrumentList),
    findings: [...coverageFindings(sheet.readings), ...levelFindings(sheet.readings)],
    warnings: [...sheet.staleBecause ? [`This report no longer holds for the piece as it stands. ${sheet.staleBecause}`] : [], ...sheet.instrumentWarnings],
    budgets: budgetsOf(sheet),
    statements: statementsOf(facts, day),
  }
}
