import { asc, inArray } from 'drizzle-orm'
import { bands, units } from '../../drizzle/schema'
import type { LabelContent, LabelDrawing, LeftOut } from '../../shared/domain/label-layout'
import { layOutLabel } from '../../shared/domain/label-layout'
import type { LabelSheet } from '../../shared/domain/label-stock'
import { findSheet, labelsPerSheet, sheetName } from '../../shared/domain/label-stock'
import { formatTag } from '../../shared/domain/tag'
import type { LabelQuery, LabelsPrinted } from '../../shared/schemas/labels'
import type { LabelSheetView } from '../../shared/types/label'
import type { BandView } from '../../shared/types/model'
import type { Database } from '../utils/db'
import { badRequest } from '../utils/errors'
import { encodeLabel, labelUrl } from '../utils/label-codes'
import type { Pdf } from '../utils/pdf'
import { loadFonts } from '../utils/pdf/fonts'
import { drawLabels, measureWith, openLabelPdf } from '../utils/pdf/labels'
import { drawable } from '../utils/pdf/runs'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import type { FoundThing } from './tagged-things'
import { findTagged } from './tagged-things'

interface Laid { tag: string, title: string, drawing: LabelDrawing }

/**
 * The PDF of a run of labels, each tag `copies` times, from the place `start` on. `base` is the address that the codes
 * point to. 404 naming a tag that stands for nothing; 400 if the sheet's labels are too small, saying the size needed.
 */
export async function makeLabelPdf(db: Database, query: LabelQuery, base: string): Promise<Buffer> {
  const sheet = sheetOf(query.sheet)
  const pdf = await openLabelPdf(sheet, `Labels: ${sheetName(sheet)}`)
  const labels = await layOutAll(db, query, base, sheet, pdf)
  drawLabels(pdf, sheet, query.start - 1, labels.flatMap(({ drawing }) => Array.from({ length: query.copies }, () => drawing)))
  return pdf.finish()
}

/** The first sheet of the same run for the screen, drawn by the same layout. */
export async function viewLabelSheet(db: Database, query: LabelQuery, base: string): Promise<LabelSheetView> {
  const sheet = sheetOf(query.sheet)
  const first = query.start - 1
  const free = labelsPerSheet(sheet) - first
  const labels = await layOutAll(db, query, base, sheet, await openLabelPdf(sheet, ''))
  const each = labels.flatMap(label => Array.from({ length: query.copies }, () => label))
  return {
    sheetKey: sheet.key,
    labelCount: each.length,
    pageCount: Math.ceil((first + each.length) / labelsPerSheet(sheet)),
    things: labels.map(({ tag, title }) => ({ tag, title })),
    labels: each.slice(0, free).map(({ tag, drawing }, index) => ({ tag, drawing, place: first + index })),
    leftOut: sayLeftOut(labels),
    pointsTo: new URL(base).host,
  }
}

/** Writes into the story of each unit that its label was printed. Other things have no story to write it in. */
export async function noteLabelsPrinted(db: Database, actor: Actor, { tags, sheet }: LabelsPrinted): Promise<{ noted: number }> {
  const name = sheetName(sheetOf(sheet))
  return db.transaction(async (tx) => {
    await findTagged(tx, tags)
    const rows = await tx.select({ id: units.id }).from(units).where(inArray(units.tag, tags)).orderBy(asc(units.tag)).for('share')
    for (const { id } of rows) await appendUnitLedger(tx, actor, id, 'label_printed', { sheet: name })
    return { noted: rows.length }
  })
}

function sheetOf(key: string): LabelSheet {
  const sheet = findSheet(key)
  if (!sheet) throw badRequest('no-such-sheet', 'There is no such sheet. Choose one from the list.')
  return sheet
}

async function layOutAll(db: Database, query: LabelQuery, base: string, sheet: LabelSheet, pdf: Pdf): Promise<Laid[]> {
  const things = await findTagged(db, query.tags)
  const bandsOf = await listBandsByModel(db, things)
  const measure = measureWith(pdf)
  const fonts = await loadFonts()
  return things.map((thing) => {
    const content: LabelContent = {
      tag: formatTag(thing.tag),
      title: drawable(thing.title, fonts[700]),
      subtitle: drawable(thing.subtitle, fonts[400]),
      bands: thing.unit && (bandsOf.get(thing.unit.modelId) ?? []),
      hazardHold: thing.unit !== null && thing.unit.hazardHold !== null,
      codes: encodeLabel(labelUrl(base, thing.tag), thing.tag),
    }
    const layout = layOutLabel(sheet, content, measure)
    if (!layout.ok) throw tooSmall(sheet, layout.needs)
    return { tag: thing.tag, title: thing.title, drawing: layout.drawing }
  })
}

const tooSmall = (sheet: LabelSheet, needs: { width: number, height: number }) => badRequest('label-too-small',
  `Labels of ${sheet.width} × ${sheet.height} mm are too small for a code that scans: they would need ${needs.width} × ${needs.height} mm. Choose a sheet with larger labels.`)

async function listBandsByModel(db: Database, things: readonly FoundThing[]): Promise<Map<string, BandView[]>> {
  const ids = [...new Set(things.flatMap(({ unit }) => unit ? [unit.modelId] : []))]
  const byModel = new Map<string, BandView[]>()
  if (ids.length === 0) return byModel
  const rows = await db.select().from(bands).where(inArray(bands.modelId, ids)).orderBy(asc(bands.modelId), asc(bands.position))
  for (const { modelId, label, function: does, lowerHz, upperHz, dialTolerancePercent } of rows) {
    byModel.set(modelId, [...byModel.get(modelId) ?? [], { label, function: does, lowerHz, upperHz, dialTolerancePercent }])
  }
  return byModel
}

const LEFT_OUT_WORDS: readonly (readonly [part: LeftOut, words: string])[] = [
  ['title', 'the name'], ['subtitle', 'the second line'], ['coverage', 'the coverage strip'],
  ['bars', 'the bars (a hand scanner that reads no QR codes will not read them)'],
]

function sayLeftOut(labels: readonly Laid[]): string | null {
  const missing = new Set(labels.flatMap(({ drawing }) => drawing.leftOut))
  const words = LEFT_OUT_WORDS.filter(([part]) => missing.has(part)).map(([, says]) => says)
  const last = words.pop()
  if (last === undefined) return null
  return `Labels of this size have no room for ${words.length > 0 ? `${words.join(', ')} and ` : ''}${last}.`
}
