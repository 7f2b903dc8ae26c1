import { and, asc, eq, sql } from 'drizzle-orm'
import { ledger, models, shop } from '../../drizzle/schema'
import { correctionCard } from '../../shared/domain/correction-card'
import { EQUIPMENT_KIND_LABELS } from '../../shared/domain/equipment-kinds'
import { factInWords } from '../../shared/domain/knowledge'
import { formatTag } from '../../shared/domain/tag'
import type { ReportIssue } from '../../shared/domain/test-report'
import { makeTestReport } from '../../shared/domain/test-report'
import type { TestSheetView } from '../../shared/types/bench'
import type { Database } from '../utils/db'
import { conflict } from '../utils/errors'
import { printCorrectionCard } from '../utils/pdf/correction-card'
import { printTestReport } from '../utils/pdf/test-report'
import { getTestSheet } from './test-sheets'
import { getUnitRow } from './unit-lock'

interface SheetAddress { tag: string, number: number }

async function gather(db: Database, { tag, number }: SheetAddress) {
  const unit = await getUnitRow(db, tag)
  const sheet = await getTestSheet(db, { tag, number })
  if (sheet.signedAt === null) throw conflict('sheet-open', `Test sheet ${number} is still open. Sign it first: a report stands on what was signed.`)
  const [model] = await db.select().from(models).where(eq(models.id, unit.modelId))
  const [settings] = await db.select({ name: shop.name, address: shop.address, timeZone: shop.timeZone }).from(shop)
  if (!model || !settings) throw new Error('A unit without its model, or a shop that is not open')
  return { unit, sheet, signedAt: sheet.signedAt, model, settings }
}

/** Which issue of its report a signed sheet stands for: it was given out once, and again each time it was opened and signed anew. */
async function issueOf(db: Database, unitId: string, number: number): Promise<ReportIssue> {
  const reopened = await db.select({ details: ledger.details }).from(ledger)
    .where(and(eq(ledger.unitId, unitId), eq(ledger.event, 'sheet_reopened'), sql`(${ledger.details} ->> 'sheetNumber')::int = ${number}`)).orderBy(asc(ledger.id))
  const why = reopened.at(-1)?.details.why
  return { number: reopened.length + 1, because: typeof why === 'string' ? why : null }
}

const inWords = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', year: 'numeric', timeZone: 'UTC' })
const day = (iso: string) => inWords.format(new Date(`${iso.slice(0, 10)}T00:00:00Z`))
/** The day of an instant in the shop's zone, `2026-11-30`. */
const dayIn = (timeZone: string, instant: string) => new Intl.DateTimeFormat('en-CA', { timeZone, year: 'numeric', month: '2-digit', day: '2-digit' }).format(new Date(instant))

export interface PrintedSheet { bytes: Buffer, name: string }

/** The test report of a signed sheet as a PDF; 404 if there is no such sheet, 409 while it is open. */
export async function makeTestReportPdf(db: Database, address: SheetAddress): Promise<PrintedSheet> {
  const { unit, sheet, signedAt, model, settings } = await gather(db, address)
  const issue = await issueOf(db, unit.id, sheet.number)
  const report = makeTestReport({
    shop: { name: settings.name, address: settings.address },
    tag: unit.tag,
    maker: model.maker,
    designation: model.designation,
    kind: EQUIPMENT_KIND_LABELS[model.kind],
    serial: { answer: unit.serialAnswer, text: unit.serial },
    condition: unit.conditionNotes,
    receivedOn: unit.acquiredOn,
    issuedOn: dayIn(settings.timeZone, signedAt),
    ownership: unit.ownership,
    issue,
    sheet,
  }, day)
  return { bytes: await printTestReport(report, sheet, settings.name), name: `test-report-${unit.tag}-T${sheet.number}${issue.number > 1 ? `-issue-${issue.number}` : ''}.pdf` }
}

function refuseWithoutDial(sheet: TestSheetView, bands: ReturnType<typeof correctionCard>): void {
  if (bands.length === 0) throw conflict('no-dial', `Test sheet ${sheet.number} has no dial reading, so there is nothing to correct.`)
}

/** Those instruments of a sheet that took its dial readings, in words. */
function dialInstruments({ readings, instrumentList }: TestSheetView): string[] {
  const ids = new Set(readings.flatMap(reading => reading.section === 'dial' ? (reading.left ?? reading.found)?.result.instrumentId ?? [] : []))
  return instrumentList.filter(({ id }) => ids.has(id)).map(({ name, tag }) => `${name} (${formatTag(tag)})`)
}

/** The dial correction card of a signed sheet as a PDF; 409 while it is open, or where no dial was read. */
export async function makeCorrectionCardPdf(db: Database, address: SheetAddress): Promise<PrintedSheet> {
  const { unit, sheet, model, settings } = await gather(db, address)
  const bands = correctionCard(sheet.readings)
  refuseWithoutDial(sheet, bands)
  const { answer, text } = { answer: unit.serialAnswer, text: unit.serial }
  const bytes = await printCorrectionCard({
    shopName: settings.name, unitName: `${model.maker} ${model.designation}`, tag: formatTag(unit.tag), serial: answer === 'known' ? factInWords(answer, text) : '', testedOn: day(sheet.testedOn),
    warmUpMinutes: sheet.warmUpMinutes, instruments: dialInstruments(sheet), warnings: [...sheet.staleBecause ? [sheet.staleBecause] : [], ...sheet.instrumentWarnings],
  }, bands)
  return { bytes, name: `dial-corrections-${unit.tag}-T${sheet.number}.pdf` }
}
