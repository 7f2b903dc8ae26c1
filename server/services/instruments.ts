import { and, asc, count, eq, gt, inArray, isNull, sql } from 'drizzle-orm'
import { z } from 'zod'
import { calibrations, instrumentCapabilities, instruments, people } from '../../drizzle/schema'
import type { Capability } from '../../shared/domain/accuracy'
import { accuracyInWords } from '../../shared/domain/accuracy'
import { calibrationOn, calibrationState } from '../../shared/domain/calibration'
import type { Gauge } from '../../shared/domain/evaluation'
import { gaugeOf } from '../../shared/domain/evaluation'
import type { FieldChange } from '../../shared/domain/ledger-events'
import { QUANTITY_LABELS } from '../../shared/domain/reading'
import { formatTag } from '../../shared/domain/tag'
import type { ChangedInstrument, InstrumentQuery, NewCalibration, NewInstrument, RetiredInstrument } from '../../shared/schemas/instrument'
import type { CalibrationView, InstrumentView } from '../../shared/types/bench'
import type { Page } from '../../shared/types/page'
import { readCursor, writeCursor } from '../utils/cursor'
import type { Database } from '../utils/db'
import { conflict, invalid, notFound, stale } from '../utils/errors'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'
import { todayInShop } from './shop-day'
import { takeTag } from './tags'

type InstrumentRow = typeof instruments.$inferSelect
/** An instrument with all that is recorded of it. Certificates withdrawn since are among them. */
export interface InstrumentRecord { row: InstrumentRow, capabilities: Capability[], certificates: CalibrationView[] }

/** Everything recorded of some instruments, in two questions to the database however many they are. */
export async function gatherInstruments(db: Database, rows: readonly InstrumentRow[]): Promise<InstrumentRecord[]> {
  const ids = rows.map(({ id }) => id)
  if (ids.length === 0) return []
  const lines = await db.select().from(instrumentCapabilities).where(inArray(instrumentCapabilities.instrumentId, ids)).orderBy(asc(instrumentCapabilities.position))
  const certificates = await db.select({ calibration: calibrations, enteredBy: people.name }).from(calibrations)
    .leftJoin(people, eq(people.id, calibrations.enteredBy))
    .where(inArray(calibrations.instrumentId, ids)).orderBy(asc(calibrations.calibratedOn), asc(calibrations.createdAt))
  return rows.map(row => ({
    row,
    capabilities: lines.filter(({ instrumentId }) => instrumentId === row.id).map(toCapability),
    certificates: certificates.filter(({ calibration }) => calibration.instrumentId === row.id)
      .map(({ calibration, enteredBy }) => toCalibrationView(calibration, enteredBy)),
  }))
}

function toCapability({ id: _id, instrumentId: _instrumentId, position: _position, ...line }: typeof instrumentCapabilities.$inferSelect): Capability {
  return line
}

function toCalibrationView({ id, calibratedOn, dueOn, certificateNumber, laboratory, traceableTo, note, fileId, withdrawnBecause }: typeof calibrations.$inferSelect, enteredBy: string | null): CalibrationView {
  return { id, calibratedOn, dueOn, certificateNumber, laboratory, traceableTo, note, hasFile: fileId !== null, enteredBy, withdrawnBecause }
}

/** The certificate in force on a day. One withdrawn since counts as never given. */
export const certificateInForce = ({ certificates }: InstrumentRecord, day: string): CalibrationView | null =>
  calibrationOn(certificates.filter(({ withdrawnBecause }) => withdrawnBecause === null), day)

/** An instrument as its calibration stands on a day. */
export function toInstrumentView(record: InstrumentRecord, day: string): InstrumentView {
  const { row, capabilities } = record
  const certificate = certificateInForce(record, day)
  return {
    id: row.id,
    tag: row.tag,
    name: row.name,
    serial: row.serial,
    accuracy: row.accuracy,
    capabilities,
    calibratedOn: certificate?.calibratedOn ?? null,
    calibrationDue: certificate?.dueOn ?? null,
    certificate,
    calibration: calibrationState(certificate, day),
    retired: row.retiredAt !== null,
    version: row.version,
  }
}

