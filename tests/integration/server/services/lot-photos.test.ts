import { beforeAll, describe, expect, it } from 'vitest'
import sharp from 'sharp'
import { readLotPhoto, setLotPhoto } from '../../../../server/services/lot-photos'
import type { PartLotView } from '../../../../shared/types/part'
import type { Person } from '../../../../shared/types/person'
import { useTestDatabase } from '../../../support/database'
import { makeLot } from '../../../support/lots'
import { makeMemoryFileStore } from '../../../support/memory-file-store'
import { makePhoneJpeg } from '../../../support/pictures'
import { makePerson, makeShop } from '../../../support/records'

describe('the picture of a lot', () => {
  const database = useTestDatabase()
  const store = makeMemoryFileStore()
  let owner: Person
  let lot: PartLotView
  beforeAll(async () => {
    await makeShop(database.db)
    owner = await makePerson(database.db, 'owner')
    lot = await makeLot(database.db, owner)
  })
  const set = async (bytes: Uint8Array) => setLotPhoto(database.db, store, owner, { tag: lot.tag, name: 'markings.jpg', bytes })
  const fileOf = (view: PartLotView) => new URL(view.photoUrl ?? '', 'https://shop.invalid').searchParams.get('of') ?? ''

  it('is turned upright, made small, and served at an address of its own', async () => {
    const view = await set(await makePhoneJpeg(2000, 1000))
    expect(view.photoUrl).toMatch(new RegExp(`^/api/parts/${lot.tag}/photo\\?of=`, 'u'))
    const picture = await sharp(await readLotPhoto(database.db, store, { tag: lot.tag, fileId: fileOf(view) })).metadata()
    expect(picture).toMatchObject({ format: 'webp', width: 800, height: 1600 })
    expect(picture.exif).toBeUndefined()
  })
  it('takes the place of an earlier one, which is served no more', async () => {
    const before = await set(await makePhoneJpeg(300, 200))
    const after = await set(await makePhoneJpeg(310, 200))
    await expect(readLotPhoto(database.db, store, { tag: lot.tag, fileId: fileOf(before) })).rejects.toMatchObject({ statusCode: 404 })
    expect((await readLotPhoto(database.db, store, { tag: lot.tag, fileId: fileOf(after) })).byteLength).toBeGreaterThan(100)
  })
  it('is judged by its content, whatever it is called', async () => {
    await expect(set(Buffer.from('%PDF-1.7 not a picture at all'))).rejects.toMatchObject({ statusCode: 415 })
  })
})
