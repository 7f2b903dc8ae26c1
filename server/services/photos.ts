import { and, asc, eq, inArray, isNull, sql } from 'drizzle-orm'
import { files, modifications, photos, readings, testSheets, units } from '../../drizzle/schema'
import type { FieldChange } from '../../shared/domain/ledger-events'
import type { PhotoFormat, PhotoWidth } from '../../shared/domain/photo-sizes'
import { nearestSize, photoSizes, photoUrl } from '../../shared/domain/photo-sizes'
import { PHOTO_SUBJECT_LABELS } from '../../shared/domain/photos'
import type { ChangedPhoto, NewPhoto } from '../../shared/schemas/photo'
import type { PhotoView } from '../../shared/types/photo'
import type { Database } from '../utils/db'
import { invalid, notFound, stale } from '../utils/errors'
import type { FileStore } from '../utils/file-store'
import { addJob } from '../utils/jobs'
import { preparePhoto, renderPhoto } from '../utils/photo-image'
import { hashBytes, storeThenWrite } from './files'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import { getUnitRow, lockUnit } from './unit-lock'

type PhotoRow = typeof photos.$inferSelect
type FileRow = typeof files.$inferSelect
interface PhotoWithFile { photo: PhotoRow, file: FileRow }

const masterKey = (fileId: string) => `photos/${fileId}/master.jpg`
const sizeKey = (fileId: string, width: PhotoWidth, format: PhotoFormat) => `photos/${fileId}/${width}.${format}`
const noSuchPhoto = () => notFound('There is no such photo, or it has been removed.', 'no-such-photo')

const selectPhotos = (db: Database) => db.select({ photo: photos, file: files }).from(photos).innerJoin(files, eq(files.id, photos.fileId))

function toView({ photo, file }: PhotoWithFile): PhotoView {
  const width = file.width ?? 1
  const height = file.height ?? 1
  const sizes = photoSizes(width, height)
  const srcset = (format: PhotoFormat) => sizes.map(size => `${photoUrl(photo.id, size.width, format)} ${size.pixelWidth}w`).join(', ')
  return {
    id: photo.id,
    subject: photo.subject,
    caption: photo.caption,
    width,
    height,
    thumbnailUrl: photoUrl(photo.id, 320),
    url: photoUrl(photo.id, sizes.at(-1)?.width ?? 320),
    webpSrcset: srcset('webp'),
    avifSrcset: file.avifReadyAt ? srcset('avif') : null,
    modificationId: photo.modificationId,
    isPublic: photo.isPublic,
    position: photo.position,
    version: photo.version,
  }
}

/** The photos of a unit (by its row's id) in the order a buyer wants to see them; removed ones are left out. */
export async function listPhotos(db: Database, unitId: string): Promise<PhotoView[]> {
  const rows = await selectPhotos(db).where(and(eq(photos.unitId, unitId), isNull(photos.removedAt)))
    .orderBy(asc(photos.subject), asc(photos.position), asc(photos.createdAt), asc(photos.id))
  return rows.map(toView)
}

/** The same by the unit's tag; 404 if there is no such unit. */
export async function listPhotosOf(db: Database, tag: string): Promise<PhotoView[]> {
  return listPhotos(db, (await getUnitRow(db, tag)).id)
}

/** The address of each unit's first photo, 320 px wide, by the unit's row id; units without photos are not in the map. */
export async function listThumbnails(db: Database, unitIds: readonly string[]): Promise<Map<string, string>> {
  if (unitIds.length === 0) return new Map()
  const rows = await db.selectDistinctOn([photos.unitId], { unitId: photos.unitId, id: photos.id }).from(photos)
    .where(and(inArray(photos.unitId, [...unitIds]), isNull(photos.removedAt)))
    .orderBy(photos.unitId, asc(photos.subject), asc(photos.position), asc(photos.createdAt))
  return new Map(rows.map(({ unitId, id }) => [unitId, photoUrl(id, 320)]))
}

async function findSame(db: Database, unitId: string, sha256: string): Promise<PhotoView | null> {
  const [row] = await selectPhotos(db).where(and(eq(photos.unitId, unitId), eq(files.sha256, sha256), isNull(photos.removedAt))).limit(1)
  return row ? toView(row) : null
}

