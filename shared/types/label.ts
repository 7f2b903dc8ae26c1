import type { LabelDrawing } from '../domain/label-layout'

/** The first sheet of labels as it will print, with what to know about the rest. */
export interface LabelSheetView {
  sheetKey: string
  /** Labels in all, and the pages they fill. */
  labelCount: number
  pageCount: number
  /** Each tag once, in the order asked for. */
  things: { tag: string, title: string }[]
  /** Those on the first page, by rising place (from 0). */
  labels: { tag: string, place: number, drawing: LabelDrawing }[]
  /** What this size leaves off, in a sentence; null if nothing. */
  leftOut: string | null
  /** The address that the codes point to. */
  pointsTo: string
}
