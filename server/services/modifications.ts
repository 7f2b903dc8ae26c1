import { and, asc, desc, eq, inArray, sql } from 'drizzle-orm'
import { ledger, modifications, people } from '../../drizzle/schema'
import { KEPT_WITH_KIND_LABELS } from '../../shared/domain/kept-with'
import type { FieldChange } from '../../shared/domain/ledger-events'
import { modificationHeading } from '../../shared/domain/modification-words'
import { DISPOSITION_LABELS, HAND_LABELS, NATURE_LABELS, REASON_LABELS, REVERSIBILITY_LABELS } from '../../shared/domain/modifications'
import { PATH_LABELS } from '../../shared/domain/paths'
import type { CorrectedModification, NewModification, UnaffectingModification, WithdrawnModification } from '../../shared/schemas/modification'
import type { LoggedModification, ModificationView } from '../../shared/types/modification'
import type { Person } from '../../shared/types/person'
import type { PhotoView } from '../../shared/types/photo'
import type { Database } from '../utils/db'
import { conflict, invalid, notFound, stale } from '../utils/errors'
import { mapFitted, undoFittingsOf } from './fittings'
import { fitParts } from './fitting-parts'
import { insertKeptWith } from './kept-with'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import { listPhotos } from './photos'
import { todayInShop } from './shop-day'
import type { UnitRow } from './unit-lock'
import { getUnitRow, lockUnit } from './unit-lock'
import { requireOpenLog } from './work-log-guard'

type ModificationRow = typeof modifications.$inferSelect
interface RowWithName { entry: ModificationRow, loggedBy: string }

const selectEntries = (db: Database) => db.select({ entry: modifications, loggedBy: people.name }).from(modifications)
  .innerJoin(people, eq(people.id, modifications.loggedBy))

function toView({ entry, loggedBy }: RowWithName, isCorrected: boolean, photos: PhotoView[], fitted: string[]): ModificationView {
  return {
    id: entry.id,
    hand: entry.hand,
    place: entry.place,
    before: entry.before,
    after: entry.after,
    reason: entry.reason,
    reversibility: entry.reversibility,
    nature: entry.nature,
    disposition: entry.disposition,
    dispositionNote: entry.dispositionNote,
    parts: entry.parts,
    fitted,
    testedAfter: entry.testedAfter,
    minutes: entry.minutes,
    doneOn: entry.doneOn,
    ownerConsent: entry.ownerConsent,
    touches: entry.touches,
    affectsNothingBecause: entry.affectsNothingBecause,
    loggedBy,
    loggedAt: entry.createdAt.toISOString(),
    corrected: isCorrected,
    withdrawnBecause: entry.withdrawnBecause,
    photos: photos.filter(photo => photo.modificationId === entry.id),
    version: entry.version,
  }
}

async function toViews(db: Database, unitId: string, rows: RowWithName[]): Promise<ModificationView[]> {
  if (rows.length === 0) return []
  const corrections = await db.selectDistinct({ id: sql<string>`${ledger.details} ->> 'modificationId'` }).from(ledger)
    .where(and(eq(ledger.unitId, unitId), eq(ledger.event, 'modification_corrected'), inArray(sql`${ledger.details} ->> 'modificationId'`, rows.map(({ entry }) => entry.id))))
  const corrected = new Set(corrections.map(({ id }) => id))
  const photos = await listPhotos(db, unitId)
  const fitted = await mapFitted(db, unitId)
  return rows.map(row => toView(row, corrected.has(row.entry.id), photos, fitted.get(row.entry.id) ?? []))
}

/**
 * The work log of a unit (by its row's id): the newest work first, what earlier hands did last. Withdrawn entries stay in
 * it and say why.
 */
export async function listModifications(db: Database, unitId: string): Promise<ModificationView[]> {
  const rows = await selectEntries(db).where(eq(modifications.unitId, unitId))
    .orderBy(sql`${modifications.doneOn} desc nulls last`, desc(modifications.createdAt), asc(modifications.id))
  return toViews(db, unitId, rows)
}

