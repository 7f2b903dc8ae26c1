import { and, asc, eq, isNull } from 'drizzle-orm'
import { documents, files, models } from '../../drizzle/schema'
import type { NewDocument } from '../../shared/schemas/document'
import type { DocumentView } from '../../shared/types/photo'
import type { Database } from '../utils/db'
import { notFound } from '../utils/errors'
import type { FileStore } from '../utils/file-store'
import { inspectPdf } from '../utils/pdf-file'
import { hashBytes, storeThenWrite } from './files'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'
import { getUnitRow, lockUnit } from './unit-lock'

type DocumentRow = typeof documents.$inferSelect
interface DocumentWithFile { document: DocumentRow, file: typeof files.$inferSelect }

/** The unit (by compact tag) or model that a document belongs to. */
export type DocumentOwner = { unitTag: string } | { modelId: string }
type OwnerIds = { unitId: string, modelId: null } | { unitId: null, modelId: string }

const documentKey = (fileId: string) => `documents/${fileId}.pdf`
const noSuchDocument = () => notFound('There is no such document, or it has been removed.', 'no-such-document')

const selectDocuments = (db: Database) => db.select({ document: documents, file: files }).from(documents).innerJoin(files, eq(files.id, documents.fileId))
const ownedBy = (owner: OwnerIds) => owner.unitId !== null ? eq(documents.unitId, owner.unitId) : eq(documents.modelId, owner.modelId)
const ledgerSubject = (owner: OwnerIds) => owner.unitId !== null ? { kind: 'unit' as const, id: owner.unitId } : { kind: 'model' as const, id: owner.modelId }

function toView({ document, file }: DocumentWithFile): DocumentView {
  return { id: document.id, title: document.title, name: file.name, byteSize: file.byteSize, url: `/api/documents/${document.id}`, isPublic: document.isPublic }
}

async function list(db: Database, owner: OwnerIds): Promise<DocumentView[]> {
  const rows = await selectDocuments(db).where(and(ownedBy(owner), isNull(documents.removedAt))).orderBy(asc(documents.createdAt), asc(documents.id))
  return rows.map(toView)
}

/** The papers of one unit, by its row's id. */
export const listUnitDocuments = (db: Database, unitId: string) => list(db, { unitId, modelId: null })
/** The papers that go for every unit of a model. */
export const listModelDocuments = (db: Database, modelId: string) => list(db, { unitId: null, modelId })

/** The papers of a unit or model; 404 if there is none such. */
export async function listDocumentsOf(db: Database, owner: DocumentOwner): Promise<DocumentView[]> {
  return list(db, await resolve(db, owner))
}

async function resolve(db: Database, owner: DocumentOwner): Promise<OwnerIds> {
  if ('unitTag' in owner) return { unitId: (await getUnitRow(db, owner.unitTag)).id, modelId: null }
  const [model] = await db.select({ id: models.id }).from(models).where(eq(models.id, owner.modelId))
  if (!model) throw notFound('There is no such model.', 'no-such-model')
  return { unitId: null, modelId: model.id }
}

async function lockOwner(tx: Database, owner: DocumentOwner): Promise<OwnerIds> {
  if ('unitTag' in owner) return { unitId: (await lockUnit(tx, owner.unitTag)).id, modelId: null }
  await tx.select({ id: models.id }).from(models).where(eq(models.id, owner.modelId)).for('update')
  return resolve(tx, owner)
}

/**
 * Adds a PDF to a unit or to a model. The same bytes sent twice are one document. Throws 413 when it is too large, 415
 * when it is no PDF, 422 when it is damaged.
 */
export async function addDocument(
  db: Database, store: FileStore, actor: Actor, { owner, name, bytes, title, isPublic }: NewDocument & { owner: DocumentOwner, name: string, bytes: Uint8Array },
): Promise<DocumentView> {
  await inspectPdf(bytes)
  await resolve(db, owner)
  const sha256 = hashBytes(bytes)
  return storeThenWrite(store, fileId => [{ key: documentKey(fileId), bytes }], fileId => db.transaction(async (tx) => {
    const ids = await lockOwner(tx, owner)
    const [earlier] = await selectDocuments(tx).where(and(ownedBy(ids), eq(files.sha256, sha256), isNull(documents.removedAt))).limit(1)
    if (earlier) return { keep: false, result: toView(earlier) }
    await tx.insert(files).values({ id: fileId, kind: 'document', name, mediaType: 'application/pdf', byteSize: bytes.byteLength, sha256, addedBy: actor.id })
    const called = title || name.replace(/\.pdf$/i, '')
    const [row] = await tx.insert(documents).values({ ...ids, fileId, title: called, isPublic }).returning({ id: documents.id })
    if (!row) throw new Error('The document was not written')
    await appendLedger(tx, actor, ledgerSubject(ids), 'document_added', { documentId: row.id, title: called })
    return { keep: true, result: toView(await getDocumentRow(tx, row.id)) }
  }))
}

async function getDocumentRow(db: Database, id: string): Promise<DocumentWithFile> {
  const [row] = await selectDocuments(db).where(and(eq(documents.id, id), isNull(documents.removedAt)))
  if (!row) throw noSuchDocument()
  return row
}

/** Takes a document off its unit or model and says why. */
export async function removeDocument(db: Database, actor: Actor, { id, why }: { id: string, why: string }): Promise<void> {
  await db.transaction(async (tx) => {
    const [claimed] = await tx.select().from(documents).where(and(eq(documents.id, id), isNull(documents.removedAt))).for('update')
    if (!claimed) throw noSuchDocument()
    await tx.update(documents).set({ removedAt: new Date() }).where(eq(documents.id, id))
    const subject = claimed.unitId !== null ? { kind: 'unit' as const, id: claimed.unitId } : { kind: 'model' as const, id: claimed.modelId ?? '' }
    await appendLedger(tx, actor, subject, 'document_removed', { documentId: id, title: claimed.title, why })
  })
}

/** The bytes of a document and what it is called; 404 if there is none. Who may see it is the caller's to prove. */
export async function readDocument(db: Database, store: FileStore, id: string): Promise<{ name: string, bytes: Buffer }> {
  const { file } = await getDocumentRow(db, id)
  const bytes = await store.get(documentKey(file.id))
  if (!bytes) throw noSuchDocument()
  return { name: file.name, bytes }
}