/** "B 000003 T Counter", with a word where its calibration was overdue on the day. */
export function instrumentInWords(record: InstrumentRecord, day: string): string {
  const overdue = calibrationState(certificateInForce(record, day), day) === 'overdue' ? ', calibration overdue' : ''
  return `${formatTag(record.row.tag)} ${record.row.name}${overdue}`
}

/** The instrument as a reading of a day is judged with it. */
export const toGauge = (record: InstrumentRecord, day: string): Gauge => gaugeOf(toInstrumentView(record, day), day)

/** The shop's instruments by tag; those retired only if asked for. */
export async function listInstruments(db: Database, { limit, cursor, retired }: InstrumentQuery): Promise<Page<InstrumentView>> {
  const shown = retired === 'yes' ? undefined : isNull(instruments.retiredAt)
  const rows = await db.select().from(instruments)
    .where(and(shown, cursor === undefined ? undefined : gt(instruments.tag, readCursor(cursor, z.string()))))
    .orderBy(asc(instruments.tag)).limit(limit + 1)
  const [counted] = await db.select({ total: count() }).from(instruments).where(shown)
  const day = await todayInShop(db)
  const last = rows.length > limit ? rows[limit - 1] : undefined
  return {
    items: (await gatherInstruments(db, rows.slice(0, limit))).map(record => toInstrumentView(record, day)),
    nextCursor: last ? writeCursor(last.tag) : null,
    total: counted?.total ?? 0,
  }
}

/** Every instrument in use whose calibration is overdue today, the longest overdue first. */
export async function listOverdueInstruments(db: Database): Promise<InstrumentView[]> {
  const day = await todayInShop(db)
  const rows = await db.select().from(instruments).where(isNull(instruments.retiredAt))
  return (await gatherInstruments(db, rows)).map(record => toInstrumentView(record, day))
    .filter(({ calibration }) => calibration === 'overdue')
    .sort((a, b) => (a.calibrationDue ?? '').localeCompare(b.calibrationDue ?? ''))
}

/** One instrument by its compact tag; 404 if there is none. */
export async function getInstrument(db: Database, tag: string): Promise<InstrumentView> {
  return toInstrumentView(await getInstrumentRecord(db, tag), await todayInShop(db))
}

/** The same with every certificate. */
export async function getInstrumentRecord(db: Database, tag: string): Promise<InstrumentRecord> {
  const [record] = await gatherInstruments(db, [await getRow(db, tag)])
  if (!record) throw new Error('An instrument just read could not be gathered')
  return record
}

async function getRow(db: Database, tag: string): Promise<InstrumentRow> {
  const [row] = await db.select().from(instruments).where(eq(instruments.tag, tag))
  if (!row) throw notFound(`No bench instrument has the tag ${formatTag(tag)}.`, 'no-such-instrument')
  return row
}

/** The rows behind ids as a form names them, retired ones allowed only where they already stood; 422 at `field` else. */
export async function instrumentsForField(db: Database, ids: readonly string[], field: string, alreadyNamed: readonly string[] = []): Promise<InstrumentRow[]> {
  const wanted = [...new Set(ids)]
  if (wanted.length === 0) return []
  const rows = await db.select().from(instruments).where(inArray(instruments.id, wanted)).orderBy(asc(instruments.tag))
  if (rows.length < wanted.length) throw invalid([{ path: field, message: 'Choose an instrument from the list' }])
  const gone = rows.find(row => row.retiredAt !== null && !alreadyNamed.includes(row.id))
  if (gone) throw invalid([{ path: field, message: `${gone.name} (${formatTag(gone.tag)}) is retired: choose another instrument` }])
  return rows
}

/** Enters an instrument in the book, with its certificate if there is one; it takes the next B tag. */
export async function addInstrument(db: Database, actor: Actor, { capabilities, calibration, ...input }: NewInstrument): Promise<InstrumentView> {
  return db.transaction(async (tx) => {
    const tag = await takeTag(tx, 'B')
    const [row] = await tx.insert(instruments).values({ ...input, tag }).returning()
    if (!row) throw new Error('The instrument was not inserted')
    await writeCapabilities(tx, row.id, capabilities)
    if (calibration) await insertCalibration(tx, actor, row.id, calibration, null)
    await appendLedger(tx, actor, { kind: 'instrument', id: row.id }, 'created', { name: row.name })
    return getInstrument(tx, tag)
  })
}