/**
 * Adds a picture to a unit: judged by its content, turned upright, EXIF and position removed, WebP sizes made at once and
 * AVIF by a job. The same bytes sent twice to a unit are one photo: the second time answers with the first.
 *
 * Throws 413, 415 or 422 for a file that is too large, no picture, or damaged; 422 for a work-log entry or a reading of another unit.
 */
export async function addPhoto(
  db: Database, store: FileStore, actor: Actor, { tag, name, bytes, ...input }: NewPhoto & { tag: string, name: string, bytes: Uint8Array },
): Promise<PhotoView> {
  const sha256 = hashBytes(bytes)
  const earlier = await findSame(db, (await getUnitRow(db, tag)).id, sha256)
  if (earlier) return showAlso(db, tag, earlier, input.readingId)
  const prepared = await preparePhoto(bytes)
  const stored = (fileId: string) => [
    { key: masterKey(fileId), bytes: prepared.master },
    ...prepared.webp.map(({ size, bytes: made }) => ({ key: sizeKey(fileId, size.width, 'webp'), bytes: made })),
  ]
  return storeThenWrite(store, stored, fileId => db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    const meanwhile = await findSame(tx, unit.id, sha256)
    if (meanwhile) return { keep: false, result: meanwhile }
    if (input.modificationId !== undefined) await requireModification(tx, unit.id, input.modificationId)
    if (input.readingId !== undefined) await requireReading(tx, unit.id, input.readingId)
    await tx.insert(files).values({
      id: fileId, kind: 'photo', name, mediaType: 'image/jpeg', byteSize: bytes.byteLength, sha256, width: prepared.width, height: prepared.height, addedBy: actor.id,
    })
    const [photo] = await tx.insert(photos).values({
      unitId: unit.id, fileId, subject: input.subject, caption: input.caption, modificationId: input.modificationId ?? null, readingId: input.readingId ?? null,
    }).returning({ id: photos.id })
    if (!photo) throw new Error('The photo was not written')
    await appendUnitLedger(tx, actor, unit.id, 'photo_added', { photoId: photo.id, subject: input.subject, caption: input.caption })
    await addJob(tx, 'make-avif', { fileId })
    return { keep: true, result: await getPhoto(tx, photo.id) }
  }))
}

async function requireModification(db: Database, unitId: string, modificationId: string): Promise<void> {
  const [found] = await db.select({ id: modifications.id }).from(modifications).where(and(eq(modifications.id, modificationId), eq(modifications.unitId, unitId)))
  if (!found) throw invalid([{ path: 'modificationId', message: 'Choose an entry of this unit’s work log' }])
}

/** The same picture again, of a reading now: it is that reading's too, unless it is another's already. */
async function showAlso(db: Database, tag: string, photo: PhotoView, readingId: string | undefined): Promise<PhotoView> {
  if (readingId === undefined) return photo
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    await requireReading(tx, unit.id, readingId)
    await tx.update(photos).set({ readingId }).where(and(eq(photos.id, photo.id), isNull(photos.readingId)))
    return getPhoto(tx, photo.id)
  })
}

async function requireReading(db: Database, unitId: string, readingId: string): Promise<void> {
  const [found] = await db.select({ id: readings.id }).from(readings).innerJoin(testSheets, eq(testSheets.id, readings.sheetId))
    .where(and(eq(readings.id, readingId), eq(testSheets.unitId, unitId)))
  if (!found) throw invalid([{ path: 'readingId', message: 'Choose a reading of a test sheet of this unit' }])
}

/** One photo; 404 if there is none or it was removed. */
export async function getPhoto(db: Database, id: string): Promise<PhotoView> {
  return toView(await getPhotoRow(db, id))
}

async function getPhotoRow(db: Database, id: string): Promise<PhotoWithFile> {
  const [row] = await selectPhotos(db).where(and(eq(photos.id, id), isNull(photos.removedAt)))
  if (!row) throw noSuchPhoto()
  return row
}

/** Lock order: the unit, then the photo, read again under the lock. */
async function lockPhoto(tx: Database, id: string): Promise<PhotoWithFile> {
  const { photo } = await getPhotoRow(tx, id)
  await tx.select({ id: units.id }).from(units).where(eq(units.id, photo.unitId)).for('update')
  return getPhotoRow(tx, id)
}

