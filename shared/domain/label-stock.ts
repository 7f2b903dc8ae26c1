/**
 * Sheets of labels, by their dimensions only. All lengths in millimetres, from the sheet's upper left corner.
 */

/** One kind of sheet. */
export interface LabelSheet {
  /** Stays the same for ever: bookmarks and scripts name a sheet by it. */
  key: string
  paper: 'A4' | 'US Letter'
  /** Of the paper. */
  paperWidth: number
  paperHeight: number
  columns: number
  rows: number
  /** Of one label. */
  width: number
  height: number
  /** Of the first label. */
  left: number
  top: number
  /** From one label's left (top) edge to the next one's. */
  pitchX: number
  pitchY: number
}

type Row = readonly [columns: number, rows: number, width: number, height: number, left: number, top: number, pitchX: number, pitchY: number]

/** Geometry of sheets in common use, from an open data set of templates; checked against the page by test. */
const A4_ROWS: readonly Row[] = [
  [3, 8, 63.5, 33.9, 7.21, 12.9, 66.04, 33.9],
  [3, 7, 63.5, 38.1, 7.21, 15.15, 66.04, 38.1],
  [3, 8, 70, 37, 0, 0.5, 70, 37],
  [2, 4, 99.1, 67.7, 4.63, 13.1, 101.64, 67.7],
  [2, 5, 99.1, 57, 4.63, 6, 101.64, 57],
  [2, 7, 99.1, 38.1, 4.63, 15.15, 101.64, 38.1],
  [2, 8, 99.1, 33.9, 4.63, 12.9, 101.64, 33.9],
  [4, 10, 48.5, 25.4, 8, 21.5, 48.5, 25.4],
  [4, 12, 45.7, 21.2, 9.7, 21.3, 48.3, 21.2],
  [5, 13, 38.1, 21.2, 4.75, 10.92, 40.6, 21.2],
  [5, 16, 35.6, 16.9, 11, 13, 38.1, 16.9],
]

const LETTER_ROWS: readonly Row[] = [
  [3, 10, 66.675, 25.4, 4.76, 12.7, 69.85, 25.4],
  [2, 5, 101.6, 50.8, 4.76, 12.7, 104.775, 50.8],
  [2, 7, 101.6, 33.87, 3.97, 21.17, 106.36, 33.87],
  [2, 10, 101.6, 25.4, 3.97, 12.7, 106.36, 25.4],
  [4, 10, 50.8, 25.4, 6.35, 12.7, 50.8, 25.4],
  [4, 15, 44.45, 16.92, 7.81, 12.83, 51.94, 16.92],
]

function toSheet(paper: LabelSheet['paper'], paperWidth: number, paperHeight: number, prefix: string, row: Row): LabelSheet {
  const [columns, rows, width, height, left, top, pitchX, pitchY] = row
  return {
    key: `${prefix}-${columns}x${rows}-${width}x${height}`,
    paper, paperWidth, paperHeight, columns, rows, width, height, left, top, pitchX, pitchY,
  }
}

/** Every sheet that Knurl prints on; the first is the usual one. */
export const LABEL_SHEETS: readonly LabelSheet[] = [
  ...A4_ROWS.map(row => toSheet('A4', 210, 297, 'a4', row)),
  ...LETTER_ROWS.map(row => toSheet('US Letter', 215.9, 279.4, 'letter', row)),
]

/** What is used until somebody chooses: A4, 3 × 8, 63.5 × 33.9 mm. */
export const DEFAULT_SHEET_KEY = 'a4-3x8-63.5x33.9'

/** The sheet with a key, or null. */
export function findSheet(key: string): LabelSheet | null {
  return LABEL_SHEETS.find(sheet => sheet.key === key) ?? null
}

/** How a sheet is named to people: "A4, 3 × 8, 63.5 × 33.9 mm". */
export function sheetName(sheet: LabelSheet): string {
  return `${sheet.paper}, ${sheet.columns} × ${sheet.rows}, ${sheet.width} × ${sheet.height} mm`
}

/** Labels on one sheet. */
export function labelsPerSheet(sheet: LabelSheet): number {
  return sheet.columns * sheet.rows
}

/** A label's place: which page (from 0) and the millimetres of its upper left corner on it. */
export interface LabelPosition { page: number, x: number, y: number }

/**
 * Where the label at `index` (from 0, counted along the rows) goes. An index past the first sheet goes on to the next.
 * Throws a RangeError for an index that is not a whole number from 0.
 */
export function labelPosition(sheet: LabelSheet, index: number): LabelPosition {
  if (!Number.isSafeInteger(index) || index < 0) throw new RangeError(`${index} is not a place on a sheet`)
  const each = labelsPerSheet(sheet)
  const place = index % each
  return {
    page: Math.floor(index / each),
    x: sheet.left + (place % sheet.columns) * sheet.pitchX,
    y: sheet.top + Math.floor(place / sheet.columns) * sheet.pitchY,
  }
}

/** Whether every label lies on the paper and none on another, as some published templates don't. `slack` in mm. */
export function sheetFits(sheet: Omit<LabelSheet, 'key' | 'paper'>, slack = 0.001): boolean {
  const right = sheet.left + (sheet.columns - 1) * sheet.pitchX + sheet.width
  const bottom = sheet.top + (sheet.rows - 1) * sheet.pitchY + sheet.height
  return sheet.left >= 0 && sheet.top >= 0
    && right <= sheet.paperWidth + slack && bottom <= sheet.paperHeight + slack
    && (sheet.columns === 1 || sheet.pitchX >= sheet.width - slack)
    && (sheet.rows === 1 || sheet.pitchY >= sheet.height - slack)
}
