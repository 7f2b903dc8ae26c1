import { and, asc, count, desc, eq, exists, gte, isNotNull, isNull, lte, max, not, or, sql } from 'drizzle-orm'
import { instrumentRecalls, instrumentRecallSheets, models, people, readings, testSheetInstruments, testSheets, units } from '../../drizzle/schema'
import { rejudge, RECALL_OUTCOME_LABELS } from '../../shared/domain/recall'
import { checkpointTitle } from '../../shared/domain/result-words'
import { formatTag } from '../../shared/domain/tag'
import type { UnitState } from '../../shared/domain/unit-state-names'
import type { DecidedRecallSheet, NewRecall } from '../../shared/schemas/recall'
import type { RecalledReading, RecalledSheet, RecallStart, RecallSummary, RecallView } from '../../shared/types/recall'
import type { Database } from '../utils/db'
import { conflict, invalid, notFound } from '../utils/errors'
import { certificateInForce, getInstrumentRecord } from './instruments'
import type { Actor } from './ledger'
import { appendLedger, appendUnitLedger } from './ledger'
import type { ReadingRow, SheetRow } from './sheet-results'
import { ruleOf, toCheckpoint } from './sheet-results'
import { todayInShop } from './shop-day'

type RecallRow = typeof instrumentRecalls.$inferSelect
const SOLD_STATES: readonly UnitState[] = ['sold', 'dispatched']
const noSuchRecall = () => notFound('There is no such recall of this instrument.', 'no-such-recall')

/** What the form starts from: the day of the certificate before the newest is suggested as the last good one; 404 without the instrument. */
export async function getRecallStart(db: Database, tag: string): Promise<RecallStart> {
  const record = await getInstrumentRecord(db, tag)
  const today = await todayInShop(db)
  const newest = certificateInForce(record, today)
  const standing = record.certificates.filter(({ id, withdrawnBecause }) => withdrawnBecause === null && id !== newest?.id)
  return { instrumentName: record.row.name, suggestedGoodOn: (standing.at(-1) ?? newest)?.calibratedOn ?? null, today }
}

/** The signed sheets that rest on an instrument between two days, both included: those with a reading put down to it, and those that name it without saying which readings it took. */
function restingOn(db: Database, instrumentId: string, { goodOn, foundOn, quantity }: Pick<NewRecall, 'goodOn' | 'foundOn' | 'quantity'>) {
  const taken = db.select({ one: sql`1` }).from(readings).where(and(
    eq(readings.sheetId, testSheets.id), eq(readings.instrumentId, instrumentId), quantity === null ? undefined : eq(readings.quantity, quantity)))
  const named = db.select({ one: sql`1` }).from(testSheetInstruments).where(and(eq(testSheetInstruments.sheetId, testSheets.id), eq(testSheetInstruments.instrumentId, instrumentId)))
  const anyTaken = db.select({ one: sql`1` }).from(readings).where(and(eq(readings.sheetId, testSheets.id), isNotNull(readings.instrumentId)))
  return and(
    isNotNull(testSheets.signedAt), lte(testSheets.testedOn, foundOn), goodOn === null ? undefined : gte(testSheets.testedOn, goodOn),
    or(exists(taken), and(exists(named), not(exists(anyTaken)))),
  )
}

/**
 * Recalls what an instrument measured since it was last known to be right: every signed sheet that rests on it, of units in stock
 * and sold alike, is put on the list to be decided. 422 for a day to come; a retired instrument can be recalled too.
 */
