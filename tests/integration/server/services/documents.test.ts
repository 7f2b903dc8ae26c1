import { beforeAll, describe, expect, it } from 'vitest'
import { addDocument, listDocumentsOf, readDocument, removeDocument } from '../../../../server/services/documents'
import type { Person } from '../../../../shared/types/person'
import { useTestDatabase } from '../../../support/database'
import { makeMemoryFileStore } from '../../../support/memory-file-store'
import { makePdf, makePicture } from '../../../support/pictures'
import { makeModel, makePerson, makeShop, makeUnit } from '../../../support/records'

describe('documents', () => {
  const database = useTestDatabase()
  const store = makeMemoryFileStore()
  let bench: Person

  beforeAll(async () => {
    await makeShop(database.db)
    bench = await makePerson(database.db, 'bench')
  })

  it('keeps a PDF with a unit, once however often it is sent', async () => {
    const unit = await makeUnit(database.db, bench)
    const bytes = makePdf('handbook')
    const send = () => addDocument(database.db, store, bench, { owner: { unitTag: unit.tag }, name: 'Handbook “2nd issue”.pdf', bytes, title: '', isPublic: true })
    const [first, second] = [await send(), await send()]
    expect(first).toMatchObject({ title: 'Handbook “2nd issue”', byteSize: bytes.byteLength, isPublic: true })
    expect(second.id).toBe(first.id)
    expect(await readDocument(database.db, store, first.id)).toEqual({ name: 'Handbook “2nd issue”.pdf', bytes })
    await removeDocument(database.db, bench, { id: first.id, why: 'It belongs to another issue' })
    expect(await listDocumentsOf(database.db, { unitTag: unit.tag })).toEqual([])
    await expect(readDocument(database.db, store, first.id)).rejects.toMatchObject({ statusCode: 404 })
  })

  it('keeps a PDF with a model', async () => {
    const model = await makeModel(database.db)
    await addDocument(database.db, store, bench, { owner: { modelId: model.id }, name: 'circuit.pdf', bytes: makePdf('circuit'), title: 'Circuit diagram', isPublic: false })
    expect(await listDocumentsOf(database.db, { modelId: model.id })).toMatchObject([{ title: 'Circuit diagram' }])
  })

  it.each([
    ['a picture named .pdf', () => makePicture(10, 10), 415],
    ['HTML named .pdf', async () => Buffer.from('<html>%PDF-1.4 %%EOF</html>'), 415],
    ['a PDF that lost its end', async () => makePdf().subarray(0, -40), 422],
    ['a PDF whose table lies beyond its end', async () => Buffer.from(makePdf().toString('latin1').replace(/startxref\n\d+/, 'startxref\n999999'), 'latin1'), 422],
  ])('refuses %s', async (_what, make, statusCode) => {
    const unit = await makeUnit(database.db, bench)
    const bytes = await make()
    await expect(addDocument(database.db, store, bench, { owner: { unitTag: unit.tag }, name: 'manual.pdf', bytes, title: '', isPublic: false })).rejects.toMatchObject({ statusCode })
    expect(await listDocumentsOf(database.db, { unitTag: unit.tag })).toEqual([])
  })
})
