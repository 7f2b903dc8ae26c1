import type { Pdf, TextStyle } from './index'
import { DEFAULT_LEADING, DEFAULT_SIZE } from './index'
import { PALETTE } from './palette'

export interface Column {
  heading: string
  /** Its share of the width beside the others'. */
  share: number
  align?: 'left' | 'right'
  weight?: TextStyle['weight']
}

/** A cell is words, or words with a look of their own. */
export type Cell = string | { text: string, weight?: TextStyle['weight'], colour?: string }

/** Lays blocks beneath one another, going to a new page where the next does not fit. */
export interface Flow {
  /** Where the next block begins. */
  y: number
  readonly left: number
  readonly width: number
  /** Goes to a new page unless `height` points are left on this one. */
  need: (height: number) => void
  space: (height: number) => void
  rule: (colour?: string, thickness?: number) => void
  /** A document's title. */
  title: (text: string) => void
  /** The small spaced capitals over a part, with its rule; kept with at least a line of what follows. */
  heading: (text: string) => void
  paragraph: (text: string, style?: TextStyle) => void
  /** Term and value, line by line. `termWidth` in points; a third unless told. */
  keyValues: (rows: readonly (readonly [string, string])[], termWidth?: number) => void
  /** A table whose heading row stands again at the top of each page. A row is never cut by the end of a page unless it is longer than one. `size` of its words in points; 9.5 unless told. */
  table: (columns: readonly Column[], rows: readonly (readonly Cell[])[], size?: number) => void
  /** Writes `words` and "Page x of y" at the foot of every page. Call once, last. */
  footer: (words: string) => void
}

/** Begins a flow at the top of the page that is open. */
export function startFlow(pdf: Pdf): Flow {
  const { doc, margins } = pdf
  const left = margins.left
  const width = doc.page.width - margins.left - margins.right
  const bottom = () => doc.page.height - margins.bottom

  const flow: Flow = {
    y: margins.top,
    left,
    width,
    need(height) {
      if (flow.y + height <= bottom() || flow.y === margins.top) return
      doc.addPage()
      flow.y = margins.top
    },
    space(height) {
      flow.y = Math.min(flow.y + height, bottom())
    },
    rule(colour = PALETTE.line, thickness = 0.75) {
      ruleAt(flow.y, colour, thickness)
    },
    title(text) {
      flow.need(40)
      flow.y = pdf.drawText(text, { x: left, y: flow.y, width, size: 20, weight: 600, leading: 1.2 })
    },
    heading(text) {
      flow.need(48)
      flow.space(14)
      flow.y = pdf.drawText(text.toUpperCase(), { x: left, y: flow.y, width, size: 7.5, weight: 600, tracking: 0.9, colour: PALETTE.inkSoft })
      flow.space(2)
      flow.rule(PALETTE.brass)
      flow.space(5)
    },
    paragraph(text, style = {}) {
      const height = (style.size ?? DEFAULT_SIZE) * DEFAULT_LEADING
      const x = style.align === 'right' ? left + width : style.align === 'centre' ? left + width / 2 : left
      for (const line of pdf.linesOf(text, width, style)) {
        flow.need(height)
        pdf.drawText(line, { ...style, align: 'left', x: style.align ? x - aligned(line, style) : x, y: flow.y, width: width + 1 })
        flow.y += height
      }
    },
    keyValues(rows, termWidth = width / 3) {
      for (const [term, value] of rows) {
        const box = { width: width - termWidth, weight: 500 as const }
        flow.need(Math.min(Math.max(pdf.heightOf(value, box), 12.8) + 6, bottom() - margins.top))
        const top = flow.y + 3
        const below = pdf.drawText(term, { x: left, y: top, width: termWidth - 10, colour: PALETTE.inkSoft })
        flow.y = Math.max(below, pdf.drawText(value, { ...box, x: left + termWidth, y: top })) + 3
        flow.rule()
      }
    },
    table(columns, rows, size = DEFAULT_SIZE) {
      const headingSize = Math.min(8, size)
      const shares = columns.reduce((sum, column) => sum + column.share, 0)
      let x = left
      const placed = columns.map((column) => {
        const here = { ...column, x, inner: width * column.share / shares - GUTTER }
        x += width * column.share / shares
        return here
      })
      const head = () => {
        const height = Math.max(...placed.map(column => pdf.heightOf(column.heading, { width: column.inner, size: headingSize, weight: 600 })))
        for (const column of placed) {
          pdf.drawText(column.heading, { x: column.x, y: flow.y + 3, width: column.inner, size: headingSize, weight: 600, colour: PALETTE.inkSoft, align: column.align })
        }
        flow.y += height + 6
        flow.rule(PALETTE.lineStrong)
      }
      flow.need(44)
      head()
      for (const row of rows) {
        const cells = placed.map((column, index) => ({ column, ...styled(row[index] ?? '') }))
        const height = Math.max(...cells.map(({ column, text, weight }) => pdf.heightOf(text, { width: column.inner, size, weight: weight ?? column.weight }))) + 6
        if (flow.y + height > bottom()) {
          doc.addPage()
          flow.y = margins.top
          head()
        }
        for (const { column, text, weight, colour } of cells) {
          pdf.drawText(text, { x: column.x, y: flow.y + 3, width: column.inner, size, align: column.align, weight: weight ?? column.weight, colour })
        }
        flow.y += height
        flow.rule()
      }
    },
    footer(words) {
      const { start, count } = doc.bufferedPageRange()
      for (let page = start; page < start + count; page++) {
        doc.switchToPage(page)
        const y = doc.page.height - margins.bottom + 14
        ruleAt(y - 4, PALETTE.line, 0.75)
        const style = { size: 7.5, colour: PALETTE.inkSoft }
        pdf.drawText(words, { ...style, x: left, y, width: width - 80, maxLines: 1 })
        pdf.drawText(`Page ${page - start + 1} of ${count}`, { ...style, x: left + width - 80, y, width: 80, align: 'right' })
      }
    },
  }

  function ruleAt(y: number, colour: string, thickness: number): void {
    doc.moveTo(left, y).lineTo(left + width, y).lineWidth(thickness).strokeColor(colour).stroke()
  }
  /** How far left of its anchor a line begins. */
  function aligned(line: string, style: TextStyle): number {
    return style.align === 'right' ? pdf.widthOf(line, style) : style.align === 'centre' ? pdf.widthOf(line, style) / 2 : 0
  }
  return flow
}

/** Between columns, points. */
const GUTTER = 8

const styled = (cell: Cell) => typeof cell === 'string' ? { text: cell, weight: undefined, colour: undefined } : { weight: undefined, colour: undefined, ...cell }
