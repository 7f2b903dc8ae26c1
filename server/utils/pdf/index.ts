/**
 * The product's one way to make a PDF. `createPdf` gives a canvas whose text is drawn in the product's own faces, run
 * by run, so that Ω √ ≥ → µ and Greek never show as boxes; `flow.ts` lays headings, tables and paragraphs on it.
 * Lengths are PDF points; `mm()` makes points of millimetres. Colours come from `PALETTE`.
 */
import PDFDocument from 'pdfkit'
import type { FontWeight, PdfFonts } from './fonts'
import { loadFonts } from './fonts'
import { PALETTE } from './palette'
import { drawable, runsOf } from './runs'

export interface PdfOptions {
  /** "A4", or width and height in points. */
  size?: 'A4' | [number, number]
  /** Points; one number for all four sides. */
  margins?: number | { top: number, right: number, bottom: number, left: number }
  /** What a reader's window is titled. */
  title: string
  author?: string
  /** What the file says it was made at; now unless told. */
  madeAt?: Date
}

export interface TextStyle {
  /** Points; 9.5 unless told. */
  size?: number
  weight?: FontWeight
  colour?: string
  align?: 'left' | 'right' | 'centre'
  /** Extra points between letters. */
  tracking?: number
  /** Figures all of one width, for columns; on unless told. */
  tabular?: boolean
}

export interface TextBox extends TextStyle {
  x: number
  /** Top of the first line. */
  y: number
  width: number
  /** As a multiple of the size; 1.35 unless told. */
  leading?: number
  /** What is beyond is cut, with an ellipsis. */
  maxLines?: number
}

export interface Pdf {
  /** pdfkit's own document, for shapes and pictures. Draw text only by the functions here. */
  doc: PDFKit.PDFDocument
  margins: { top: number, right: number, bottom: number, left: number }
  /** Width of one line, in points. */
  widthOf: (text: string, style?: TextStyle) => number
  /** The lines that text breaks into within a width: at spaces and line breaks, never inside a figure and its unit. */
  linesOf: (text: string, width: number, style?: TextStyle) => string[]
  /** One line with its baseline at `baseline`; `x` is its left, right or middle by `align`. Gives the width drawn. */
  drawLine: (text: string, x: number, baseline: number, style?: TextStyle) => number
  /** Wrapped text in a box. Gives the y beneath its last line. */
  drawText: (text: string, box: TextBox) => number
  /** Height that `drawText` would take. */
  heightOf: (text: string, box: Omit<TextBox, 'x' | 'y'>) => number
  /** Ends the document and gives its bytes. */
  finish: () => Promise<Buffer>
}

export const DEFAULT_SIZE = 9.5
export const DEFAULT_LEADING = 1.35
/** From the top of a line to its baseline, in ems of Work Sans with the leading shared above and below. */
const baselineIn = (leading: number) => (leading - 1.173) / 2 + 0.93

/** Reads the fonts (once a process) and opens a document with its first page. */
export async function createPdf(options: PdfOptions): Promise<Pdf> {
  const fonts = await loadFonts()
  const margins = typeof options.margins === 'object'
    ? options.margins
    : { top: options.margins ?? 48, right: options.margins ?? 48, bottom: options.margins ?? 48, left: options.margins ?? 48 }
  const doc = new PDFDocument({
    size: options.size ?? 'A4', margins, bufferPages: true, autoFirstPage: false, lang: 'en-GB', displayTitle: true, pdfVersion: '1.7', compress: true,
    info: { Title: options.title, Author: options.author ?? '', Creator: 'Knurl', Producer: 'Knurl', ...options.madeAt ? { CreationDate: options.madeAt } : {} },
  })
  const bytes = collect(doc)
  for (const face of new Set(Object.values(fonts).flat())) doc.registerFont(face.name, Buffer.from(face.bytes))
  doc.addPage()
  return {
    doc,
    margins,
    ...textTools(doc, fonts),
    finish: () => {
      doc.end()
      return bytes
    },
  }
}

function collect(doc: PDFKit.PDFDocument): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    const chunks: Buffer[] = []
    doc.on('data', (chunk: Buffer) => chunks.push(chunk))
    doc.on('end', () => resolve(Buffer.concat(chunks)))
    doc.on('error', reject)
  })
}

