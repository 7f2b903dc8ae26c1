import { decisionRuleInWords } from '../../../shared/domain/decision'
import { factInWords } from '../../../shared/domain/knowledge'
import { formatTag } from '../../../shared/domain/tag'
import type { ProvenanceSheet } from '../../../shared/types/provenance'
import { drawErrorCharts } from './error-charts'
import type { Flow } from './flow'
import { startFlow } from './flow'
import type { Pdf } from './index'
import { createPdf } from './index'
import { drawReadings } from './measurements'
import { PALETTE } from './palette'

/** A photo as JPEG or PNG bytes (PDF holds neither WebP nor AVIF), with its pixels. */
export interface PrintedPhoto { bytes: Buffer, caption: string, width: number, height: number }

const dayFormat = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric', timeZone: 'UTC' })
const day = (iso: string) => dayFormat.format(new Date(iso))

/** The buyer's sheet on A4: the same words as the public page, in the same order. `link` is printed at the foot, if there is one. */
export async function printProvenanceSheet(sheet: ProvenanceSheet, photos: readonly PrintedPhoto[], link: string | null): Promise<Buffer> {
  const pdf = await createPdf({ title: `${sheet.maker} ${sheet.designation}, ${formatTag(sheet.tag)}: provenance sheet`, author: sheet.shop.name })
  const flow = startFlow(pdf)
  plate(pdf, flow, sheet)
  cautions(flow, sheet)
  if (photos.length > 0) pictures(pdf, flow, photos)
  if (sheet.coverage.length > 0) {
    flow.heading('What it covers')
    flow.keyValues(sheet.coverage.map(({ function: does, words }) => [does, words] as const), 110)
  }
  flow.heading('What you should know')
  flow.keyValues(sheet.disclosures.map(entry => [entry.label, entry.words] as const), 110)
  work(flow, sheet)
  tests(pdf, flow, sheet)
  safety(flow, sheet)
  included(flow, sheet)
  flow.space(12)
  flow.paragraph('Says what was checked and when. Old mains and valve equipment calls for a competent person, and local codes come before anything written here.', { size: 8, colour: PALETTE.inkSoft })
  flow.footer([sheet.shop.name, `as it stood on ${day(sheet.asOf)}`, link].filter(Boolean).join(' · '))
  return pdf.finish()
}

/** The head of the sheet, like the plate riveted to a chassis. */
function plate(pdf: Pdf, flow: Flow, sheet: ProvenanceSheet): void {
  const { doc } = pdf
  const height = 118
  const { left, width, y } = flow
  doc.roundedRect(left, y, width, height, 6).lineWidth(1.2).stroke(PALETTE.ink)
  doc.roundedRect(left + 4, y + 4, width - 8, height - 8, 4).lineWidth(0.75).stroke(PALETTE.brass)
  for (const [dx, dy] of [[14, 14], [width - 14, 14], [14, height - 14], [width - 14, height - 14]] as const) doc.circle(left + dx, y + dy, 3).lineWidth(0.75).stroke(PALETTE.brass)
  const inner = { x: left + 28, width: width - 56 }
  pdf.drawText(sheet.maker.toUpperCase(), { ...inner, y: y + 14, size: 9, weight: 600, tracking: 1.2, colour: PALETTE.brass, maxLines: 1 })
  pdf.drawText(sheet.designation, { ...inner, y: y + 27, size: 24, weight: 600, leading: 1.2, maxLines: 1 })
  pdf.drawText([sheet.kind, sheet.years].filter(Boolean).join(', '), { ...inner, y: y + 57, colour: PALETTE.inkSoft, maxLines: 1 })
  const facts = [['Serial', factInWords(sheet.serial.answer, sheet.serial.text)], ['Supply', sheet.supply], ['Tag', formatTag(sheet.tag)]] as const
  const shares = [0.26, 0.5, 0.24]
  let x = inner.x
  facts.forEach(([term, value], index) => {
    const column = inner.width * (shares[index] ?? 0.3)
    pdf.drawText(term.toUpperCase(), { x, y: y + 76, width: column - 8, size: 6.5, tracking: 0.8, colour: PALETTE.inkSoft })
    pdf.drawText(value, { x, y: y + 85, width: column - 8, size: 9, weight: 500, leading: 1.2, maxLines: 2 })
    x += column
  })
  flow.y = y + height
}

function cautions(flow: Flow, sheet: ProvenanceSheet): void {
  if (!sheet.hazardHold && !sheet.notEnergised && sheet.hazards.length === 0) return
  flow.heading('Heed this')
  if (sheet.hazardHold) flow.paragraph(`Hazard hold. ${sheet.hazardHold}`, { weight: 600, colour: PALETTE.fault })
  if (sheet.notEnergised) flow.paragraph(`Untested, not to be energised. ${sheet.notEnergised}`, { weight: 600, colour: PALETTE.fault })
  for (const hazard of sheet.hazards) flow.paragraph(`${hazard.label}. ${hazard.caution}`, { colour: PALETTE.amber })
}