export async function startRecall(db: Database, actor: Actor, { tag, ...input }: NewRecall & { tag: string }): Promise<RecallView> {
  return db.transaction(async (tx) => {
    const { row: instrument } = await getInstrumentRecord(tx, tag)
    if (input.foundOn > await todayInShop(tx)) throw invalid([{ path: 'foundOn', message: 'Day it was found wrong must be today or in the past' }])
    const [last] = await tx.select({ number: max(instrumentRecalls.number) }).from(instrumentRecalls).where(eq(instrumentRecalls.instrumentId, instrument.id))
    const number = (last?.number ?? 0) + 1
    const [recall] = await tx.insert(instrumentRecalls).values({ instrumentId: instrument.id, number, ...input, startedBy: actor.id }).returning()
    if (!recall) throw new Error('The recall was not inserted')
    const sheets = await tx.select({ id: testSheets.id, number: testSheets.number, unitId: testSheets.unitId }).from(testSheets)
      .where(restingOn(tx, instrument.id, input)).orderBy(asc(testSheets.unitId), asc(testSheets.number))
    if (sheets.length > 0) await tx.insert(instrumentRecallSheets).values(sheets.map(({ id }) => ({ recallId: recall.id, sheetId: id })))
    await appendLedger(tx, actor, { kind: 'instrument', id: instrument.id }, 'recalled', { name: instrument.name, number, foundOn: input.foundOn, why: input.why, sheets: sheets.length })
    for (const sheet of sheets) await appendUnitLedger(tx, actor, sheet.unitId, 'instrument_recalled', { sheetNumber: sheet.number, instrument: `${instrument.name} (${formatTag(tag)})`, why: input.why })
    return viewRecall(tx, { tag, number })
  })
}

function toSummary(row: RecallRow, startedBy: string, { sheets, decided }: { sheets: number, decided: number }): RecallSummary {
  const { number, foundOn, goodOn, quantity, errorKind, errorAmount, why, closedAt } = row
  return { number, foundOn, goodOn, quantity, errorKind, errorAmount, why, startedBy, closedAt: closedAt?.toISOString() ?? null, sheets, decided }
}

/** The recalls of an instrument, the newest first. */
export async function listRecalls(db: Database, tag: string): Promise<RecallSummary[]> {
  const { row } = await getInstrumentRecord(db, tag)
  const rows = await db.select({ recall: instrumentRecalls, startedBy: people.name, sheets: count(instrumentRecallSheets.id), decided: count(instrumentRecallSheets.outcome) }).from(instrumentRecalls)
    .innerJoin(people, eq(people.id, instrumentRecalls.startedBy)).leftJoin(instrumentRecallSheets, eq(instrumentRecallSheets.recallId, instrumentRecalls.id))
    .where(eq(instrumentRecalls.instrumentId, row.id)).groupBy(instrumentRecalls.id, people.name).orderBy(desc(instrumentRecalls.number))
  return rows.map(({ recall, startedBy, ...counts }) => toSummary(recall, startedBy, counts))
}

interface RecallAddress { tag: string, number: number }

async function getRecallRow(db: Database, { tag, number }: RecallAddress) {
  const { row: instrument } = await getInstrumentRecord(db, tag)
  const [found] = await db.select({ recall: instrumentRecalls, startedBy: people.name }).from(instrumentRecalls).innerJoin(people, eq(people.id, instrumentRecalls.startedBy))
    .where(and(eq(instrumentRecalls.instrumentId, instrument.id), eq(instrumentRecalls.number, number)))
  if (!found) throw noSuchRecall()
  return { ...found, instrument }
}

/** One recall with every sheet on its list, those undecided first, and each reading in question as it stood and as put right. */
export async function viewRecall(db: Database, address: RecallAddress): Promise<RecallView> {
  const { recall, startedBy, instrument } = await getRecallRow(db, address)
  const rows = await db.select({ item: instrumentRecallSheets, sheet: testSheets, unitTag: units.tag, state: units.state, maker: models.maker, designation: models.designation, decidedBy: people.name }).from(instrumentRecallSheets)
    .innerJoin(testSheets, eq(testSheets.id, instrumentRecallSheets.sheetId)).innerJoin(units, eq(units.id, testSheets.unitId)).innerJoin(models, eq(models.id, units.modelId))
    .leftJoin(people, eq(people.id, instrumentRecallSheets.decidedBy))
    .where(eq(instrumentRecallSheets.recallId, recall.id)).orderBy(desc(isNull(instrumentRecallSheets.outcome)), desc(testSheets.testedOn), asc(units.tag))
  const points = await db.select({ reading: readings }).from(readings).innerJoin(instrumentRecallSheets, eq(instrumentRecallSheets.sheetId, readings.sheetId))
    .where(and(eq(instrumentRecallSheets.recallId, recall.id), eq(readings.instrumentId, instrument.id), recall.quantity === null ? undefined : eq(readings.quantity, recall.quantity))).orderBy(asc(readings.position))
  const items = rows.map(({ item, sheet, unitTag, state, maker, designation, decidedBy }): RecalledSheet => ({
    id: item.id, unitTag, unitName: `${maker} ${designation}`, state, isSold: SOLD_STATES.includes(state), number: sheet.number, testedOn: sheet.testedOn,
    readings: points.filter(({ reading }) => reading.sheetId === sheet.id).flatMap(({ reading }) => inQuestion(reading, sheet, recall)),
    outcome: item.outcome, note: item.note, decidedBy,
  }))
  return {
    ...toSummary(recall, startedBy, { sheets: items.length, decided: items.filter(({ outcome }) => outcome !== null).length }),
    instrumentTag: instrument.tag, instrumentName: instrument.name, items,
  }
}

