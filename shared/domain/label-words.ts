/** The words of a label, in the box left for them: tag, hazard hold, title, subtitle and coverage, in that order of need. */
import type { LabelContent, LabelInk, LabelMark, LabelWeight, LeftOut, MeasureText } from './label-layout'
import type { Rect } from './label-symbols'
import { groupByFunction, layBars, rulerFor } from './ruler-layout'

/** Ems: height of a line, and its baseline from its top. */
const LINE = 1.14
const BASELINE = 0.86
/** The tag's figures have no descenders, so that its line is lower. */
const TAG_LINE = 0.86
const TAG_BASELINE = 0.76
const TAG_MOST = 9
const TITLE_LINES = 2
const SUBTITLE_LINES = 3
/** Smallest print of the words beside the tag, about 5½ points. */
const SMALLEST = 1.95
const HOLD_WORDS = ['HAZARD HOLD · DO NOT POWER', 'HAZARD HOLD', 'HOLD'] as const

interface Cursor { x: number, y: number, width: number, bottom: number, marks: LabelMark[], leftOut: LeftOut[] }

/** Draws the words of `content` in `box`; what has no room is named. */
export function drawWords(box: Rect, content: LabelContent, measure: MeasureText): { marks: LabelMark[], leftOut: LeftOut[] } {
  const [x, y, width, height] = box
  const cursor: Cursor = { x, y, width, bottom: y + height, marks: [], leftOut: [] }
  drawTag(cursor, content.tag, height, measure)
  if (content.hazardHold) drawHold(cursor, height, measure)
  const most = Math.min(Math.max(height * 0.17, SMALLEST), 5.6)
  if (content.title !== '') drawTitle(cursor, content.title, most, measure)
  if (content.subtitle !== '' && !drawLines(cursor, content.subtitle, SUBTITLE_LINES, Math.max(most * 0.78, SMALLEST), 400, 'soft', measure)) cursor.leftOut.push('subtitle')
  if (content.bands !== null && content.bands.length > 0 && !drawCoverage(cursor, content.bands, measure)) cursor.leftOut.push('coverage')
  return { marks: cursor.marks, leftOut: cursor.leftOut }
}

function drawTag(cursor: Cursor, tag: string, height: number, measure: MeasureText): void {
  const size = Math.min(cursor.width / measure(tag, 700, 1), height * 0.42, TAG_MOST)
  cursor.marks.push({ kind: 'text', ink: 'black', weight: 700, x: cursor.x, y: cursor.y + size * TAG_BASELINE, size, width: measure(tag, 700, size), text: tag })
  cursor.y += size * TAG_LINE + height * 0.02
}

/** A dark band with a warning triangle: words and shape, never colour alone. */
function drawHold(cursor: Cursor, height: number, measure: MeasureText): void {
  const band = Math.min(Math.max(height * 0.2, 2.8), 5.5)
  const { x, width } = cursor
  const y = cursor.y + 0.3
  const triangle = band * 0.86
  const room = width - triangle - 1.4
  const fits = (words: string) => Math.min(band * 0.62, room / measure(words, 700, 1))
  const words = HOLD_WORDS.find(each => fits(each) >= 1.7) ?? HOLD_WORDS[2]
  const size = fits(words)
  const middle = y + band / 2
  const tip = x + 0.6 + triangle / 2
  const top = middle - triangle * 0.4
  cursor.marks.push(
    { kind: 'rects', ink: 'fault', rects: [[x, y, width, band]] },
    { kind: 'shape', ink: 'white', points: [[tip, top], [tip + triangle / 2, top + triangle * 0.82], [tip - triangle / 2, top + triangle * 0.82]] },
    { kind: 'rects', ink: 'fault', rects: [[tip - band * 0.045, top + triangle * 0.28, band * 0.09, triangle * 0.28], [tip - band * 0.045, top + triangle * 0.63, band * 0.09, band * 0.09]] },
    { kind: 'text', ink: 'white', weight: 700, x: x + triangle + 1, y: middle + size * 0.34, size, width: measure(words, 700, size), text: words },
  )
  cursor.y = y + band + 0.2
}

/** Maker and type: shrunk to fit one line, else on two, else cut with an ellipsis. */
function drawTitle(cursor: Cursor, title: string, most: number, measure: MeasureText): void {
  const natural = cursor.width / measure(title, 700, 1)
  const size = natural >= Math.max(most * 0.72, SMALLEST) ? Math.min(most, natural) : Math.max(most * 0.8, SMALLEST)
  if (!drawLines(cursor, title, TITLE_LINES, size, 700, 'black', measure) && !drawLines(cursor, title, 1, SMALLEST, 700, 'black', measure)) cursor.leftOut.push('title')
}