function textTools(doc: PDFKit.PDFDocument, fonts: PdfFonts): Pick<Pdf, 'widthOf' | 'linesOf' | 'drawLine' | 'drawText' | 'heightOf'> {
  const optionsOf = (style: TextStyle) => ({
    lineBreak: false, characterSpacing: style.tracking ?? 0, features: style.tabular === false ? [] : ['tnum' as const],
  })

  /** Width of text already made drawable. */
  function measure(text: string, style: TextStyle): number {
    return runsOf(text, fonts[style.weight ?? 400]).reduce((sum, run) =>
      sum + doc.font(run.face.name, style.size ?? DEFAULT_SIZE).widthOfString(run.text, optionsOf(style)), 0)
  }
  const prepared = (text: string, style: TextStyle) => drawable(text, fonts[style.weight ?? 400])
  const widthOf = (text: string, style: TextStyle = {}) => measure(prepared(text, style), style)

  function linesOf(text: string, width: number, style: TextStyle = {}): string[] {
    return text.split(/\r\n?|\n/u).flatMap(paragraph => wrap(prepared(paragraph, style), width, part => measure(part, style)))
  }

  function drawLine(text: string, x: number, baseline: number, style: TextStyle = {}): number {
    const line = prepared(text, style)
    const width = measure(line, style)
    let at = style.align === 'right' ? x - width : style.align === 'centre' ? x - width / 2 : x
    doc.fillColor(style.colour ?? PALETTE.ink)
    for (const run of runsOf(line, fonts[style.weight ?? 400])) {
      doc.font(run.face.name, style.size ?? DEFAULT_SIZE)
      doc.text(run.text, at, baseline, { ...optionsOf(style), baseline: 'alphabetic' })
      at += doc.widthOfString(run.text, optionsOf(style))
    }
    return width
  }

  function fitted(text: string, box: Omit<TextBox, 'x' | 'y'>): string[] {
    const lines = linesOf(text, box.width, box)
    if (box.maxLines === undefined || lines.length <= box.maxLines) return lines
    const kept = lines.slice(0, box.maxLines)
    let last = kept.pop() ?? ''
    while (last !== '' && measure(`${last}…`, box) > box.width) last = last.slice(0, -1).trimEnd()
    return [...kept, `${last}…`]
  }

  const lineHeight = (box: Omit<TextBox, 'x' | 'y'>) => (box.size ?? DEFAULT_SIZE) * (box.leading ?? DEFAULT_LEADING)

  function drawText(text: string, box: TextBox): number {
    const lines = fitted(text, box)
    const x = box.align === 'right' ? box.x + box.width : box.align === 'centre' ? box.x + box.width / 2 : box.x
    const first = box.y + baselineIn(box.leading ?? DEFAULT_LEADING) * (box.size ?? DEFAULT_SIZE)
    lines.forEach((line, index) => drawLine(line, x, first + index * lineHeight(box), box))
    return box.y + lines.length * lineHeight(box)
  }

  return { widthOf, linesOf, drawLine, drawText, heightOf: (text, box) => fitted(text, box).length * lineHeight(box) }
}

/** Breaks one paragraph at its ordinary spaces; a word wider than the line is cut where it must be. */
function wrap(text: string, width: number, measure: (text: string) => number): string[] {
  const lines: string[] = []
  let line = ''
  for (const word of text.split(' ')) {
    const longer = line === '' ? word : `${line} ${word}`
    if (measure(longer) <= width) {
      line = longer
      continue
    }
    if (line !== '') lines.push(line)
    const pieces = measure(word) <= width ? [word] : cut(word, width, measure)
    lines.push(...pieces.slice(0, -1))
    line = pieces.at(-1) ?? ''
  }
  return [...lines, line]
}

function cut(word: string, width: number, measure: (text: string) => number): string[] {
  const pieces: string[] = []
  let piece = ''
  for (const character of word) {
    if (piece !== '' && measure(piece + character) > width) {
      pieces.push(piece)
      piece = ''
    }
    piece += character
  }
  return [...pieces, piece]
}
