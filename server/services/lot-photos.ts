import { eq, sql } from 'drizzle-orm'
import { files, partLots } from '../../drizzle/schema'
import { nearestSize, photoSizes } from '../../shared/domain/photo-sizes'
import { lotTitle } from '../../shared/domain/part-words'
import type { Person } from '../../shared/types/person'
import type { PartLotView } from '../../shared/types/part'
import type { Database } from '../utils/db'
import { notFound } from '../utils/errors'
import type { FileStore } from '../utils/file-store'
import { preparePhoto } from '../utils/photo-image'
import { hashBytes, storeThenWrite } from './files'
import { appendLedger } from './ledger'
import { getLotRow, lockLot } from './lot-stock'
import { getLotView } from './lot-view'

const SHOWN_WIDTH = 800
const sizeKey = (fileId: string, width: number) => `lots/${fileId}/${width}.webp`
const noPhoto = () => notFound('This lot has no picture.', 'no-such-photo')

/** Gives a lot its picture, of the markings as they are, in place of an earlier one. 413, 415 or 422 for what is no sound picture. */
export async function setLotPhoto(db: Database, store: FileStore, actor: Person, { tag, name, bytes }: { tag: string, name: string, bytes: Uint8Array }): Promise<PartLotView> {
  await getLotRow(db, tag)
  const prepared = await preparePhoto(bytes)
  const stored = (fileId: string) => prepared.webp.map(({ size, bytes: made }) => ({ key: sizeKey(fileId, size.width), bytes: made }))
  return storeThenWrite(store, stored, fileId => db.transaction(async (tx) => {
    const { lot, type } = await lockLot(tx, tag)
    await tx.insert(files).values({
      id: fileId, kind: 'photo', name, mediaType: 'image/webp', byteSize: bytes.byteLength, sha256: hashBytes(bytes), width: prepared.width, height: prepared.height, addedBy: actor.id,
    })
    await tx.update(partLots).set({ photoFileId: fileId, version: sql`${partLots.version} + 1` }).where(eq(partLots.id, lot.id))
    await appendLedger(tx, actor, { kind: 'part_lot', id: lot.id }, 'changed', {
      name: lotTitle(type, tag), changes: [{ field: 'picture', from: lot.photoFileId && 'an earlier one', to: name || 'a new one' }],
    })
    return { keep: true, result: await getLotView(tx, actor, tag) }
  }))
}

/** The picture of a lot, at most 800 px wide, as WebP; 404 where there is none, or `fileId` is not it any more. */
export async function readLotPhoto(db: Database, store: FileStore, { tag, fileId }: { tag: string, fileId: string }): Promise<Buffer> {
  const { lot } = await getLotRow(db, tag)
  if (lot.photoFileId !== fileId) throw noPhoto()
  const [file] = await db.select().from(files).where(eq(files.id, fileId))
  const size = nearestSize(photoSizes(file?.width ?? 1, file?.height ?? 1), SHOWN_WIDTH)
  const bytes = size && await store.get(sizeKey(fileId, size.width))
  if (!bytes) throw noPhoto()
  return bytes
}
