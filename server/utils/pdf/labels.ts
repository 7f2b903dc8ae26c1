import type { LabelDrawing, LabelInk, LabelMark, MeasureText } from '../../../shared/domain/label-layout'
import type { LabelSheet } from '../../../shared/domain/label-stock'
import { labelPosition } from '../../../shared/domain/label-stock'
import { createPdf } from './index'
import type { Pdf } from './index'
import { mm, PALETTE } from './palette'

/** The codes are pure black, whatever the palette: scanners want the contrast. */
const INKS: Record<LabelInk, string> = { black: '#000000', soft: PALETTE.inkSoft, fault: PALETTE.fault, white: PALETTE.white, enamel: PALETTE.enamel }

/** A document for a sheet of labels, its first page open: to measure text with, then to draw on. */
export async function openLabelPdf(sheet: LabelSheet, title: string): Promise<Pdf> {
  return createPdf({ size: [mm(sheet.paperWidth), mm(sheet.paperHeight)], margins: 0, title })
}

/** Widths of text in the faces that will be printed, in millimetres. */
export function measureWith(pdf: Pdf): MeasureText {
  const known = new Map<string, number>()
  return (text, weight, size) => {
    const key = `${weight} ${text}`
    const wide = known.get(key) ?? pdf.widthOf(text, { weight, size: 100 }) / 100
    known.set(key, wide)
    return wide * size
  }
}

/** Draws labels from the place `start` (from 0) on, page after page. */
export function drawLabels(pdf: Pdf, sheet: LabelSheet, start: number, drawings: readonly LabelDrawing[]): void {
  drawings.forEach((drawing, index) => {
    const position = labelPosition(sheet, start + index)
    while (pdf.doc.bufferedPageRange().count <= position.page) pdf.doc.addPage()
    for (const mark of drawing.marks) drawMark(pdf, mark, position.x, position.y)
  })
}

function drawMark(pdf: Pdf, mark: LabelMark, left: number, top: number): void {
  const { doc } = pdf
  if (mark.kind === 'text') {
    pdf.drawLine(mark.text, mm(left + mark.x), mm(top + mark.y), { size: mm(mark.size), weight: mark.weight, colour: INKS[mark.ink] })
    return
  }
  if (mark.kind === 'rects') {
    for (const [x, y, width, height] of mark.rects) doc.rect(mm(left + x), mm(top + y), mm(width), mm(height))
  } else {
    mark.points.forEach(([x, y], index) => index === 0 ? doc.moveTo(mm(left + x), mm(top + y)) : doc.lineTo(mm(left + x), mm(top + y)))
    doc.closePath()
  }
  doc.fill(INKS[mark.ink])
}
