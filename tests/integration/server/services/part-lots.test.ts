import { eq, sql } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import { lotMovements, partLots, units } from '../../../../drizzle/schema'
import { lotsQuery } from '../../../../shared/schemas/part-lot'
import { makeTag } from '../../../../shared/domain/tag'
import type { Person } from '../../../../shared/types/person'
import { breakUnit, putLotBack } from '../../../../server/services/donors'
import { addFitting, listFittingsOf, undoFitting } from '../../../../server/services/fittings'
import { removeFromLot, splitLot, undoMovement } from '../../../../server/services/lot-changes'
import { countLot, listOpenFindings, settleCount } from '../../../../server/services/lot-counts'
import { getLotView } from '../../../../server/services/lot-view'
import { logModification, withdrawModification } from '../../../../server/services/modifications'
import { moveUnit } from '../../../../server/services/moves'
import { changeLot, changeStanding, correctReceipt, enterLot, listLots } from '../../../../server/services/part-lots'
import { getDonor } from '../../../../server/services/pulled-lots'
import { useTestDatabase } from '../../../support/database'
import { makeLot, typedBreak, typedFitting, typedLot, typedWork } from '../../../support/lots'
import { makePerson, makeShop, makeUnit } from '../../../support/records'
import { makeTriage } from '../../../support/bench'

const test = useTestDatabase()
const db = () => test.db
let owner: Person
let bench: Person
let floor: Person

beforeAll(async () => {
  await makeShop(db())
  owner = await makePerson(db(), 'owner')
  bench = await makePerson(db(), 'bench')
  floor = await makePerson(db(), 'floor')
})

const onBench = async (values: Partial<typeof units.$inferInsert> = {}) => makeUnit(db(), owner, { state: 'bench', ...values })
/** A unit that may be broken: looked over, with a known cost. */
async function donor(costMinor: number | null = 10_000) {
  const unit = await onBench({ costMinor, costCurrency: costMinor === null ? null : 'GBP' })
  await makeTriage(db(), bench, unit.id)
  return unit
}
const part = (description: string, said: Record<string, unknown> = {}) => ({ type: { kind: 'transformer', description }, quantity: '1', ...said })
/** A source-date code of the EIA (maker, year, week) of the year after this one. */
const nextYearsCode = () => `190-${String((new Date().getFullYear() + 1) % 100).padStart(2, '0')}50`
/** What came in is what went out and what is left, and so is its cost, to the cent. */
async function expectBalanced(tag: string, costInMinor: number) {
  const lot = await getLotView(db(), owner, tag)
  const { cameIn, fitted, sold, scrapped, lost, inDrawer } = lot.balance
  expect(fitted + sold + scrapped + lost + inDrawer).toBe(cameIn)
  expect(inDrawer).toBe(lot.quantity)
  const spent = lot.movements.filter(({ kind }) => kind !== 'received').reduce((sum, { costMinor }) => sum - (costMinor ?? 0), 0)
  expect(spent + (lot.costMinor ?? 0)).toBe(costInMinor)
  return lot
}

