import { and, asc, count, eq, gt, inArray, isNull, sql } from 'drizzle-orm'
import { z } from 'zod'
import { instruments } from '../../drizzle/schema'
import { calibrationState } from '../../shared/domain/calibration'
import type { FieldChange } from '../../shared/domain/ledger-events'
import { formatTag } from '../../shared/domain/tag'
import type { ChangedInstrument, InstrumentQuery, NewInstrument, RetiredInstrument } from '../../shared/schemas/instrument'
import type { InstrumentView } from '../../shared/types/bench'
import type { Page } from '../../shared/types/page'
import { readCursor, writeCursor } from '../utils/cursor'
import type { Database } from '../utils/db'
import { conflict, invalid, notFound, stale } from '../utils/errors'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'
import { todayInShop } from './shop-day'
import { takeTag } from './tags'

export type InstrumentRow = typeof instruments.$inferSelect

/** An instrument as its calibration stands on a day. */
export function toInstrumentView(row: InstrumentRow, day: string): InstrumentView {
  return {
    id: row.id,
    tag: row.tag,
    name: row.name,
    serial: row.serial,
    accuracy: row.accuracy,
    calibratedOn: row.calibratedOn,
    calibrationDue: row.calibrationDue,
    calibrationNote: row.calibrationNote,
    calibration: calibrationState(row, day),
    retired: row.retiredAt !== null,
    version: row.version,
  }
}

/** "B 000003 T Counter", with a word where its calibration was overdue on the day. */
export function instrumentInWords(row: InstrumentRow, day: string): string {
  const overdue = calibrationState(row, day) === 'overdue' ? ', calibration overdue' : ''
  return `${formatTag(row.tag)} ${row.name}${overdue}`
}

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
    items: rows.slice(0, limit).map(row => toInstrumentView(row, day)),
    nextCursor: last ? writeCursor(last.tag) : null,
    total: counted?.total ?? 0,
  }
}

/** One instrument by its compact tag; 404 if there is none. */
export async function getInstrument(db: Database, tag: string): Promise<InstrumentView> {
  return toInstrumentView(await getRow(db, tag), await todayInShop(db))
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

/** Enters an instrument in the book; it takes the next B tag. */
export async function addInstrument(db: Database, actor: Actor, input: NewInstrument): Promise<InstrumentView> {
  return db.transaction(async (tx) => {
    await refuseFuture(tx, input.calibratedOn)
    const tag = await takeTag(tx, 'B')
    const [row] = await tx.insert(instruments).values({ ...input, tag }).returning()
    if (!row) throw new Error('The instrument was not inserted')
    await appendLedger(tx, actor, { kind: 'instrument', id: row.id }, 'created', { name: row.name })
    return toInstrumentView(row, await todayInShop(tx))
  })
}

/** Writes an instrument as it should be now. 409 if somebody else changed it meanwhile, or it is retired. */
export async function changeInstrument(db: Database, actor: Actor, { tag, version, ...input }: ChangedInstrument & { tag: string }): Promise<InstrumentView> {
  return db.transaction(async (tx) => {
    const row = await lockInstrument(tx, tag, version)
    if (input.calibratedOn !== row.calibratedOn) await refuseFuture(tx, input.calibratedOn)
    const changes = changesBetween(row, input)
    if (changes.length === 0) return getInstrument(tx, tag)
    await tx.update(instruments).set({ ...input, version: sql`${instruments.version} + 1` }).where(eq(instruments.id, row.id))
    await appendLedger(tx, actor, { kind: 'instrument', id: row.id }, 'changed', { name: input.name, changes })
    return getInstrument(tx, tag)
  })
}

/** Takes an instrument out of use. What it measured stands; it is no longer offered for new sheets. */
export async function retireInstrument(db: Database, actor: Actor, { tag, version, why }: RetiredInstrument & { tag: string }): Promise<InstrumentView> {
  return db.transaction(async (tx) => {
    const row = await lockInstrument(tx, tag, version)
    await tx.update(instruments).set({ retiredAt: sql`now()`, version: sql`${instruments.version} + 1` }).where(eq(instruments.id, row.id))
    await appendLedger(tx, actor, { kind: 'instrument', id: row.id }, 'retired', { name: row.name, why })
    return getInstrument(tx, tag)
  })
}

async function lockInstrument(tx: Database, tag: string, version: number): Promise<InstrumentRow> {
  const [row] = await tx.select().from(instruments).where(eq(instruments.tag, tag)).for('update')
  if (!row) return getRow(tx, tag)
  if (row.version !== version) throw stale('instrument', toInstrumentView(row, await todayInShop(tx)))
  if (row.retiredAt) throw conflict('retired', `${row.name} is retired, so its record is closed.`)
  return row
}

async function refuseFuture(tx: Database, calibratedOn: string | null): Promise<void> {
  if (calibratedOn !== null && calibratedOn > await todayInShop(tx)) {
    throw invalid([{ path: 'calibratedOn', message: 'Day it was calibrated must be today or in the past' }])
  }
}

const FIELD_NAMES = {
  name: 'name', serial: 'serial', accuracy: 'accuracy', calibratedOn: 'calibrated on', calibrationDue: 'calibration due', calibrationNote: 'certificate note',
} as const satisfies Record<keyof NewInstrument, string>
const FIELDS = ['name', 'serial', 'accuracy', 'calibratedOn', 'calibrationDue', 'calibrationNote'] as const

function changesBetween(before: NewInstrument, after: NewInstrument): FieldChange[] {
  return FIELDS.filter(field => before[field] !== after[field])
    .map(field => ({ field: FIELD_NAMES[field], from: before[field] || null, to: after[field] || null }))
}