/** The same by the unit's tag; 404 if there is no such unit. */
export async function listModificationsOf(db: Database, tag: string): Promise<ModificationView[]> {
  return listModifications(db, (await getUnitRow(db, tag)).id)
}

/** One entry of a unit's work log; 404 if there is none such. */
export async function getModification(db: Database, tag: string, id: string): Promise<ModificationView> {
  return getEntry(db, await getUnitRow(db, tag), id)
}

async function getEntry(db: Database, unit: UnitRow, id: string): Promise<ModificationView> {
  const rows = await selectEntries(db).where(and(eq(modifications.id, id), eq(modifications.unitId, unit.id)))
  const [view] = await toViews(db, unit.id, rows)
  if (!view) throw notFound('The work log of this unit has no such entry.', 'no-such-modification')
  return view
}

/**
 * Appends an entry to a unit's work log; a bag of removed parts, if one is described, becomes a kept-with item with the
 * next K tag, and the parts fitted come out of their lots. Refusals of those as for `fitParts`, nothing half-written; 409 when the log is closed, or a consigned piece's owner has not agreed to work of ours.
 */
export async function logModification(
  db: Database, actor: Person, { tag, removedPartsBag, fittings: parts, ...input }: NewModification & { tag: string },
): Promise<LoggedModification> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    requireOpenLog(unit, input)
    const doneOn = await dayOfWork(tx, input)
    const [row] = await tx.insert(modifications).values({ ...input, doneOn, unitId: unit.id, loggedBy: actor.id }).returning({ id: modifications.id })
    if (!row) throw new Error('The entry was not written')
    await appendUnitLedger(tx, actor, unit.id, 'modification_logged', { modificationId: row.id, hand: input.hand, before: input.before, after: input.after })
    await fitParts(tx, actor, unit, row.id, parts, (index, field) => `fittings.${index}.${field}`)
    const bagTag = removedPartsBag === '' ? null : await addBag(tx, actor, unit.id, removedPartsBag)
    return { ...await getEntry(tx, unit, row.id), bagTag }
  })
}

function addBag(tx: Database, actor: Actor, unitId: string, description: string): Promise<string> {
  return insertKeptWith(tx, actor, unitId, {
    kind: 'removed_parts', description: description || KEPT_WITH_KIND_LABELS.removed_parts, originality: 'original', condition: '',
    whereabouts: 'with_unit', placeTag: null, absenceDisclosed: '',
  })
}

/** Work of ours without a day was done today, in the shop's zone. A day that is still to come is a slip. */
async function dayOfWork(tx: Database, said: Pick<NewModification, 'hand' | 'doneOn'>): Promise<string | null> {
  const today = await todayInShop(tx)
  if (said.doneOn !== null && said.doneOn > today) throw invalid([{ path: 'doneOn', message: 'The date of the work must be today or in the past' }])
  return said.doneOn ?? (said.hand === 'done_by_us' ? today : null)
}

/**
 * Puts an entry right. What it said before stays in the ledger, with the reason. 409 when somebody else changed it
 * meanwhile (with the entry as it stands), when it was withdrawn, or when the log is closed; 422 when nothing differs.
 */
export async function correctModification(
  db: Database, actor: Actor, { tag, id, version, why, ...input }: CorrectedModification & { tag: string, id: string },
): Promise<ModificationView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    const before = await getOpenEntry(tx, unit, id, version)
    requireOpenLog(unit, input)
    const next = { ...input, doneOn: await dayOfWork(tx, input) }
    const changes = changesBetween(inWords(before), inWords(next))
    if (changes.length === 0) throw invalid([{ path: '', message: 'Nothing has been changed: correct what is wrong, or leave the entry as it is' }])
    await tx.update(modifications).set({ ...next, version: sql`${modifications.version} + 1` }).where(eq(modifications.id, id))
    await appendUnitLedger(tx, actor, unit.id, 'modification_corrected', { modificationId: id, changes, why })
    return getEntry(tx, unit, id)
  })
}