describe('entering a lot', () => {
  it('gives it the next P tag, its type, its supplier and what it cost', async () => {
    const lot = await makeLot(db(), owner)
    expect(lot).toMatchObject({
      supplier: 'Distributor A', invoiceNumber: '88/114', quantity: 10, costMinor: 1250, currency: 'GBP', standing: 'good',
      type: { kind: 'capacitor', description: 'Suppression capacitor X2', countedIn: 'piece' }, balance: { cameIn: 10, inDrawer: 10, fitted: 0 },
    })
    expect(lot.tag).toMatch(/^P\d{6}[0-9A-Z]$/u)
  })
  it('keeps two lots of one type apart, whatever the letters’ case of their words', async () => {
    const good = await makeLot(db(), owner, { type: { kind: 'semiconductor', description: 'Power transistor pair TO-3', rating: '140 V 15 A' }, supplierName: 'Distributor A' })
    const fake = await makeLot(db(), owner, { type: { kind: 'semiconductor', description: 'power transistor pair to-3', rating: '140 V 15 A' }, supplierName: 'A marketplace' })
    expect(fake.type.id).toBe(good.type.id)
    expect(fake.tag).not.toBe(good.tag)
    expect((await listLots(db(), owner, lotsQuery.parse({ q: 'transistor pair' }))).items.map(({ tag }) => tag)).toEqual([fake.tag, good.tag])
  })
  it('shows no cost and no supplier to the floor, and takes no cost from it', async () => {
    const { tag } = await makeLot(db(), owner)
    expect(await getLotView(db(), floor, tag)).toMatchObject({ supplier: null, invoiceNumber: null, costMinor: null, currency: null, movements: [{ costMinor: null }] })
    await expect(enterLot(db(), floor, typedLot())).rejects.toMatchObject({ statusCode: 403 })
    expect((await enterLot(db(), floor, typedLot({ cost: '' }))).quantity).toBe(10)
  })
  it('refuses a lot from a day, or made on a day, that is still to come', async () => {
    await expect(makeLot(db(), owner, { acquiredOn: '2099-01-01' })).rejects.toMatchObject({ data: { errors: [{ path: 'acquiredOn' }] } })
    await expect(makeLot(db(), owner, { dateCode: '190-9852', acquiredOn: '1997-01-01' })).resolves.toMatchObject({ dateCode: '190-9852' })
    await expect(makeLot(db(), owner, { dateCode: nextYearsCode() })).rejects.toMatchObject({ data: { errors: [{ path: 'dateCode', message: expect.stringContaining('which is still to come') }] } })
    expect(await makeLot(db(), owner, { dateCode: '9999' })).toMatchObject({ dateCode: '9999' })
    await expect(makeLot(db(), owner, { madeFrom: '2099-01-01', madeTo: '2099-01-07' })).rejects.toMatchObject({ data: { errors: [{ path: 'madeFrom', message: 'This date code is still to come: read it again' }] } })
  })
  it('counts wire in metres to the millimetre', async () => {
    const lot = await makeLot(db(), owner, { type: { kind: 'wire', description: 'Mains flex 3-core', countedIn: 'millimetre' }, quantity: '50 m', cost: '40' })
    const unit = await onBench()
    await logModification(db(), bench, { tag: unit.tag, ...typedWork([typedFitting(lot.tag, { quantity: '1.85' })]) })
    expect(await expectBalanced(lot.tag, 4000)).toMatchObject({ quantity: 48_150, costMinor: 3852 })
  })
})

describe('correcting a lot', () => {
  it('puts it with another type, and says in the ledger what it was', async () => {
    const lot = await makeLot(db(), owner)
    const changed = await changeLot(db(), floor, {
      tag: lot.tag, version: lot.version, type: { ...lot.type, value: '0.22 µF' }, maker: 'Dielmark', dateCode: '2311', madeFrom: null, madeTo: null, condition: 'new', tested: '', note: '', placeTag: null, source: null,
    })
    expect(changed).toMatchObject({ type: { value: '0.22 µF' }, dateCode: '2311', supplier: null })
    await expect(changeLot(db(), owner, { ...changed, placeTag: null, source: null, version: lot.version })).rejects.toMatchObject({ statusCode: 409, data: { code: 'stale' } })
  })
  it('never lets a lot be its own source, at any remove', async () => {
    const first = await makeLot(db(), owner)
    const second = await splitLot(db(), owner, { tag: first.tag, quantity: '2', why: 'A matched pair', tested: '', standing: 'good', placeTag: null })
    const said = { type: first.type, maker: '', dateCode: '', madeFrom: null, madeTo: null, condition: 'new' as const, tested: '', note: '', placeTag: null }
    const from = (parentTag: string) => ({ sourceKind: 'split' as const, supplierName: '', invoiceNumber: '', acquiredOn: '2026-02-01', parentTag })
    const { version } = await getLotView(db(), owner, first.tag)
    for (const parentTag of [first.tag, second.tag]) {
      await expect(changeLot(db(), owner, { tag: first.tag, version, ...said, source: from(parentTag) })).rejects.toMatchObject({
        data: { errors: [{ path: 'source.parentTag', message: 'A lot can’t be its own source, and that one came out of this one' }] },
      })
    }
    await expect(db().update(partLots).set({ parentLotId: sql`id`, sourceKind: 'split' }).where(eq(partLots.tag, first.tag))).rejects.toThrow()
  })
  it('corrects what came in only while none of it has been used', async () => {
    const lot = await makeLot(db(), owner, { cost: '' })
    expect(lot.costMinor).toBeNull()
    const right = await correctReceipt(db(), owner, { tag: lot.tag, version: lot.version, quantity: '12', cost: '15.00', why: 'Two more were in the bag' })
    expect(right).toMatchObject({ quantity: 12, costMinor: 1500, balance: { cameIn: 12, inDrawer: 12 } })
    const used = await removeFromLot(db(), owner, { tag: lot.tag, how: 'scrapped', quantity: '1', note: 'Cracked' })
    await expect(correctReceipt(db(), owner, { tag: lot.tag, version: used.version, quantity: '10', cost: '1', why: 'x' })).rejects.toMatchObject({ data: { code: 'lot-in-use' } })
  })
})

