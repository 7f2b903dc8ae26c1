import { randomUUID } from 'node:crypto'
import { desc, eq } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import { ledger } from '../../../../drizzle/schema'
import type { Person } from '../../../../shared/types/person'
import { correctReceipt, changeStanding } from '../../../../server/services/part-lots'
import { listPartTypes, listReorder, setMinimum } from '../../../../server/services/reorder'
import { useTestDatabase } from '../../../support/database'
import { makeLot } from '../../../support/lots'
import { makePerson, makeShop } from '../../../support/records'

const test = useTestDatabase()
const db = () => test.db
let owner: Person
let floor: Person

beforeAll(async () => {
  await makeShop(db())
  owner = await makePerson(db(), 'owner')
  floor = await makePerson(db(), 'floor')
})

let number = 0
/** A type of its own with one lot in its drawer. */
const makeType = (said: Record<string, unknown> = {}, type: Record<string, unknown> = {}) => makeLot(db(), owner, { type: { kind: 'capacitor', description: `Capacitor ${++number}`, ...type }, ...said })
const lineOf = async (typeId: string, reader = owner) => (await listReorder(db(), reader)).find(({ type }) => type.id === typeId)
const watch = ({ type }: { type: { id: string, version: number } }, minimum: string) => setMinimum(db(), owner, { id: type.id, minimum, version: type.version })

describe('parts to be bought again', () => {
  it('are those of which fewer good ones are there than the minimum, all lots together', async () => {
    const first = await makeType({ quantity: '6' })
    await makeLot(db(), owner, { type: first.type, quantity: '5' })
    await watch(first, '11')
    expect(await lineOf(first.type.id)).toBeUndefined()
    const changed = await listPartTypes(db(), { q: first.type.description })
    await watch(changed[0] ?? first, '12')
    expect(await lineOf(first.type.id)).toMatchObject({ inStock: 11, minimum: 12, short: 1 })
  })

  it('do not count what may not be fitted', async () => {
    const lot = await makeType()
    await watch(lot, '10')
    expect(await lineOf(lot.type.id)).toBeUndefined()
    await changeStanding(db(), owner, { tag: lot.tag, version: lot.version, standing: 'quarantined', why: 'They leak' })
    expect(await lineOf(lot.type.id)).toMatchObject({ inStock: 0, short: 10 })
  })

  it('say who sold the last, and what the last of known cost was bought for', async () => {
    const lot = await makeType({ acquiredOn: '2026-01-10', quantity: '4', cost: '10' })
    // The correction is what came in: not the slip and its reversal besides.
    await correctReceipt(db(), owner, { tag: lot.tag, version: lot.version, quantity: '5', cost: '12.50', why: 'A slip' })
    await makeLot(db(), owner, { type: lot.type, quantity: '1', cost: '', acquiredOn: '2026-02-10', supplierName: 'Distributor B' })
    await makeLot(db(), owner, { type: lot.type, quantity: '1', cost: '0.10', acquiredOn: '2026-03-10', sourceKind: 'old_stock', supplierName: '' })
    await watch(lot, '100')
    expect(await lineOf(lot.type.id)).toMatchObject({ inStock: 7, short: 93, lastSupplier: 'Distributor B', lastBought: { quantity: 5, costMinor: 1250, currency: 'GBP' } })
  })

  it('tell neither name nor cost to those who may not see them', async () => {
    const lot = await makeType()
    await watch(lot, '50')
    expect(await lineOf(lot.type.id, floor)).toMatchObject({ short: 40, lastSupplier: null, lastBought: null })
  })
})

describe('a minimum', () => {
  it('is typed as the part is counted, told, and taken off again', async () => {
    const wire = await makeType({ quantity: '2 m' }, { kind: 'wire', description: 'Sleeving, 2 mm', countedIn: 'millimetre' })
    const set = await watch(wire, '2.5 m')
    expect(set).toMatchObject({ inStock: 2000, type: { minimum: 2500, version: wire.type.version + 1 } })
    const cleared = await watch(set, '')
    expect(cleared.type.minimum).toBeNull()
    expect(await lineOf(wire.type.id)).toBeUndefined()
    const entries = await db().select({ subject: ledger.subject, details: ledger.details }).from(ledger).where(eq(ledger.event, 'changed')).orderBy(desc(ledger.id)).limit(2)
    expect(entries).toEqual([
      { subject: 'shop', details: { name: 'Sleeving, 2 mm', changes: [{ field: 'minimum', from: '2.5\u202Fm', to: null }] } },
      { subject: 'shop', details: { name: 'Sleeving, 2 mm', changes: [{ field: 'minimum', from: null, to: '2.5\u202Fm' }] } },
    ])
  })

  it('is refused where it can’t be, where somebody else changed it, and for no such part', async () => {
    const lot = await makeType()
    await expect(watch(lot, '2.5')).rejects.toMatchObject({ statusCode: 422, data: { errors: [{ path: 'minimum', message: 'Pieces come whole: enter a whole number' }] } })
    await expect(watch(lot, '0')).rejects.toMatchObject({ statusCode: 422 })
    await watch(lot, '4')
    await expect(watch(lot, '5')).rejects.toMatchObject({ statusCode: 409, data: { code: 'stale', current: { inStock: 10, type: { minimum: 4 } } } })
    await expect(setMinimum(db(), owner, { id: randomUUID(), minimum: '1', version: 1 })).rejects.toMatchObject({ statusCode: 404, data: { code: 'no-such-part-type' } })
  })

  it('of any part is found by its words, those watched first', async () => {
    const plain = await makeType({}, { description: 'Grommet, narrow' })
    const watched = await makeType({}, { description: 'Grommet, wide', value: '50%' })
    await watch(watched, '5')
    expect((await listPartTypes(db(), { q: 'grom' })).map(({ type }) => type.id)).toEqual([watched.type.id, plain.type.id])
    expect((await listPartTypes(db(), { q: '50% grommet' })).map(({ type }) => type.id)).toEqual([watched.type.id])
    expect(await listPartTypes(db(), { q: '_%' })).toEqual([])
  })
})
