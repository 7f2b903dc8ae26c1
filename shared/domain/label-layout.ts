/**
 * Where everything stands on one label. Millimetres from the label's upper left corner; pure, so that the sheet on the
 * screen and the one on paper are the same drawing.
 *
 * Three boxes that never overlap: the QR code with its quiet zone, the bars with theirs, and the words.
 */
import type { CoverageBand } from './coverage'
import { drawWords } from './label-words'
import type { BarSymbol, LabelCodes, QrLevel, QrSymbol, Rect } from './label-symbols'
import {
  BAR_MODULE_GOOD, BAR_MODULE_LEAST, BAR_QUIET, fitQr, leastBarHeight, leastQrSpace, moduleWithin, QR_MODULE_GOOD, QR_MODULE_LEAST, QR_QUIET,
} from './label-symbols'

export type LabelInk = 'black' | 'soft' | 'fault' | 'white' | 'enamel'
export type LabelWeight = 400 | 700

/** One thing drawn. Rectangles of one mark are filled as a single shape. */
export type LabelMark
  = | { kind: 'rects', ink: LabelInk, rects: readonly Rect[] }
    | { kind: 'shape', ink: LabelInk, points: readonly (readonly [x: number, y: number])[] }
    /** One line of text from `x`, on its baseline `y`, `size` mm to the em, `width` mm long. */
    | { kind: 'text', ink: LabelInk, weight: LabelWeight, x: number, y: number, size: number, width: number, text: string }

/** Width in mm of a line of text, `size` mm to the em. */
export type MeasureText = (text: string, weight: LabelWeight, size: number) => number

/** What one label says. */
export interface LabelContent {
  /** As shown: `U 000001 6`. */
  tag: string
  /** Maker and type; a place's name; what an item is. */
  title: string
  /** A second, smaller line; may be empty. */
  subtitle: string
  /** What it covers; null where that has no meaning. */
  bands: readonly (CoverageBand & { label: string })[] | null
  hazardHold: boolean
  codes: LabelCodes
}

export type LeftOut = 'bars' | 'title' | 'subtitle' | 'coverage'

export interface LabelDrawing {
  width: number
  height: number
  marks: readonly LabelMark[]
  /** The QR code with its quiet zone. */
  qr: { zone: Rect, module: number, level: QrLevel }
  /** The bars with their quiet zones; null where there is no room for them. */
  bars: { zone: Rect, module: number } | null
  /** What this size has no room for. */
  leftOut: readonly LeftOut[]
}

export type LabelLayout
  = | { ok: true, drawing: LabelDrawing }
    /** Too small for the QR code and the tag: the least size that would do, in mm. */
    | { ok: false, needs: { width: number, height: number } }

/** Left blank along every edge, for printers that are a little off. */
export const LABEL_MARGIN = 1
/** The QR code takes no more of the width than this, so that words have room. */
const QR_SHARE = 0.4
/** Narrowest and lowest box that words are put in. */
const WORDS_LEAST = { width: 14, height: 5 }
const BAR_HEIGHT_MOST = 14

interface Plan { qr: { symbol: QrSymbol, module: number }, bars: { module: number, x: number, y: number, height: number } | null, words: Rect }

/** Lays out one label of `width` × `height` mm. */
export function layOutLabel(size: { width: number, height: number }, content: LabelContent, measure: MeasureText): LabelLayout {
  const inner = { width: size.width - 2 * LABEL_MARGIN, height: size.height - 2 * LABEL_MARGIN }
  const { qr, bars } = content.codes
  const plan = planBeside(inner, qr, bars, true) ?? planBeneath(inner, qr, bars, true)
    ?? planBeside(inner, qr, bars, false) ?? planBeneath(inner, qr, bars, false) ?? planWithoutBars(inner, qr)
  if (!plan) return { ok: false, needs: leastSize(qr) }
  const words = drawWords(plan.words, content, measure)
  const side = plan.qr.symbol.side * plan.qr.module
  const quiet = QR_QUIET * plan.qr.module
  const at = LABEL_MARGIN + quiet
  const marks: LabelMark[] = [
    { kind: 'rects', ink: 'black', rects: plan.qr.symbol.dark.map(([x, y, w, h]) => [at + x * plan.qr.module, at + y * plan.qr.module, w * plan.qr.module, h * plan.qr.module]) },
    ...plan.bars ? [drawBars(bars, plan.bars)] : [],
    ...words.marks,
  ]
  return {
    ok: true,
    drawing: {
      width: size.width,
      height: size.height,
      marks,
      qr: { zone: [LABEL_MARGIN, LABEL_MARGIN, side + 2 * quiet, side + 2 * quiet], module: plan.qr.module, level: plan.qr.symbol.level },
      bars: plan.bars && {
        zone: [plan.bars.x - BAR_QUIET * plan.bars.module, plan.bars.y, (bars.length + 2 * BAR_QUIET) * plan.bars.module, plan.bars.height],
        module: plan.bars.module,
      },
      leftOut: [...plan.bars ? [] : ['bars' as const], ...words.leftOut],
    },
  }
}