describe('fitting parts', () => {
  it('takes them out of the drawer with their share of the cost as the work is logged, and puts them back when it is withdrawn', async () => {
    const lot = await makeLot(db(), owner, { quantity: '3', cost: '10.00' })
    const unit = await onBench()
    const entry = await logModification(db(), bench, { tag: unit.tag, ...typedWork([typedFitting(lot.tag, { quantity: '2' })]) })
    expect(entry.fitted).toEqual([expect.stringMatching(/^C14: 2 × Suppression capacitor X2 · 0\.1 µF · 275 V AC; marked Dielmark 2308; new; lot P /u)])
    expect(await expectBalanced(lot.tag, 1000)).toMatchObject({ quantity: 1, costMinor: 333, balance: { fitted: 2 } })
    expect(await listFittingsOf(db(), bench, unit.tag)).toMatchObject([{ quantity: 2, costMinor: 667, lot: { tag: lot.tag }, undoneBecause: null }])
    expect(await listFittingsOf(db(), floor, unit.tag)).toMatchObject([{ costMinor: null, currency: null }])
    await withdrawModification(db(), bench, { tag: unit.tag, id: entry.id, version: entry.version, why: 'It was another set' })
    expect(await expectBalanced(lot.tag, 1000)).toMatchObject({ quantity: 3, costMinor: 1000, balance: { fitted: 0 } })
  })
  it('writes nothing at all when one of several parts can’t be had', async () => {
    const plenty = await makeLot(db(), owner)
    const few = await makeLot(db(), owner, { quantity: '1', cost: '1' })
    const unit = await onBench()
    await expect(logModification(db(), bench, { tag: unit.tag, ...typedWork([typedFitting(plenty.tag), typedFitting(few.tag, { quantity: '2' })]) })).rejects.toMatchObject({
      statusCode: 409, data: { code: 'not-enough', detail: expect.stringContaining('only 1 is left, and 2 are wanted. Nothing was taken.') },
    })
    expect((await getLotView(db(), owner, plenty.tag)).movements).toHaveLength(1)
    expect(await listFittingsOf(db(), owner, unit.tag)).toEqual([])
  })
  it('gives the last one to one of twenty people who take it at once', async () => {
    const lot = await makeLot(db(), owner, { quantity: '1', cost: '0.05' })
    const pieces = await Promise.all(Array.from({ length: 20 }, () => onBench()))
    const results = await Promise.allSettled(pieces.map(unit => logModification(db(), bench, { tag: unit.tag, ...typedWork([typedFitting(lot.tag)]) })))
    expect(results.filter(({ status }) => status === 'fulfilled')).toHaveLength(1)
    for (const result of results.filter(each => each.status === 'rejected')) expect(result.reason).toMatchObject({ statusCode: 409, data: { code: 'not-enough' } })
    expect(await expectBalanced(lot.tag, 5)).toMatchObject({ quantity: 0, costMinor: 0, balance: { fitted: 1 } })
    // The entries of those who came too late were not written either.
    const fitted = await Promise.all(pieces.map(unit => listFittingsOf(db(), owner, unit.tag)))
    expect(fitted.filter(list => list.length > 0)).toHaveLength(1)
  })
  it('fits nothing from a lot in quarantine or withdrawn, and again once it is released', async () => {
    const lot = await makeLot(db(), owner)
    const unit = await onBench()
    const held = await changeStanding(db(), bench, { tag: lot.tag, version: lot.version, standing: 'quarantined', why: '3 of 8 gassy' })
    await expect(logModification(db(), bench, { tag: unit.tag, ...typedWork([typedFitting(lot.tag)]) })).rejects.toMatchObject({ data: { code: 'lot-not-good', detail: expect.stringContaining('is in quarantine: 3 of 8 gassy') } })
    await changeStanding(db(), bench, { tag: lot.tag, version: held.version, standing: 'good', why: 'Load-tested' })
    expect((await logModification(db(), bench, { tag: unit.tag, ...typedWork([typedFitting(lot.tag)]) })).fitted).toHaveLength(1)
  })
  it('says honestly that a lot is unknown', async () => {
    const unit = await onBench()
    const entry = await logModification(db(), bench, { tag: unit.tag, ...typedWork([typedFitting(null, { description: 'Dial lamp', circuitReference: 'LP1' })]) })
    expect(entry.fitted).toEqual(['LP1: Dial lamp; lot unknown'])
  })
  it('names a lot that does not exist at its own field', async () => {
    const unit = await onBench()
    await expect(logModification(db(), bench, { tag: unit.tag, ...typedWork([typedFitting(makeTag('P', 999_999))]) })).rejects.toMatchObject({
      statusCode: 422, data: { errors: [{ path: 'fittings.0.lotTag' }] },
    })
  })
  it('makes a returned old part a lot with the unit as its donor, and takes it back with the fitting', async () => {
    const first = await makeLot(db(), owner)
    const second = await makeLot(db(), owner)
    const unit = await onBench()
    await logModification(db(), bench, { tag: unit.tag, ...typedWork([typedFitting(first.tag)]) })
    const [before] = await listFittingsOf(db(), owner, unit.tag)
    await logModification(db(), bench, { tag: unit.tag, ...typedWork([typedFitting(second.tag, { replacesFittingId: before?.id, disposition: 'returned_to_stock' })]) })
    const [old, now] = await listFittingsOf(db(), owner, unit.tag)
    expect(old).toMatchObject({ isRemoved: true })
    const back = await getLotView(db(), owner, now?.oldPartLot?.tag ?? '')
    expect(back).toMatchObject({ sourceKind: 'donor', donor: { tag: unit.tag }, condition: 'pulled', quantity: 1, maker: 'Dielmark', dateCode: '2308', fromFitting: { lot: { tag: first.tag }, circuitReference: 'C14' } })
    await expect(putLotBack(db(), owner, { tag: back.tag, version: back.version, why: 'x' })).rejects.toMatchObject({ data: { code: 'undo-in-work-log' } })

    await removeFromLot(db(), owner, { tag: back.tag, how: 'scrapped', quantity: '1', note: 'Leaky' })
    await expect(undoFitting(db(), bench, { tag: unit.tag, id: now?.id ?? '', why: 'x' })).rejects.toMatchObject({ data: { code: 'old-part-used' } })
    const { movements } = await getLotView(db(), owner, back.tag)
    await undoMovement(db(), owner, { tag: back.tag, id: movements.at(-1)?.id ?? 0, why: 'Not scrapped after all' })
    const undone = await undoFitting(db(), bench, { tag: unit.tag, id: now?.id ?? '', why: 'The first was sound' })
    expect(undone).toMatchObject([{ isRemoved: false }, { undoneBecause: 'The first was sound' }])
    expect(await getLotView(db(), owner, back.tag)).toMatchObject({ quantity: 0, balance: { cameIn: 0, inDrawer: 0 } })
    expect((await getLotView(db(), owner, second.tag)).quantity).toBe(10)
  })
  it('adds a part to an entry that is logged already, but not to one of an earlier hand', async () => {
    const lot = await makeLot(db(), owner)
    const unit = await onBench()
    const ours = await logModification(db(), bench, { tag: unit.tag, ...typedWork([]) })
    const theirs = await logModification(db(), bench, { tag: unit.tag, ...typedWork([], { hand: 'found_like_this' }) })
    const said = { lotTag: lot.tag, description: '', quantity: '1', circuitReference: 'C15', replaced: '', replacesFittingId: null, disposition: 'discarded' as const, oldPartKind: null }
    expect(await addFitting(db(), bench, { tag: unit.tag, modificationId: ours.id, ...said })).toMatchObject({ circuitReference: 'C15', costMinor: 125 })
    await expect(addFitting(db(), bench, { tag: unit.tag, modificationId: theirs.id, ...said })).rejects.toMatchObject({ data: { code: 'not-our-work' } })
  })
  it('keeps the log of a sold unit closed to fitting and to undoing it', async () => {
    const lot = await makeLot(db(), owner)
    const unit = await onBench()
    await logModification(db(), bench, { tag: unit.tag, ...typedWork([typedFitting(lot.tag)]) })
    await db().update(units).set({ state: 'sold' }).where(eq(units.id, unit.id))
    const [fitting] = await listFittingsOf(db(), owner, unit.tag)
    await expect(undoFitting(db(), bench, { tag: unit.tag, id: fitting?.id ?? '', why: 'x' })).rejects.toMatchObject({ data: { code: 'record-closed' } })
  })
})