async function writeCapabilities(tx: Database, instrumentId: string, capabilities: readonly Capability[]): Promise<void> {
  await tx.delete(instrumentCapabilities).where(eq(instrumentCapabilities.instrumentId, instrumentId))
  if (capabilities.length > 0) await tx.insert(instrumentCapabilities).values(capabilities.map((line, index) => ({ instrumentId, position: index + 1, ...line })))
}

/** Writes a certificate; 422 for a day that is still to come. */
export async function insertCalibration(tx: Database, actor: Actor, instrumentId: string, input: NewCalibration, fileId: string | null): Promise<string> {
  if (input.calibratedOn > await todayInShop(tx)) throw invalid([{ path: 'calibratedOn', message: 'Day it was calibrated must be today or in the past' }])
  const [row] = await tx.insert(calibrations).values({ instrumentId, ...input, fileId, enteredBy: actor.id }).returning({ id: calibrations.id })
  if (!row) throw new Error('The certificate was not inserted')
  return row.id
}

/** Writes an instrument as it should be now. 409 if somebody else changed it meanwhile, or it is retired. */
export async function changeInstrument(db: Database, actor: Actor, { tag, version, capabilities, ...input }: ChangedInstrument & { tag: string }): Promise<InstrumentView> {
  return db.transaction(async (tx) => {
    const { row, capabilities: before } = await lockInstrument(tx, tag, version)
    const changes = changesBetween({ ...row, capabilities: before }, { ...input, capabilities })
    if (changes.length === 0) return getInstrument(tx, tag)
    await tx.update(instruments).set({ ...input, version: sql`${instruments.version} + 1` }).where(eq(instruments.id, row.id))
    await writeCapabilities(tx, row.id, capabilities)
    await appendLedger(tx, actor, { kind: 'instrument', id: row.id }, 'changed', { name: input.name, changes })
    return getInstrument(tx, tag)
  })
}

/** Takes an instrument out of use. What it measured stands; it is no longer offered for new sheets. */
export async function retireInstrument(db: Database, actor: Actor, { tag, version, why }: RetiredInstrument & { tag: string }): Promise<InstrumentView> {
  return db.transaction(async (tx) => {
    const { row } = await lockInstrument(tx, tag, version)
    await tx.update(instruments).set({ retiredAt: sql`now()`, version: sql`${instruments.version} + 1` }).where(eq(instruments.id, row.id))
    await appendLedger(tx, actor, { kind: 'instrument', id: row.id }, 'retired', { name: row.name, why })
    return getInstrument(tx, tag)
  })
}

/** Locks an instrument; 409 if the version seen is no longer current (null: any will do), or if it is retired. */
export async function lockInstrument(tx: Database, tag: string, version: number | null): Promise<InstrumentRecord> {
  await tx.select({ id: instruments.id }).from(instruments).where(eq(instruments.tag, tag)).for('update')
  const record = await getInstrumentRecord(tx, tag)
  if (version !== null && record.row.version !== version) throw stale('instrument', toInstrumentView(record, await todayInShop(tx)))
  if (record.row.retiredAt) throw conflict('retired', `${record.row.name} is retired, so its record is closed.`)
  return record
}

type Described = Pick<InstrumentRow, 'name' | 'serial' | 'accuracy'> & { capabilities: readonly Capability[] }

function changesBetween(before: Described, after: Described): FieldChange[] {
  const texts = ['name', 'serial', 'accuracy'] as const
  const changes: FieldChange[] = texts.filter(field => before[field] !== after[field])
    .map(field => ({ field, from: before[field] || null, to: after[field] || null }))
  const [from, to] = [specificationInWords(before.capabilities), specificationInWords(after.capabilities)]
  return from === to ? changes : [...changes, { field: 'specification', from: from || null, to: to || null }]
}

function specificationInWords(capabilities: readonly Capability[]): string {
  return capabilities.map(line => `${line.label || QUANTITY_LABELS[line.quantity]} ${line.lower} to ${line.upper}: ${accuracyInWords(line)}`).join('; ')
}