/** What stood of a reading, put right. A reading signed before results were kept has nothing to be judged again by. */
function inQuestion(row: ReadingRow, sheet: SheetRow, { errorKind, errorAmount }: RecallRow): RecalledReading[] {
  const side = row.leftText === null ? 'found' as const : 'left' as const
  const result = row.signedResults?.[side]
  const text = side === 'left' ? row.leftText : row.foundText
  if (!result || text === null) return []
  const checkpoint = toCheckpoint(row)
  return [{ title: checkpointTitle(checkpoint), text, side, ...rejudge(checkpoint, result, { kind: errorKind, amount: errorAmount }, ruleOf(sheet)) }]
}

/** Says what follows for one sheet. 409 if somebody else decided it meanwhile, or the recall is closed. */
export async function decideRecallSheet(db: Database, actor: Actor, { id, outcome, note, seen, ...address }: DecidedRecallSheet & RecallAddress & { id: string }): Promise<RecallView> {
  return db.transaction(async (tx) => {
    const { recall, instrument } = await getRecallRow(tx, address)
    const [row] = await tx.select({ item: instrumentRecallSheets, unitId: testSheets.unitId, number: testSheets.number }).from(instrumentRecallSheets)
      .innerJoin(testSheets, eq(testSheets.id, instrumentRecallSheets.sheetId))
      .where(and(eq(instrumentRecallSheets.id, id), eq(instrumentRecallSheets.recallId, recall.id))).for('update', { of: instrumentRecallSheets })
    if (!row) throw noSuchRecall()
    if (recall.closedAt) throw conflict('recall-closed', 'This recall is closed, so what was decided stands.')
    if (row.item.outcome !== seen) throw conflict('decided-meanwhile', `Somebody else decided this sheet meanwhile: ${row.item.outcome ? RECALL_OUTCOME_LABELS[row.item.outcome] : 'undecided again'}.`)
    await tx.update(instrumentRecallSheets).set({ outcome, note, decidedBy: actor.id, decidedAt: new Date() }).where(eq(instrumentRecallSheets.id, id))
    await appendUnitLedger(tx, actor, row.unitId, 'recall_decided', {
      sheetNumber: row.number, instrument: `${instrument.name} (${formatTag(instrument.tag)})`, outcome: RECALL_OUTCOME_LABELS[outcome], ...note && { note },
    })
    return viewRecall(tx, address)
  })
}

/** Ends a recall. 409 while a sheet of it is undecided, or when it is closed already. */
export async function closeRecall(db: Database, actor: Actor, address: RecallAddress): Promise<RecallView> {
  return db.transaction(async (tx) => {
    const { recall, instrument } = await getRecallRow(tx, address)
    await tx.select({ id: instrumentRecalls.id }).from(instrumentRecalls).where(eq(instrumentRecalls.id, recall.id)).for('update')
    const open = await tx.$count(instrumentRecallSheets, and(eq(instrumentRecallSheets.recallId, recall.id), isNull(instrumentRecallSheets.outcome)))
    if (open > 0) throw conflict('undecided', `${open === 1 ? 'One sheet is' : `${open} sheets are`} still undecided. Say of each what follows before the recall is closed.`)
    if (recall.closedAt) throw conflict('recall-closed', 'This recall is closed already.')
    await tx.update(instrumentRecalls).set({ closedAt: new Date() }).where(eq(instrumentRecalls.id, recall.id))
    await appendLedger(tx, actor, { kind: 'instrument', id: instrument.id }, 'recall_closed', { name: instrument.name, number: recall.number })
    return viewRecall(tx, address)
  })
}