describe('a drawer', () => {
  it('keeps a counting difference as a finding until somebody says what it was', async () => {
    const lot = await makeLot(db(), owner)
    const counted = await countLot(db(), floor, { tag: lot.tag, counted: '8', note: 'Twice' })
    expect(counted).toMatchObject({ quantity: 10, counts: [{ counted: 8, book: 10, settledAs: null }] })
    expect((await listOpenFindings(db())).filter(({ lot: { tag } }) => tag === lot.tag)).toHaveLength(1)
    expect((await listLots(db(), floor, lotsQuery.parse({ findings: 'yes' }))).items.map(({ tag }) => tag)).toContain(lot.tag)
    const id = counted.counts[0]?.id ?? ''
    await expect(settleCount(db(), floor, { tag: lot.tag, id, how: 'found', note: '' })).rejects.toMatchObject({ statusCode: 422 })
    expect(await settleCount(db(), floor, { tag: lot.tag, id, how: 'lost', note: 'Nobody knows' })).toMatchObject({ quantity: 8, balance: { cameIn: 10, lost: 2, inDrawer: 8 } })
    await expectBalanced(lot.tag, 1250)
    await expect(settleCount(db(), floor, { tag: lot.tag, id, how: 'lost', note: '' })).rejects.toMatchObject({ data: { code: 'already-settled' } })
  })
  it('takes in what turns up, at no cost', async () => {
    const lot = await makeLot(db(), owner)
    const { counts } = await countLot(db(), floor, { tag: lot.tag, counted: '11', note: '' })
    expect(await settleCount(db(), floor, { tag: lot.tag, id: counts[0]?.id ?? '', how: 'found', note: '' })).toMatchObject({ quantity: 11, balance: { cameIn: 11 } })
    expect(await expectBalanced(lot.tag, 1250)).toMatchObject({ costMinor: 1250 })
  })
  it('counts none at all, and a second count replaces an open finding', async () => {
    const lot = await makeLot(db(), owner)
    await countLot(db(), floor, { tag: lot.tag, counted: '0', note: '' })
    const again = await countLot(db(), floor, { tag: lot.tag, counted: '10', note: 'Behind the tray' })
    expect(again.counts).toMatchObject([{ counted: 10, settledAs: null }, { counted: 0, settledAs: 'miscounted' }])
    expect((await listOpenFindings(db())).filter(({ lot: { tag } }) => tag === lot.tag)).toEqual([])
  })
  it('splits a lot with its share of the cost, each half good or not by itself', async () => {
    const lot = await makeLot(db(), owner, { quantity: '8', cost: '10.01' })
    const gassy = await splitLot(db(), bench, { tag: lot.tag, quantity: '3', why: 'Gassy', tested: 'On the valve tester', standing: 'quarantined', placeTag: null })
    expect(gassy).toMatchObject({ quantity: 3, costMinor: 375, standing: 'quarantined', parent: { tag: lot.tag }, sourceKind: 'split' })
    expect(await getLotView(db(), owner, lot.tag)).toMatchObject({ quantity: 5, costMinor: 626, children: [{ tag: gassy.tag }], balance: { cameIn: 5, inDrawer: 5 } })
  })
  it('never goes below nothing, and its book never disagrees with what moved, even by hand', async () => {
    const lot = await makeLot(db(), owner, { cost: '' })
    await expect(db().update(partLots).set({ quantity: -1 }).where(eq(partLots.tag, lot.tag))).rejects.toMatchObject({ cause: { constraint: 'part_lots_never_below_zero' } })
    await expect(db().update(partLots).set({ quantity: 9 }).where(eq(partLots.tag, lot.tag))).rejects.toMatchObject({ cause: { constraint: 'part_lots_balance' } })
    await expect(db().delete(lotMovements).where(eq(lotMovements.lotId, lot.id))).rejects.toMatchObject({ cause: { message: 'movements of parts are append-only' } })
  })
})

