import { asc, eq } from 'drizzle-orm'
import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import sharp from 'sharp'
import { files, ledger, photos } from '../../../../drizzle/schema'
import { addPhoto, changePhoto, listPhotosOf, listThumbnails, makeAvif, readPhoto, removePhoto } from '../../../../server/services/photos'
import { getTestSheet, startTestSheet } from '../../../../server/services/test-sheets'
import type { Person } from '../../../../shared/types/person'
import { makeTriage } from '../../../support/bench'
import { useTestDatabase } from '../../../support/database'
import { makeMemoryFileStore } from '../../../support/memory-file-store'
import { makeNoisyJpeg, makePhoneJpeg, makePicture } from '../../../support/pictures'
import { makePerson, makeShop, makeUnit } from '../../../support/records'

describe('photos of a unit', () => {
  const database = useTestDatabase()
  let floor: Person
  let unit: Awaited<ReturnType<typeof makeUnit>>
  let store = makeMemoryFileStore()

  beforeAll(async () => {
    await makeShop(database.db)
    floor = await makePerson(database.db, 'floor')
  })
  beforeEach(async () => {
    unit = await makeUnit(database.db, floor)
    store = makeMemoryFileStore()
  })

  const add = (bytes: Uint8Array, name = 'front.jpg') =>
    addPhoto(database.db, store, floor, { tag: unit.tag, name, bytes, subject: 'front', caption: 'As it came' })
  const events = async () => (await database.db.select().from(ledger).where(eq(ledger.unitId, unit.id)).orderBy(asc(ledger.id))).map(entry => entry.event)

  it('turns a phone’s picture upright and takes its place and camera off', async () => {
    const sent = await makePhoneJpeg(2000, 1000)
    // The EXIF tag of the block that holds a position is 0x8825 (Exif 2.32, 4.6.3).
    expect((await sharp(sent).metadata()).exif?.includes(Buffer.from('2588', 'hex'))).toBe(true)
    const photo = await add(sent)
    expect(photo).toMatchObject({ subject: 'front', caption: 'As it came', width: 1000, height: 2000, avifSrcset: null })
    for (const key of await store.keys()) {
      const kept = await store.get(key.replaceAll(':', '/'))
      const { exif, xmp, orientation, width = 0, height = 0 } = await sharp(kept ?? Buffer.alloc(0)).metadata()
      expect({ key, exif, xmp, orientation }).toEqual({ key, exif: undefined, xmp: undefined, orientation: undefined })
      expect(height).toBe(width * 2)
    }
  })

  it('keeps WebP at the widths that its addresses promise', async () => {
    const photo = await add(await makePicture(2400, 1200))
    expect(photo.webpSrcset).toBe(['320', '800', '1600'].map(width => `/api/photos/${photo.id}/${width}.webp ${width}w`).join(', '))
    for (const width of [320, 800, 1600] as const) {
      const bytes = await readPhoto(database.db, store, photo.id, width, 'webp')
      expect(await sharp(bytes).metadata()).toMatchObject({ format: 'webp', width, height: width / 2 })
    }
  })

  it('never enlarges a small picture, and answers every width with what there is', async () => {
    const photo = await add(await makePicture(500, 400, { format: 'png' }))
    expect(photo.webpSrcset).toBe(`/api/photos/${photo.id}/320.webp 320w, /api/photos/${photo.id}/800.webp 500w`)
    expect(await sharp(await readPhoto(database.db, store, photo.id, 1600, 'webp')).metadata()).toMatchObject({ width: 500 })
  })

  it.each(['jpeg', 'png', 'webp', 'avif'] as const)('accepts %s, whatever its name', async (format) => {
    expect(await add(await makePicture(64, 48, { format }), 'no-ending')).toMatchObject({ width: 64, height: 48 })
  })

  it('makes AVIF by a job that the same transaction added', async () => {
    const photo = await add(await makePicture(640, 480))
    const { rows } = await database.pool.query<{ task_identifier: string }>('select task_identifier from graphile_worker.jobs')
    expect(rows.map(row => row.task_identifier)).toContain('make-avif')
    await expect(readPhoto(database.db, store, photo.id, 320, 'avif')).rejects.toMatchObject({ statusCode: 404 })
    const [file] = await database.db.select({ id: files.id }).from(files).innerJoin(photos, eq(photos.fileId, files.id)).where(eq(photos.id, photo.id))
    await makeAvif(database.db, store, file?.id ?? '')
    const [made] = await listPhotosOf(database.db, unit.tag)
    expect(made?.avifSrcset).toContain('/320.avif 320w')
    expect(await sharp(await readPhoto(database.db, store, photo.id, 320, 'avif')).metadata()).toMatchObject({ format: 'heif', width: 320 })
  })

  it('takes the same bytes twice as one photo, even at once', async () => {
    const bytes = await makePicture(300, 200, { shade: 33 })
    const sent = await Promise.all([add(bytes), add(bytes), add(bytes)])
    expect(new Set(sent.map(photo => photo.id)).size).toBe(1)
    expect(await listPhotosOf(database.db, unit.tag)).toHaveLength(1)
    expect((await store.keys()).filter(key => key.endsWith('master.jpg'))).toHaveLength(1)
    expect((await events()).filter(event => event === 'photo_added')).toHaveLength(1)
  })

  it.each([
    ['an SVG named .jpg', async () => Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>'), 415, 'not a picture'],
    ['HTML named .jpg', async () => Buffer.from('<!doctype html><script>alert(1)</script>'), 415, 'not a picture'],
    ['a GIF', async () => sharp({ create: { width: 9, height: 9, channels: 3, background: '#000' } }).gif().toBuffer(), 415, 'not a picture'],
    ['HEIC', async () => Buffer.from('0000001c667479706865696300000000686569636d69663168656963', 'hex'), 415, 'HEIC'],
    ['a truncated JPEG', async () => (await makeNoisyJpeg(400, 300)).subarray(0, 20_000), 422, 'damaged'],
    ['a JPEG that is only its first bytes', async () => (await makeNoisyJpeg(40, 30)).subarray(0, 40), 422, 'damaged'],
    ['a truncated PNG', async () => (await makePicture(3000, 2000, { format: 'png' })).subarray(0, 900), 422, 'damaged'],
    ['100 megapixels in a few kilobytes', async () => makePicture(10_000, 10_000, { format: 'png' }), 413, '100 megapixels'],
    ['more than 25 MB', async () => Buffer.alloc(25_000_001), 413, '25 MB'],
  ])('refuses %s and keeps nothing of it', async (_what, make, statusCode, words) => {
    await expect(add(await make())).rejects.toMatchObject({ statusCode, message: expect.stringContaining(words) })
    expect(await store.keys()).toEqual([])
    expect(await listPhotosOf(database.db, unit.tag)).toEqual([])
  })

  it('changes what is said of a photo, refuses a stale change, and tells both in the story', async () => {
    const photo = await add(await makePicture(100, 100))
    const changed = await changePhoto(database.db, floor, { id: photo.id, caption: 'Left knob is not original', isPublic: false, version: photo.version })
    expect(changed).toMatchObject({ caption: 'Left knob is not original', isPublic: false, subject: 'front', version: 2 })
    await expect(changePhoto(database.db, floor, { id: photo.id, caption: 'Other', version: photo.version }))
      .rejects.toMatchObject({ statusCode: 409, data: { code: 'stale', current: { caption: 'Left knob is not original' } } })
    expect(await events()).toEqual(['photo_added', 'edited'])
  })

  it('removes a photo with a reason and serves it no more', async () => {
    const photo = await add(await makePicture(100, 100))
    await removePhoto(database.db, floor, { id: photo.id, why: 'It shows the unit beside it' })
    expect(await listPhotosOf(database.db, unit.tag)).toEqual([])
    await expect(readPhoto(database.db, store, photo.id, 320, 'webp')).rejects.toMatchObject({ statusCode: 404 })
    expect(await events()).toEqual(['photo_added', 'photo_removed'])
  })

  it('names each unit’s first photo in the order a buyer wants to see them', async () => {
    const rear = await addPhoto(database.db, store, floor, { tag: unit.tag, name: 'r', bytes: await makePicture(90, 90, { shade: 9 }), subject: 'rear', caption: '' })
    const front = await add(await makePicture(91, 91))
    expect((await listPhotosOf(database.db, unit.tag)).map(photo => photo.id)).toEqual([front.id, rear.id])
    expect((await listThumbnails(database.db, [unit.id])).get(unit.id)).toBe(front.thumbnailUrl)
  })

  it('shows the waveform of a reading of the unit’s own sheet, the same picture taken before included', async () => {
    const { db } = database
    const sheetOf = async (each: typeof unit) => {
      await makeTriage(db, floor, each.id)
      return startTestSheet(db, floor, { tag: each.tag, energised: true })
    }
    const [own, others] = [await sheetOf(unit), await sheetOf(await makeUnit(db, floor))]
    const bytes = await makePicture(90, 90, { shade: 3 })
    const before = await add(bytes)
    const waveform = { tag: unit.tag, name: 'w', bytes, subject: 'detail' as const, caption: '' }
    await expect(addPhoto(db, store, floor, { ...waveform, readingId: others.readings[0]?.id })).rejects.toMatchObject({ data: { errors: [{ path: 'readingId' }] } })
    expect(await addPhoto(db, store, floor, { ...waveform, readingId: own.readings[1]?.id })).toMatchObject({ id: before.id })
    const taken = await addPhoto(db, store, floor, { ...waveform, bytes: await makePicture(90, 90, { shade: 5 }), readingId: own.readings[1]?.id })
    expect((await getTestSheet(db, { tag: unit.tag, number: 1 })).readings[1]?.photoIds).toEqual([before.id, taken.id])
  })

  it('refuses a work-log entry of another unit', async () => {
    const bytes = await makePicture(80, 80)
    await expect(addPhoto(database.db, store, floor, { tag: unit.tag, name: 'x', bytes, subject: 'after', caption: '', modificationId: crypto.randomUUID() }))
      .rejects.toMatchObject({ statusCode: 422 })
    expect(await store.keys()).toEqual([])
  })
})
