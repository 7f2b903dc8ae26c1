import { and, eq, isNull } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import { keptWithItems, safetyChecks, sales, triages, unitDisclosures } from '../../../../drizzle/schema'
import { addKeptWith, setPacked } from '../../../../server/services/kept-with'
import { holdUnit, moveUnit } from '../../../../server/services/moves'
import { sellUnit, undoSale } from '../../../../server/services/sales'
import { listStory } from '../../../../server/services/story'
import { getUnitView } from '../../../../server/services/unit-view'
import { DISCLOSURE_KEYS } from '../../../../shared/domain/disclosures'
import type { Person } from '../../../../shared/types/person'
import { makePerson, makeShop, makeUnit } from '../../../support/records'
import { useTestDatabase } from '../../../support/database'

describe('the simple sale', () => {
  const database = useTestDatabase()
  let owner: Person
  let floor: Person

  beforeAll(async () => {
    await makeShop(database.db)
    owner = await makePerson(database.db, 'owner')
    floor = await makePerson(database.db, 'floor')
  })

  async function offered() {
    const unit = await makeUnit(database.db, owner, { state: 'offered', askingMinor: 14_500, askingCurrency: 'GBP' })
    await database.db.insert(triages).values({ unitId: unit.id, safetyClass: 'earthed', lead: 'sound', plug: 'sound', fuse: 'sound', verdict: 'may_be_powered', doneBy: owner.id })
    await database.db.insert(safetyChecks).values({
      unitId: unit.id, safetyClass: 'earthed', leadAndPlug: 'pass', fuse: 'pass', polarity: 'pass', visual: 'pass', earthBondLimitMilliohm: 100,
      insulationLimitKilohm: 1000, leakageLimitMicroamp: 3500, limitsOrigin: 'invented', passed: true, doneBy: owner.id,
    })
    await database.db.insert(unitDisclosures).values(DISCLOSURE_KEYS.map(key => ({ unitId: unit.id, key, answer: 'not_looked' as const, answeredBy: owner.id })))
    return unit
  }
  const sale = (tag: string, values: { version?: number, buyerName?: string, soldOn?: string } = {}, actor = owner) => sellUnit(database.db, actor, {
    tag, buyerName: 'Mr Pell', buyerContact: 'By letter', priceMinor: 14_000, currency: 'GBP', soldOn: '2026-03-09', version: 1, ...values,
  })

  /** A sale of another unit, whose buyer and sheet stand in where only the row matters. */
  async function otherSale() {
    const other = await offered()
    await sale(other.tag)
    const [row] = await database.db.select().from(sales).where(eq(sales.unitId, other.id))
    if (!row) throw new Error('The other sale was not written')
    return row
  }

  it('records buyer, price and day, and freezes the sheet as it stood, without cost or name', async () => {
    const { id, tag } = await offered()
    expect(await sale(tag)).toMatchObject({ state: 'sold', sale: { soldOn: '2026-03-09', buyer: 'Mr Pell', priceMinor: 14_000, currency: 'GBP' } })
    const [row] = await database.db.select().from(sales).where(eq(sales.unitId, id))
    expect(row?.frozenSheet).toMatchObject({ form: 2, tag, maker: 'Oxmarden' })
    expect(JSON.stringify(row?.frozenSheet)).not.toMatch(/Mr Pell|costMinor|locationId/)
    expect(await getUnitView(database.db, floor, tag)).toMatchObject({ sale: { buyer: null, priceMinor: 14_000 } })
    expect(await getUnitView(database.db, { role: 'reader' }, tag)).toMatchObject({ sale: { buyer: null, priceMinor: null } })
  })

  it('is the owner’s alone, of an offered piece, not dated ahead', async () => {
    const { tag } = await offered()
    await expect(sale(tag, {}, floor)).rejects.toMatchObject({ statusCode: 403 })
    await expect(sale(tag, { soldOn: '2199-01-01' })).rejects.toMatchObject({ statusCode: 422, data: { errors: [{ path: 'soldOn' }] } })
    const intake = await makeUnit(database.db, owner)
    await expect(sale(intake.tag)).rejects.toMatchObject({ data: { code: 'move-refused', refusals: [{ guard: 'no-such-move' }] } })
    await expect(moveUnit(database.db, owner, { tag, to: 'sold', why: '', ownerConsent: '', version: 1 })).rejects.toMatchObject({ data: { code: 'own-form' } })
  })

  it('is one of two people’s who sell the same piece at once', async () => {
    const { id, tag } = await offered()
    const both = await Promise.allSettled([sale(tag, { buyerName: 'Mr Pell' }), sale(tag, { buyerName: 'Mrs Dunmore' })])
    expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected'])
    expect(both.find(({ status }) => status === 'rejected')).toMatchObject({ reason: { statusCode: 409, data: { code: 'stale', current: { state: 'sold' } } } })
    expect(await database.db.select().from(sales).where(eq(sales.unitId, id))).toHaveLength(1)
  })

  it('is refused in words where a sale still stands, whatever the state says', async () => {
    const { id, tag } = await offered()
    const { buyerId, frozenSheet } = await otherSale()
    await database.db.insert(sales).values({ unitId: id, buyerId, frozenSheet, priceMinor: 1, currency: 'GBP', soldOn: '2026-01-01', soldBy: owner.id })
    await expect(sale(tag)).rejects.toMatchObject({ statusCode: 409, data: { code: 'already-sold' } })
    expect(await getUnitView(database.db, owner, tag)).toMatchObject({ state: 'offered', version: 1 })
  })

  it('ends a hold, and comes undone when the piece comes back: unpacked, in the story, and sellable again', async () => {
    const { id, tag } = await offered()
    const item = await addKeptWith(database.db, owner, { tag, kind: 'lead', description: 'Output lead', originality: 'original', condition: '', whereabouts: 'with_unit', placeTag: null, absenceDisclosed: '' })
    await holdUnit(database.db, owner, { tag, heldFor: 'Mr Pell', until: '2199-01-01', note: '', version: 1 })
    expect(await sale(tag, { version: 2 })).toMatchObject({ state: 'sold', hold: null })
    await setPacked(database.db, floor, { tag: item.tag, packed: true })
    await moveUnit(database.db, floor, { tag, to: 'dispatched', why: '', ownerConsent: '', version: 3 })
    await expect(undoSale(database.db, owner, { tag, to: 'offered', why: 'Changed his mind', version: 4 })).rejects.toMatchObject({ data: { code: 'move-refused' } })
    expect(await undoSale(database.db, owner, { tag, to: 'returned', why: 'Arrived broken', version: 4 })).toMatchObject({ state: 'returned', sale: null })
    const [unpacked] = await database.db.select().from(keptWithItems).where(eq(keptWithItems.tag, item.tag))
    expect(unpacked?.packedAt).toBeNull()
    expect(await database.db.select().from(sales).where(and(eq(sales.unitId, id), isNull(sales.undoneAt)))).toEqual([])
    const told = (await listStory(database.db, owner, { tag, limit: 50 })).items.map(({ sentence }) => sentence)
    expect(told.slice(0, 3)).toEqual(['Went from “Dispatched” to “Returned”', expect.stringMatching(/^Unpacked Output lead/), 'The sale was undone'])
    await moveUnit(database.db, owner, { tag, to: 'bench', why: '', ownerConsent: '', version: 5 })
    await moveUnit(database.db, owner, { tag, to: 'ready', why: '', ownerConsent: '', version: 6 })
    await moveUnit(database.db, owner, { tag, to: 'offered', why: '', ownerConsent: '', version: 7 })
    expect(await sale(tag, { version: 8, buyerName: 'Mrs Dunmore' })).toMatchObject({ state: 'sold', sale: { buyer: 'Mrs Dunmore' } })
  })

  it('falls through before it left, and is offered again', async () => {
    const { tag } = await offered()
    await sale(tag)
    expect(await undoSale(database.db, owner, { tag, to: 'offered', why: 'The cheque was returned', version: 2 })).toMatchObject({ state: 'offered', sale: null })
  })
})