describe('breaking a unit for parts', () => {
  it('shares its cost by worth and by hand, to the cent, with the rest left in the carcass', async () => {
    const unit = await donor(10_000)
    const broken = await breakUnit(db(), owner, { tag: unit.tag, ...typedBreak(unit.version, [
      part('Mains transformer', { worth: '30' }), part('Output transformer', { worth: '30' }), part('Meter movement', { share: '12.34' }),
    ], { carcassWorth: '30' }) })
    expect(broken.pulled.map(({ shareMinor }) => shareMinor)).toEqual([2922, 2922, 1234])
    expect(broken.costLeftMinor).toBe(2922)
    expect(await getLotView(db(), owner, broken.pulled[0]?.lot.tag ?? '')).toMatchObject({ sourceKind: 'donor', donor: { tag: unit.tag }, condition: 'pulled', costMinor: 2922 })
    expect((await getDonor(db(), floor, unit.tag)).pulled[0]).toMatchObject({ shareMinor: null, quantity: 1 })
  })
  it('takes more from a broken unit later, out of what is left of its cost', async () => {
    const unit = await donor(101)
    const first = await breakUnit(db(), owner, { tag: unit.tag, ...typedBreak(unit.version, [part('Knob', { type: { kind: 'knob', description: 'Knob' }, quantity: '7', worth: '1' })], { carcassWorth: '1' }) })
    expect(first).toMatchObject({ costLeftMinor: 50, pulled: [{ shareMinor: 51 }] })
    const second = await breakUnit(db(), bench, { tag: unit.tag, ...typedBreak(first.version, [part('Chassis', { worth: '1' })], { why: '' }) })
    expect(second).toMatchObject({ costLeftMinor: 0, pulled: [{ shareMinor: 51 }, { shareMinor: 50 }] })
    await expect(breakUnit(db(), bench, { tag: unit.tag, ...typedBreak(first.version, [part('Case')]) })).rejects.toMatchObject({ data: { code: 'stale' } })
  })
  it('refuses shares that come to more than it cost, and pulls nothing', async () => {
    const unit = await donor(1000)
    await expect(breakUnit(db(), owner, { tag: unit.tag, ...typedBreak(unit.version, [part('A', { share: '6' }), part('B', { share: '5' })]) })).rejects.toMatchObject({
      statusCode: 422, data: { errors: [{ path: 'parts.0.share', message: expect.stringContaining('more than is left') }] },
    })
    expect(await getDonor(db(), owner, unit.tag)).toMatchObject({ pulled: [], costLeftMinor: 1000 })
  })
  it('refuses a unit that is sold, a consigned one without consent, and one without a reason', async () => {
    const sold = await donor()
    await db().update(units).set({ state: 'sold' }).where(eq(units.id, sold.id))
    await expect(breakUnit(db(), owner, { tag: sold.tag, ...typedBreak(sold.version, [part('A')]) })).rejects.toMatchObject({ statusCode: 409, data: { code: 'move-refused' } })
    const consigned = await donor(null)
    await db().update(units).set({ ownership: 'consigned' }).where(eq(units.id, consigned.id))
    await expect(breakUnit(db(), owner, { tag: consigned.tag, ...typedBreak(consigned.version, [part('A')]) })).rejects.toMatchObject({ data: { refusals: [{ guard: 'owner-consent' }] } })
    const plain = await donor()
    await expect(breakUnit(db(), owner, { tag: plain.tag, ...typedBreak(plain.version, [part('A')], { why: '' }) })).rejects.toMatchObject({ data: { refusals: [{ guard: 'reason' }] } })
  })
  it('is undone lot by lot, and then as a whole, with the cost back where it was', async () => {
    const unit = await donor(777)
    const broken = await breakUnit(db(), owner, { tag: unit.tag, ...typedBreak(unit.version, [part('A', { worth: '1' }), part('B', { worth: '2' })]) })
    const back = { tag: unit.tag, to: 'bench' as const, why: 'It can be saved', ownerConsent: '' }
    await expect(moveUnit(db(), owner, { ...back, version: broken.version })).rejects.toMatchObject({ data: { refusals: [{ guard: 'pulled-parts', sentence: '2 lots of parts pulled from it are not back in it.' }] } })
    const [first, second] = broken.pulled.map(({ lot }) => lot.tag)
    const used = await onBench()
    const entry = await logModification(db(), bench, { tag: used.tag, ...typedWork([typedFitting(first ?? '')]) })
    const lot = await getLotView(db(), owner, first ?? '')
    await expect(putLotBack(db(), bench, { tag: lot.tag, version: lot.version, why: 'x' })).rejects.toMatchObject({ data: { code: 'lot-in-use' } })
    await withdrawModification(db(), bench, { tag: used.tag, id: entry.id, version: entry.version, why: 'Another set' })
    for (const tag of [first, second]) {
      const { version } = await getLotView(db(), owner, tag ?? '')
      await putLotBack(db(), bench, { tag: tag ?? '', version, why: 'It can be saved' })
    }
    expect(await getDonor(db(), owner, unit.tag)).toMatchObject({ pulled: [], costLeftMinor: 777 })
    expect(await moveUnit(db(), owner, { ...back, version: broken.version })).toMatchObject({ state: 'bench' })
  })
})