/** The first large, up to four beneath it in a row. */
function pictures(pdf: Pdf, flow: Flow, photos: readonly PrintedPhoto[]): void {
  const [first, ...others] = photos
  if (!first) return
  flow.space(12)
  const tall = Math.min(flow.width * 0.62 * first.height / first.width, 240)
  flow.need(tall + 90)
  const wide = tall * first.width / first.height
  pdf.doc.image(first.bytes, flow.left, flow.y, { width: wide, height: tall })
  const room = flow.width - wide - 8
  const small = others.slice(0, 4)
  const columns = room > 150 ? 1 : 2
  const step = (tall + 8) / Math.max(1, Math.ceil(small.length / columns))
  small.forEach((photo, index) => {
    const box = { width: room / columns - (columns - 1) * 4, height: Math.min(step - 8, 112) }
    pdf.doc.image(photo.bytes, flow.left + wide + 8 + (index % columns) * (box.width + 8), flow.y + Math.floor(index / columns) * step, { fit: [box.width, box.height] })
  })
  flow.y += tall + 4
}

function work(flow: Flow, sheet: ProvenanceSheet): void {
  flow.heading('Work and changes')
  // Left out of a sheet frozen before it was told.
  if (sheet.originality) {
    flow.paragraph(sheet.originality.words, { weight: 600 })
    flow.paragraph([sheet.originality.sentence, ...sheet.originality.cautions].join(' '), { colour: PALETTE.inkSoft })
  }
  if (sheet.work.length === 0) return flow.paragraph('Nothing is recorded as changed, by us or by an earlier hand.', { colour: PALETTE.inkSoft })
  flow.table(
    [{ heading: 'When', share: 16 }, { heading: 'What', share: 84 }],
    sheet.work.map(entry => [
      entry.doneOn ? day(entry.doneOn) : entry.hand === 'left_alone' ? 'left alone' : 'found',
      `${entry.heading}\n${entry.lines.join(' · ')}`,
    ]),
  )
}

function tests(pdf: Pdf, flow: Flow, sheet: ProvenanceSheet): void {
  flow.heading('Measured')
  if (sheet.sheets.length === 0) return flow.paragraph('No test sheet has been signed for this piece: nothing is claimed of its accuracy.', { colour: PALETTE.inkSoft })
  for (const test of sheet.sheets) {
    flow.need(60)
    flow.paragraph(`Sheet ${test.number}, ${day(test.testedOn)}`, { weight: 600 })
    flow.paragraph(`Checked against: ${test.instruments.length ? test.instruments.join(', ') : 'instrument not recorded'}. ${test.conditions}.`, { colour: PALETTE.inkSoft })
    if (test.staleBecause) flow.paragraph(`No longer holds for the piece as it stands. ${test.staleBecause}`, { colour: PALETTE.amber })
    for (const warning of test.instrumentWarnings) flow.paragraph(warning, { colour: PALETTE.amber })
    if (test.readings.length > 0) {
      drawErrorCharts(pdf, flow, test)
      drawReadings(flow, test.readings)
      flow.paragraph(`${decisionRuleInWords(test.decisionRule)} U is the expanded uncertainty, about 95 %.`, { size: 8, colour: PALETTE.inkSoft })
    }
    if (test.drift) flow.paragraph(`Warm-up: ${test.drift}`)
    if (test.checks.length > 0) {
      flow.space(4)
      flow.paragraph(test.checks.map(check => `${check.name}: ${check.result.toLowerCase()}${check.note ? ` (${check.note})` : ''}`).join(' · '))
    }
    flow.space(8)
  }
}

function safety(flow: Flow, sheet: ProvenanceSheet): void {
  flow.heading('Electrical safety check')
  if (!sheet.safety) return flow.paragraph('No electrical safety check is on record.', { colour: PALETTE.inkSoft })
  flow.paragraph(`${sheet.safety.passed ? 'Passed' : 'Failed'} on ${day(sheet.safety.doneAt)}${sheet.safety.current ? '' : ', before later work'}`, { weight: 600 })
  flow.paragraph(sheet.safety.lines.join(' · '), { colour: PALETTE.inkSoft })
}

function included(flow: Flow, sheet: ProvenanceSheet): void {
  flow.heading('What comes with it')
  if (sheet.keptWith.length === 0) return flow.paragraph('Nothing is recorded as belonging to it.', { colour: PALETTE.inkSoft })
  flow.table(
    [{ heading: 'What', share: 56 }, { heading: 'Tag', share: 18 }, { heading: 'Included', share: 26 }],
    sheet.keptWith.map(item => [
      `${item.description} (${[item.originality.toLowerCase(), item.condition].filter(Boolean).join(', ')})`,
      formatTag(item.tag),
      item.missing ? { text: `No: ${item.missing}`, colour: PALETTE.fault } : 'Yes',
    ]),
  )
}