/** Changes what is said of a photo, its order, or whether the buyer's sheet may show it. 409 if somebody else did meanwhile. */
export async function changePhoto(db: Database, actor: Actor, { id, version, ...input }: ChangedPhoto & { id: string }): Promise<PhotoView> {
  return db.transaction(async (tx) => {
    const row = await lockPhoto(tx, id)
    if (row.photo.version !== version) throw stale('photo', toView(row))
    const next = { ...describe(row.photo), ...withoutUndefined(input) }
    const changes = changesBetween(row.photo, next)
    if (changes.length === 0) return toView(row)
    await tx.update(photos).set({ ...next, version: sql`${photos.version} + 1` }).where(eq(photos.id, id))
    await appendUnitLedger(tx, actor, row.photo.unitId, 'edited', { changes })
    return getPhoto(tx, id)
  })
}

type Said = Pick<PhotoRow, 'subject' | 'caption' | 'position' | 'isPublic'>

const describe = ({ subject, caption, position, isPublic }: PhotoRow): Said => ({ subject, caption, position, isPublic })

function withoutUndefined({ subject, caption, position, isPublic }: Omit<ChangedPhoto, 'version'>): Partial<Said> {
  return {
    ...subject !== undefined && { subject },
    ...caption !== undefined && { caption },
    ...position !== undefined && { position },
    ...isPublic !== undefined && { isPublic },
  }
}

function changesBetween(before: Said, after: Said): FieldChange[] {
  const photo = `photo (${PHOTO_SUBJECT_LABELS[before.subject].toLowerCase()})`
  const inWords = (said: Said) => ({
    'what it shows': PHOTO_SUBJECT_LABELS[said.subject],
    'caption': said.caption,
    'place in the row': String(said.position),
    'shown to the buyer': said.isPublic ? 'yes' : 'no',
  })
  const from: Record<string, string> = inWords(before)
  return Object.entries(inWords(after)).filter(([field, to]) => from[field] !== to)
    .map(([field, to]) => ({ field: `${photo}: ${field}`, from: from[field] || null, to: to || null }))
}

/** Takes a photo off its unit and says why; the ledger keeps that it was there. */
export async function removePhoto(db: Database, actor: Actor, { id, why }: { id: string, why: string }): Promise<void> {
  await db.transaction(async (tx) => {
    const { photo } = await lockPhoto(tx, id)
    await tx.update(photos).set({ removedAt: new Date(), version: sql`${photos.version} + 1` }).where(eq(photos.id, id))
    await appendUnitLedger(tx, actor, photo.unitId, 'photo_removed', { photoId: id, subject: photo.subject, why })
  })
}

/**
 * The bytes of one size of a photo; where the picture is smaller than asked for, its largest. 404 if there is no such
 * photo, or its AVIF is not made yet. Who may see it is the caller's to prove.
 */
export async function readPhoto(db: Database, store: FileStore, photoId: string, width: PhotoWidth, format: PhotoFormat): Promise<Buffer> {
  const { file } = await getPhotoRow(db, photoId)
  return readSize(store, file, width, format)
}

/**
 * The same, whether or not the photo was taken off its unit since: a sheet that was frozen at the sale still shows what
 * the buyer saw. Only for photos that such a sheet names.
 */
export async function readFrozenPhoto(db: Database, store: FileStore, photoId: string, width: PhotoWidth, format: PhotoFormat): Promise<Buffer> {
  const [row] = await selectPhotos(db).where(eq(photos.id, photoId))
  if (!row) throw noSuchPhoto()
  return readSize(store, row.file, width, format)
}

async function readSize(store: FileStore, file: typeof files.$inferSelect, width: PhotoWidth, format: PhotoFormat): Promise<Buffer> {
  const size = nearestSize(photoSizes(file.width ?? 1, file.height ?? 1), width)
  const bytes = size && await store.get(sizeKey(file.id, size.width, format))
  if (!bytes) throw noSuchPhoto()
  return bytes
}

/** The job: makes a file's AVIF sizes. Made again, it changes nothing. */
export async function makeAvif(db: Database, store: FileStore, fileId: string): Promise<void> {
  const [file] = await db.select().from(files).where(eq(files.id, fileId))
  if (!file || file.avifReadyAt || file.width === null || file.height === null) return
  const master = await store.get(masterKey(fileId))
  if (!master) throw new Error(`The file store has no picture ${fileId}`)
  for (const size of photoSizes(file.width, file.height)) {
    await store.put(sizeKey(fileId, size.width, 'avif'), await renderPhoto(master, size, 'avif'))
  }
  await db.update(files).set({ avifReadyAt: new Date() }).where(eq(files.id, fileId))
}