/** Takes an entry out of force and says why: it was on the wrong unit, or never happened. It stays to be read; its parts go back to their drawers. */
export async function withdrawModification(
  db: Database, actor: Person, { tag, id, version, why }: WithdrawnModification & { tag: string, id: string },
): Promise<ModificationView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    const entry = await getOpenEntry(tx, unit, id, version)
    // Withdrawing does no work on the piece, so only a closed log stands against it.
    requireOpenLog(unit, { hand: 'found_like_this', ownerConsent: '' })
    await tx.update(modifications).set({ withdrawnAt: new Date(), withdrawnBecause: why, version: sql`${modifications.version} + 1` }).where(eq(modifications.id, id))
    await undoFittingsOf(tx, actor, unit, id, why)
    await appendUnitLedger(tx, actor, unit.id, 'modification_withdrawn', { modificationId: id, summary: modificationHeading(entry), why })
    return getEntry(tx, unit, id)
  })
}

/**
 * Marks work of ours as having changed nothing that was measured, with the reason: the test sheets it had overtaken hold
 * again. It never makes a safety check current again. 409 when somebody else changed the entry meanwhile, when it was
 * withdrawn, is not work of ours, or when the log is closed.
 */
export async function markDoesNotAffect(
  db: Database, actor: Actor, { tag, id, version, why }: UnaffectingModification & { tag: string, id: string },
): Promise<ModificationView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    const entry = await getOpenEntry(tx, unit, id, version)
    // Nothing is done to the piece, so only a closed log stands against it.
    requireOpenLog(unit, { hand: 'found_like_this', ownerConsent: '' })
    if (entry.hand !== 'done_by_us') throw conflict('not-our-work', 'Only work of ours comes after a measurement: this entry makes no test sheet stale.')
    await tx.update(modifications).set({ touches: null, affectsNothingBecause: why, version: sql`${modifications.version} + 1` }).where(eq(modifications.id, id))
    await appendUnitLedger(tx, actor, unit.id, 'modification_unaffecting', { modificationId: id, summary: modificationHeading(entry), why })
    return getEntry(tx, unit, id)
  })
}

/** The entry as the writer saw it, read under the unit's lock. */
async function getOpenEntry(tx: Database, unit: UnitRow, id: string, version: number): Promise<ModificationView> {
  const entry = await getEntry(tx, unit, id)
  if (entry.version !== version) throw stale('entry', entry)
  if (entry.withdrawnBecause !== null) throw conflict('withdrawn', 'This entry has been withdrawn. Log a new one instead.', { current: entry })
  return entry
}

type Said = Pick<ModificationView, 'hand' | 'before' | 'after' | 'reversibility' | 'nature' | 'disposition' | 'dispositionNote' | 'reason' | 'place' | 'parts' | 'testedAfter' | 'minutes' | 'doneOn' | 'ownerConsent' | 'touches' | 'affectsNothingBecause'>

/** An entry's answers as the story tells them. */
function inWords(said: Said): Record<string, string> {
  return {
    'who did it': HAND_LABELS[said.hand],
    'before': said.before,
    'after': said.after,
    'can it be undone': said.reversibility ? REVERSIBILITY_LABELS[said.reversibility] : '',
    'how far it changes the piece': said.nature ? NATURE_LABELS[said.nature] : '',
    'original parts': DISPOSITION_LABELS[said.disposition],
    'where the original parts are': said.dispositionNote,
    'reason': REASON_LABELS[said.reason],
    'place': said.place,
    'parts': said.parts,
    'tested after': said.testedAfter,
    'minutes': said.minutes === null ? '' : String(said.minutes),
    'date': said.doneOn ?? '',
    'owner’s consent': said.ownerConsent,
    'only these parts could have changed': (said.touches ?? []).map(path => PATH_LABELS[path].toLowerCase()).join('; '),
    'does not affect what was measured': said.affectsNothingBecause ?? '',
  }
}

function changesBetween(before: Record<string, string>, after: Record<string, string>): FieldChange[] {
  return Object.keys(after).filter(field => before[field] !== after[field])
    .map(field => ({ field, from: before[field] || null, to: after[field] || null }))
}