/** Text on as many lines as it needs and the box holds, `most` at most; the last is cut. False where not one line fits. */
function drawLines(cursor: Cursor, text: string, most: number, size: number, weight: LabelWeight, ink: LabelInk, measure: MeasureText): boolean {
  const lines = Math.min(most, Math.floor((cursor.bottom - cursor.y + 0.01) / (size * LINE)))
  if (lines < 1) return false
  let rest = text
  for (let line = 1; rest !== ''; line++) {
    const [first, after] = line < lines ? splitToFit(rest, cursor.width, part => measure(part, weight, size)) : [rest, '']
    // A word longer than the line is cut there, on a line of its own.
    const here = first === '' ? rest : first
    drawLine(cursor, here, size, weight, ink, measure)
    rest = first === '' ? '' : after
  }
  return true
}

/** As many whole words as fit, and the rest. */
function splitToFit(text: string, width: number, measure: (text: string) => number): [first: string, rest: string] {
  const words = text.split(' ')
  let kept = 0
  while (kept < words.length && measure(words.slice(0, kept + 1).join(' ')) <= width + 1e-6) kept++
  return [words.slice(0, kept).join(' '), words.slice(kept).join(' ')]
}

/** One line, cut with an ellipsis where it is longer than the box. */
function drawLine(cursor: Cursor, text: string, size: number, weight: LabelWeight, ink: LabelInk, measure: MeasureText): void {
  const shown = cutToFit(text, cursor.width, part => measure(part, weight, size))
  cursor.marks.push({ kind: 'text', ink, weight, x: cursor.x, y: cursor.y + size * BASELINE, size, width: measure(shown, weight, size), text: shown })
  cursor.y += size * LINE
}

/** The longest beginning of `text` that fits with an ellipsis; the whole text where that fits. */
export function cutToFit(text: string, width: number, measure: (text: string) => number): string {
  if (measure(text) <= width + 1e-6) return text
  const characters = Array.from(new Intl.Segmenter('en', { granularity: 'grapheme' }).segment(text), part => part.segment)
  let low = 0
  let high = characters.length
  while (low < high) {
    const middle = Math.ceil((low + high) / 2)
    if (measure(`${characters.slice(0, middle).join('').trimEnd()}…`) <= width) low = middle
    else high = middle - 1
  }
  return `${characters.slice(0, low).join('').trimEnd()}…`
}

/** The coverage strip: the bands' bars over an axis of decades, thousands named. False where there is no room. */
function drawCoverage(cursor: Cursor, bands: NonNullable<LabelContent['bands']>, measure: MeasureText): boolean {
  const groups = groupByFunction(bands)
  const row = Math.min(Math.max(cursor.width * 0.02, 0.75), 1.4) * (groups.length > 1 ? 0.75 : 1)
  const words = 1.7
  const height = groups.length * row * 2 + 0.5
  const left = cursor.bottom - cursor.y - 0.5
  if (left < height) return false
  const named = left >= height + words + 0.5
  const scale = rulerFor(bands)
  const { x, width } = cursor
  // At the foot of the box, where the eye finds it on every label of a sheet.
  const axis = cursor.bottom - (named ? words + 0.4 : 0.1)
  const top = axis - height
  const rects: Rect[] = groups.flatMap((group, index) => layBars(group.bands, scale).map((bar): Rect => {
    const wide = Math.max((bar.to - bar.from) * width, 0.4)
    const at = Math.min(x + bar.from * width, x + width - wide)
    return [at, top + (index * 2 + bar.row) * row, wide, row]
  }))
  cursor.marks.push(
    { kind: 'rects', ink: 'soft', rects: [[x, axis - 0.12, width, 0.12], ...scale.decades.map((tick): Rect => [Math.min(x + tick.at * width, x + width - 0.12), axis - 0.6, 0.12, 0.6])] },
    { kind: 'rects', ink: 'enamel', rects },
  )
  if (named) drawDecades(cursor, axis, words, scale.decades, measure)
  cursor.y = cursor.bottom
  return true
}

function drawDecades(cursor: Cursor, axis: number, size: number, decades: readonly { hz: number, at: number, label: string | null }[], measure: MeasureText): void {
  for (const tick of decades) {
    const label = tick.label
    if (label === null || ![1e3, 1e6, 1e9].includes(tick.hz)) continue
    const width = measure(label, 400, size)
    const x = Math.min(Math.max(cursor.x + tick.at * cursor.width - width / 2, cursor.x), cursor.x + cursor.width - width)
    cursor.marks.push({ kind: 'text', ink: 'soft', weight: 400, x, y: axis + size * 0.95, size, width, text: label })
  }
}