function drawBars(symbol: BarSymbol, placed: { module: number, x: number, y: number, height: number }): LabelMark {
  const { module, x, y, height } = placed
  return { kind: 'rects', ink: 'black', rects: symbol.bars.map(([at, width]) => [x + at * module, y, width * module, height]) }
}

/** QR at the left, bars at the foot of the words beside it. The two quiet zones may share blank paper. */
function planBeside(inner: { width: number, height: number }, qr: readonly QrSymbol[], bars: BarSymbol, good: boolean): Plan | null {
  const least = good ? BAR_MODULE_GOOD : BAR_MODULE_LEAST
  const span = bars.length + 2 * BAR_QUIET
  const space = Math.min(inner.height, good ? inner.width * QR_SHARE : inner.width - span * least)
  const fitted = fitQr(qr, space, good ? QR_MODULE_GOOD : QR_MODULE_LEAST)
  if (!fitted) return null
  const box = (fitted.symbol.side + 2 * QR_QUIET) * fitted.module
  const inkRight = LABEL_MARGIN + box - QR_QUIET * fitted.module
  const right = LABEL_MARGIN + inner.width
  const widest = Math.min((right - inkRight) / span, (inner.width - box) / (bars.length + BAR_QUIET))
  const module = moduleWithin(widest, least)
  if (module === null) return null
  const height = Math.min(Math.max(leastBarHeight(bars, module), inner.height * 0.28), BAR_HEIGHT_MOST)
  const words: Rect = [LABEL_MARGIN + box, LABEL_MARGIN, inner.width - box, inner.height - height - 1]
  if (tooSmallForWords(words)) return null
  return { qr: fitted, bars: { module, x: Math.max(LABEL_MARGIN + box, inkRight + BAR_QUIET * module), y: LABEL_MARGIN + inner.height - height, height }, words }
}

/** Bars along the whole width beneath QR and words. */
function planBeneath(inner: { width: number, height: number }, qr: readonly QrSymbol[], bars: BarSymbol, good: boolean): Plan | null {
  const span = bars.length + 2 * BAR_QUIET
  const widest = moduleWithin(Math.min(inner.width / span, 0.4), good ? BAR_MODULE_GOOD : BAR_MODULE_LEAST)
  if (widest === null) return null
  const height = leastBarHeight(bars, widest)
  const fitted = fitQr(qr, Math.min(inner.height - height - 0.2, inner.width - WORDS_LEAST.width), good ? QR_MODULE_GOOD : QR_MODULE_LEAST)
  if (!fitted) return null
  const box = (fitted.symbol.side + 2 * QR_QUIET) * fitted.module
  const words: Rect = [LABEL_MARGIN + box, LABEL_MARGIN, inner.width - box, inner.height - height - 1]
  if (tooSmallForWords(words)) return null
  return {
    qr: fitted,
    bars: { module: widest, x: LABEL_MARGIN + (inner.width - bars.length * widest) / 2, y: LABEL_MARGIN + inner.height - height, height },
    words,
  }
}

function planWithoutBars(inner: { width: number, height: number }, qr: readonly QrSymbol[]): Plan | null {
  const fitted = fitQr(qr, Math.min(inner.height, inner.width - WORDS_LEAST.width), QR_MODULE_LEAST)
  if (!fitted) return null
  const box = (fitted.symbol.side + 2 * QR_QUIET) * fitted.module
  return { qr: fitted, bars: null, words: [LABEL_MARGIN + box, LABEL_MARGIN, inner.width - box, inner.height] }
}

function tooSmallForWords([, , width, height]: Rect): boolean {
  return width < WORDS_LEAST.width || height < WORDS_LEAST.height
}

/** The least label for QR and tag. */
function leastSize(qr: readonly QrSymbol[]): { width: number, height: number } {
  const space = leastQrSpace(qr)
  const up = (length: number) => Math.ceil(length * 10 - 1e-6) / 10
  return { width: up(space + WORDS_LEAST.width + 2 * LABEL_MARGIN), height: up(space + 2 * LABEL_MARGIN) }
}
