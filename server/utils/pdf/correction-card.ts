import type { CardBand } from '../../../shared/domain/correction-card'
import { formatFrequency } from '../../../shared/domain/frequency'
import type { Pdf, TextStyle } from './index'
import { createPdf } from './index'
import { mm, PALETTE } from './palette'

export interface CardHead { shopName: string, unitName: string, tag: string, serial: string, testedOn: string, warmUpMinutes: number | null, instruments: readonly string[], warnings: readonly string[] }

/** A piece of a band that fits on a card beside another. */
interface Part { title: string, rows: string[][] }
interface Words { text: string, style: TextStyle, above: number }
interface Box { x: number, y: number, width: number }

const MARGIN = 22
const GAP = 20
const ROW = 13.5
/** A part's title and the headings of its columns. */
const PART_HEAD = 31
const FOOT = 14
const COLUMNS = ['Dial says', 'really gives', 'To get', 'set dial to']
const SOFT = { size: 7, colour: PALETTE.inkSoft } as const

/** Four figures: finer than any dial is set. */
const rounded = (hz: number) => formatFrequency(Math.round(Number(hz.toPrecision(4))))

/**
 * Cards of A6, landscape, for the buyer to keep with the set: what its dial really gives, and what to set for a wanted
 * frequency. Two bands stand beside each other; every card says which set it is of.
 */
export async function printCorrectionCard(head: CardHead, bands: readonly CardBand[]): Promise<Buffer> {
  const pdf = await createPdf({ size: [mm(148), mm(105)], margins: MARGIN, title: `Dial correction card, ${head.unitName}, ${head.tag}`, author: head.shopName })
  const { width: pageWidth, height: pageHeight } = pdf.doc.page
  const width = pageWidth - 2 * MARGIN
  const above = headWords(head)
  const below = [{ text: holdsFor(head), style: SOFT, above: 0 }]
  const top = MARGIN + heightOf(pdf, above, width) + 6
  const bottom = pageHeight - MARGIN - FOOT - heightOf(pdf, below, width)
  const rowsInPart = Math.max(1, Math.floor((bottom - 6 - top - PART_HEAD) / ROW))
  const parts = bands.flatMap(band => partsOf(band, rowsInPart))
  const column = (width - GAP) / 2
  for (let at = 0; at < parts.length; at += 2) {
    if (at > 0) pdf.doc.addPage()
    drawWords(pdf, above, { x: MARGIN, y: MARGIN, width })
    for (const [side, part] of parts.slice(at, at + 2).entries()) drawPart(pdf, part, { x: MARGIN + side * (column + GAP), y: top, width: column })
    drawWords(pdf, below, { x: MARGIN, y: bottom, width })
    drawFoot(pdf, `${head.shopName} · dial correction card`, `Card ${at / 2 + 1} of ${Math.ceil(parts.length / 2)}`)
  }
  return pdf.finish()
}

function headWords(head: CardHead): Words[] {
  const warmUp = head.warmUpMinutes === null ? '' : `after ${head.warmUpMinutes} minutes’ warm-up`
  const identity = [head.serial && `serial ${head.serial}`, head.tag, `tested ${head.testedOn}${warmUp && ` ${warmUp}`}`].filter(Boolean).join(' · ')
  return [
    { text: `Dial corrections: ${head.unitName}`, style: { size: 11, weight: 600 }, above: 0 },
    { text: identity, style: { ...SOFT, size: 7.5 }, above: 1 },
    ...head.warnings.map((text): Words => ({ text, style: { size: 7, weight: 600, colour: PALETTE.fault }, above: 2 })),
  ]
}

function holdsFor({ instruments, warmUpMinutes }: CardHead): string {
  const warm = warmUpMinutes ? 'Let it warm up as long. ' : ''
  return `Measured with ${instruments.join(', ') || 'an instrument not recorded'}. It holds for this set as it was tested on that day. ${warm}Between the points a straight line is taken; beyond them nothing is said.`
}

/** A band's rows, cut into as many parts as a card's height asks for. */
function partsOf({ label, points, settings }: CardBand, most: number): Part[] {
  const rows = Array.from({ length: Math.max(points.length, settings.length) }, (_, index) => {
    const [point, setting] = [points[index], settings[index]]
    return [point ? formatFrequency(point.dialHz) : '', point ? rounded(point.trueHz) : '', setting ? formatFrequency(setting.wantedHz) : '', setting ? rounded(setting.setHz) : '']
  })
  const title = label ? `Band ${label}` : 'Dial'
  return Array.from({ length: Math.ceil(rows.length / most) }, (_, part) => ({
    title: part === 0 ? title : `${title}, continued`, rows: rows.slice(part * most, (part + 1) * most),
  }))
}

function heightOf(pdf: Pdf, words: readonly Words[], width: number): number {
  return words.reduce((sum, { text, style, above }) => sum + above + pdf.heightOf(text, { ...style, width }), 0)
}

function drawWords(pdf: Pdf, words: readonly Words[], { x, y, width }: Box): void {
  words.reduce((top, { text, style, above }) => pdf.drawText(text, { ...style, x, y: top + above, width }), y)
}

function drawPart(pdf: Pdf, { title, rows }: Part, { x, y, width }: Box): void {
  const share = width / COLUMNS.length
  const line = (cells: readonly string[], baseline: number, style: TextStyle, last: TextStyle = {}) => {
    cells.forEach((cell, index) => pdf.drawLine(cell, x + (index + 1) * share, baseline, { ...style, ...index === cells.length - 1 ? last : {}, align: 'right' }))
  }
  const rule = (at: number, colour: string) => pdf.doc.moveTo(x, at).lineTo(x + width, at).lineWidth(0.6).stroke(colour)
  pdf.drawLine(title, x, y + 10, { size: 9, weight: 600 })
  line(COLUMNS, y + PART_HEAD - 5, { size: 6.8, weight: 600, colour: PALETTE.inkSoft })
  rule(y + PART_HEAD, PALETTE.lineStrong)
  rows.forEach((cells, index) => {
    const top = y + PART_HEAD + index * ROW
    line(cells, top + ROW - 4, { size: 8 }, { weight: 600 })
    rule(top + ROW, PALETTE.line)
  })
}

function drawFoot(pdf: Pdf, left: string, right: string): void {
  const { width, height } = pdf.doc.page
  const baseline = height - MARGIN
  pdf.drawLine(left, MARGIN, baseline, SOFT)
  pdf.drawLine(right, width - MARGIN, baseline, { ...SOFT, align: 'right' })
}
