import { and, asc, eq } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import { fittings, ledger, lotMovements, partLots, partRecallDecisions, units } from '../../../../drizzle/schema'
import { getPartRecall, listPartRecalls, previewPartRecall } from '../../../../server/services/part-recall-view'
import { closePartRecall, decidePartRecallUnit, raisePartRecall } from '../../../../server/services/part-recalls'
import { getUnitView } from '../../../../server/services/unit-view'
import { makeTag } from '../../../../shared/domain/tag'
import { decidedPartRecallUnit, newPartRecall, partRecallBasis } from '../../../../shared/schemas/part-recall'
import type { Person } from '../../../../shared/types/person'
import { useTestDatabase } from '../../../support/database'
import { insertFitting, insertPartLot, insertParty, insertSale } from '../../../support/parts'
import { makePerson, makeShop, makeUnit } from '../../../support/records'

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

const typed = (said: Record<string, unknown>) => newPartRecall.parse({ why: 'The case cracks', ...said })
const raise = (said: Record<string, unknown>) => raisePartRecall(db(), bench, typed(said))
const ofLot = (lotTag: string, said: Record<string, unknown> = {}) => raise({ basis: 'lot', lotTag, ...said })
const decide = (number: number, tag: string, said: Record<string, unknown> = {}) => decidePartRecallUnit(db(), bench, { number, tag, ...decidedPartRecallUnit.parse({ outcome: 'checked', ...said }) })
const onBench = () => makeUnit(db(), owner, { state: 'bench' })
const eventsOf = (unitId: string) => db().select({ event: ledger.event, details: ledger.details }).from(ledger).where(eq(ledger.unitId, unitId)).orderBy(asc(ledger.id))
const partsOf = async (tag: string) => (await getUnitView(db(), floor, tag)).partRecalls

/** A lot with one unit that has it (C14), one that was sold with it and one out of which it was taken again. */
async function threeUnits() {
  const lot = await insertPartLot(db(), owner)
  const [stands, sold, out] = [await onBench(), await onBench(), await onBench()]
  await insertFitting(db(), bench, stands.id, lot.id, { circuitReference: 'C14' })
  await insertFitting(db(), bench, sold.id, lot.id, { circuitReference: 'C2' })
  await insertFitting(db(), bench, out.id, lot.id, { removedAt: new Date() })
  await insertSale(db(), owner, sold, await insertParty(db(), 'Mr Aldous Pell', '14 Quarry Lane'))
  return { lot, stands, sold, out }
}

describe('raising a recall of parts', () => {
  it('lists every unit that has such a part or had it, in stock and sold, and says so in each one’s story', async () => {
    const { lot, stands, sold, out } = await threeUnits()
    const recall = await ofLot(lot.tag)
    expect(recall).toMatchObject({ basis: 'lot', units: 3, decided: 0, closedAt: null, why: 'The case cracks', lots: [{ tag: lot.tag, how: 'in_basis', standing: 'good', quantity: 7 }] })
    expect(recall.title).toMatch(/^Suppression capacitor · 0\.1 µF \(P /u)
    expect(Object.fromEntries(recall.items.map(({ tag, how }) => [tag, how]))).toEqual({ [stands.tag]: 'fitted', [sold.tag]: 'fitted', [out.tag]: 'taken_out' })
    expect(recall.items.find(({ tag }) => tag === sold.tag)).toMatchObject({ state: 'sold', sale: { soldOn: '2026-04-01', buyer: 'Mr Aldous Pell', contact: '14 Quarry Lane' } })
    for (const { id } of [stands, sold, out]) expect(await eventsOf(id)).toMatchObject([{ event: 'part_recalled', details: { recall: recall.number, why: 'The case cracks' } }])
    expect((await eventsOf(stands.id))[0]?.details).toMatchObject({ parts: expect.stringMatching(/^C14: suppression capacitor · 0\.1 µF, P /u) })
    const raised = await db().select().from(ledger).where(and(eq(ledger.subject, 'part_recall'), eq(ledger.event, 'part_recall_raised')))
    expect(raised.map(({ details }) => details)).toContainEqual({ number: recall.number, basis: 'lot', why: 'The case cracks', units: 3 })
  })
  it('names no buyer and no supplier to those who may not read names', async () => {
    const supplierId = await insertParty(db(), 'Distributor A')
    const lot = await insertPartLot(db(), owner, { sourceKind: 'supplier', supplierId, invoiceNumber: 'R 88/114' })
    const sold = await onBench()
    await insertFitting(db(), bench, sold.id, lot.id)
    await insertSale(db(), owner, sold, await insertParty(db(), 'Mrs Ida Crewe', 'ida@crewe.invalid'))
    const recall = await raise({ basis: 'invoice', supplierName: 'distributor a', invoiceNumber: 'r 88/114' })
    expect(recall.title).toBe('Invoice r 88/114 of Distributor A')
    const seen = await getPartRecall(db(), floor, recall.number)
    expect(seen.items).toMatchObject([{ tag: sold.tag, sale: { soldOn: '2026-04-01', buyer: null, contact: null } }])
    expect(JSON.stringify([seen, await listPartRecalls(db(), floor)])).not.toMatch(/Crewe|crewe|Distributor A|88\/114/u)
    expect(seen.title).toBe('A supplier’s invoice')
  })
  it('puts the lots in quarantine with it where that is wanted, those pulled from its units too, and no lot that only may be one of them', async () => {
    const { lot, out } = await threeUnits()
    const [first] = await db().select().from(fittings).where(eq(fittings.unitId, out.id))
    const pulled = await insertPartLot(db(), owner, { sourceKind: 'donor', donorUnitId: out.id, fromFittingId: first?.id ?? null, condition: 'pulled' })
    const donor = await onBench()
    await insertFitting(db(), bench, donor.id, lot.id)
    const mayBe = await insertPartLot(db(), owner, { sourceKind: 'donor', donorUnitId: donor.id, condition: 'pulled', acquiredOn: '2099-01-01' })
    const withdrawn = await insertPartLot(db(), owner, { sourceKind: 'split', parentLotId: lot.id, standing: 'withdrawn', standingBecause: 'Leaks' })
    const recall = await ofLot(lot.tag, { quarantine: true })
    expect(Object.fromEntries(recall.lots.map(({ tag, how, standing }) => [tag, `${how} ${standing}`]))).toEqual({
      [lot.tag]: 'in_basis quarantined', [pulled.tag]: 'pulled quarantined', [mayBe.tag]: 'may_be good', [withdrawn.tag]: 'split_out withdrawn',
    })
    const [row] = await db().select().from(partLots).where(eq(partLots.id, lot.id))
    expect(row).toMatchObject({ standingBecause: `Recall of parts ${recall.number}: The case cracks`, version: lot.version + 1 })
    const told = await db().select().from(ledger).where(and(eq(ledger.subjectId, pulled.id), eq(ledger.event, 'lot_standing_changed')))
    expect(told).toMatchObject([{ details: { from: 'good', to: 'quarantined' } }])
  })
  it('reaches lots by their date codes, and tells apart those that have none', async () => {
    const coil = { kind: 'inductor', description: 'Coil', value: '' } as const
    const dated = await insertPartLot(db(), owner, { maker: 'Coilco', madeFrom: '1976-03-01', madeTo: '1976-03-07' }, coil)
    const undated = await insertPartLot(db(), owner, { maker: 'Coilco' }, coil)
    await insertPartLot(db(), owner, { maker: 'Coilco', madeFrom: '1977-03-01', madeTo: '1977-03-07' }, coil)
    await insertFitting(db(), bench, (await onBench()).id, undated.id)
    const basis = { basis: 'made_between', madeFrom: '1976-03-07', madeTo: '1976-04-30', kind: 'inductor', maker: 'coilco' }
    const reach = await previewPartRecall(db(), owner, partRecallBasis.parse(basis))
    expect(reach).toMatchObject({ lots: [{ tag: dated.tag }], lookAt: [{ tag: undated.tag, unknown: 'date', units: 1 }], lookAtTotal: 1, units: [], refusal: null })
    expect((await raise(basis)).title).toBe('Inductor or coil marked coilco, made 7 Mar 1976 to 30 Apr 1976')
    await expect(raise({ ...basis, madeFrom: '1980-01-01', madeTo: '1980-12-31' })).rejects.toMatchObject({
      statusCode: 422, data: { errors: [{ path: 'madeFrom', message: 'No lot is known to have been made between these days. Of one lot too little is known to say: look at it first' }] },
    })
  })
  it('reaches a maker and a value however it was written', async () => {
    const lot = await insertPartLot(db(), owner, { maker: 'Ohmwell' }, { kind: 'resistor', description: 'Resistor', value: '1 MΩ' })
    expect((await raise({ basis: 'maker_and_value', maker: 'OHMWELL', value: '1000 kΩ' })).lots).toMatchObject([{ tag: lot.tag }])
  })
  it.each([
    [{ basis: 'lot', lotTag: makeTag('P', 999_999) }, 'lotTag', /^No part lot has the tag P 999999/u],
    [{ basis: 'invoice', supplierName: 'Nobody', invoiceNumber: '1' }, 'supplierName', /No lot came from a supplier of this name/u],
    [{ basis: 'maker_and_value', maker: 'Nomaker', value: '3 H' }, 'value', /No lot is marked with this maker/u],
  ])('refuses what takes no lot: %o', async (said, path, message) => {
    const before = await listPartRecalls(db(), owner)
    expect(await previewPartRecall(db(), owner, partRecallBasis.parse(said))).toMatchObject({ refusal: expect.stringMatching(message), lots: [], units: [] })
    await expect(raise(said)).rejects.toMatchObject({ statusCode: 422, data: { errors: [{ path, message: expect.stringMatching(message) }] } })
    expect(await listPartRecalls(db(), owner)).toHaveLength(before.length)
  })
  it.each([
    [{}, 'basis'], [{ basis: 'lot' }, 'lotTag'], [{ basis: 'invoice', supplierName: 'Distributor A' }, 'invoiceNumber'], [{ basis: 'made_between', madeFrom: '1976-01-01' }, 'madeTo'],
    [{ basis: 'made_between', madeFrom: '1976-02-01', madeTo: '1976-01-01' }, 'madeTo'], [{ basis: 'maker_and_value', maker: 'Dielmark' }, 'value'],
  ])('refuses an empty basis before it is sent: %o', (said, path) => {
    const read = newPartRecall.safeParse({ why: 'x', ...said })
    expect(read.error?.issues.map(issue => issue.path.join('.'))).toEqual([path])
  })
  it('gives two that are raised at once numbers of their own', async () => {
    const lots = [await insertPartLot(db(), owner), await insertPartLot(db(), owner), await insertPartLot(db(), owner)]
    const numbers = (await Promise.all(lots.map(({ tag }) => ofLot(tag)))).map(({ number }) => number).sort((a, b) => a - b)
    const [least = 0] = numbers
    expect(numbers).toEqual([least, least + 1, least + 2])
  })
  it('leaves out what was undone or put back where it came from', async () => {
    const lot = await insertPartLot(db(), owner)
    const [undone, donor] = [await onBench(), await onBench()]
    await insertFitting(db(), bench, undone.id, lot.id, { undoneAt: new Date(), undoneBecause: 'Wrong unit' })
    const fitting = await insertFitting(db(), bench, donor.id, lot.id)
    const pulled = await insertPartLot(db(), owner, { sourceKind: 'donor', donorUnitId: donor.id, fromFittingId: fitting.id })
    await db().transaction(async (tx) => {
      await tx.insert(lotMovements).values({ lotId: pulled.id, kind: 'put_back', quantity: -10, personId: owner.id })
      await tx.update(partLots).set({ quantity: 0 }).where(eq(partLots.id, pulled.id))
    })
    const recall = await ofLot(lot.tag)
    expect(recall.lots.map(({ tag }) => tag)).toEqual([lot.tag])
    expect(recall.items.map(({ tag }) => tag)).toEqual([donor.tag])
  })
})

describe('working it off', () => {
  it('decides each unit, also a sold one, in its story, and can decide it again', async () => {
    const { lot, stands, sold } = await threeUnits()
    const { number } = await ofLot(lot.tag)
    expect(await decide(number, sold.tag, { outcome: 'accepted', note: 'The buyer was told' })).toMatchObject({ decided: 1 })
    const again = await decide(number, sold.tag, { outcome: 'replaced', note: 'Came back for it', seen: 'accepted' })
    expect(again.items.find(({ tag }) => tag === sold.tag)).toMatchObject({ outcome: 'replaced', note: 'Came back for it', decidedBy: bench.name })
    expect(again.items.at(-1)?.tag, 'those still to be decided come first').toBe(sold.tag)
    expect((await eventsOf(sold.id)).slice(1)).toEqual([
      { event: 'part_recall_decided', details: { recall: number, outcome: 'accepted', note: 'The buyer was told' } },
      { event: 'part_recall_decided', details: { recall: number, outcome: 'replaced', note: 'Came back for it' } },
    ])
    await expect(decide(number, sold.tag, { seen: 'accepted' })).rejects.toMatchObject({ statusCode: 409, data: { code: 'decided-meanwhile', detail: 'Somebody else decided this unit meanwhile: Replaced.' } })
    expect(decidedPartRecallUnit.safeParse({ outcome: 'accepted' }).error?.issues).toMatchObject([{ path: ['note'], message: 'Enter why it is accepted as it is' }])
    await expect(decide(number, (await onBench()).tag)).rejects.toMatchObject({ statusCode: 404 })
    await expect(decide(99_999, stands.tag)).rejects.toMatchObject({ statusCode: 404 })
  })
  it('takes one decision of two made at once on one unit', async () => {
    const { lot, stands } = await threeUnits()
    const { number } = await ofLot(lot.tag)
    const answers = await Promise.allSettled([decide(number, stands.tag), decide(number, stands.tag, { outcome: 'replaced' })])
    expect(answers.filter(({ status }) => status === 'fulfilled')).toHaveLength(1)
    expect(await db().select().from(partRecallDecisions).where(eq(partRecallDecisions.unitId, stands.id))).toHaveLength(1)
  })
  it('closes only when every unit is decided, and then takes no more', async () => {
    const { lot, stands, sold, out } = await threeUnits()
    const { number } = await ofLot(lot.tag)
    await decide(number, stands.tag)
    await expect(closePartRecall(db(), bench, { number })).rejects.toMatchObject({ statusCode: 409, data: { code: 'undecided', detail: '2 units are still undecided. Say of each what was done before the recall is closed.' } })
    await decide(number, sold.tag)
    await expect(closePartRecall(db(), bench, { number })).rejects.toMatchObject({ data: { detail: 'One unit is still undecided. Say of each what was done before the recall is closed.' } })
    await decide(number, out.tag)
    const closed = await closePartRecall(db(), bench, { number })
    expect(closed).toMatchObject({ closedBy: bench.name, units: 3, decided: 3 })
    expect(closed.closedAt).not.toBeNull()
    await expect(decide(number, out.tag, { outcome: 'replaced', seen: 'checked' })).rejects.toMatchObject({ data: { code: 'recall-closed' } })
    await expect(closePartRecall(db(), bench, { number })).rejects.toMatchObject({ data: { code: 'recall-closed' } })
    expect((await listPartRecalls(db(), owner)).find(recall => recall.number === number)).toMatchObject({ units: 3, decided: 3 })
    expect(await db().select().from(ledger).where(and(eq(ledger.event, 'part_recall_closed'), eq(ledger.subject, 'part_recall')))).toHaveLength(1)
  })
  it('sees a unit that was fitted since, and one that got another after it was decided', async () => {
    const { lot, stands } = await threeUnits()
    const { number } = await ofLot(lot.tag)
    await decide(number, stands.tag)
    const late = await onBench()
    await insertFitting(db(), bench, late.id, lot.id)
    await insertFitting(db(), bench, stands.id, lot.id, { circuitReference: 'C15' })
    const recall = await getPartRecall(db(), owner, number)
    expect(recall).toMatchObject({ units: 4, decided: 0 })
    expect(recall.items.find(({ tag }) => tag === stands.tag)).toMatchObject({ outcome: 'checked', isFittedSince: true })
    expect(recall.items.map(({ tag }) => tag)).toContain(late.tag)
    expect(await decide(number, stands.tag, { seen: 'checked' })).toMatchObject({ decided: 1 })
  })
  it('keeps what was decided of a unit that it reaches no more', async () => {
    const { lot, stands } = await threeUnits()
    const { number } = await ofLot(lot.tag)
    await decide(number, stands.tag, { note: 'Reads 101 nF' })
    await db().update(fittings).set({ undoneAt: new Date(), undoneBecause: 'Wrong unit' }).where(eq(fittings.unitId, stands.id))
    const recall = await getPartRecall(db(), owner, number)
    expect(recall.items.find(({ tag }) => tag === stands.tag)).toMatchObject({ how: null, outcome: 'checked', note: 'Reads 101 nF', reasons: [] })
    expect(recall).toMatchObject({ units: 3, decided: 1 })
  })
})

describe('a unit with a recalled part', () => {
  it('says so while a recall is open and not decided for it', async () => {
    const { lot, stands, out } = await threeUnits()
    expect(await partsOf(stands.tag)).toEqual([])
    const { number } = await ofLot(lot.tag)
    const [said] = await partsOf(stands.tag)
    expect(said).toMatchObject({ number, why: 'The case cracks', parts: expect.stringMatching(/^C14: suppression capacitor/u) })
    expect((await partsOf(out.tag))[0]?.parts).toMatch(/taken out again$/u)
    await decide(number, stands.tag)
    expect(await partsOf(stands.tag)).toEqual([])
    await insertFitting(db(), bench, stands.id, lot.id, { circuitReference: 'C15' })
    expect(await partsOf(stands.tag)).toMatchObject([{ number }])
    for (const { tag, outcome } of (await getPartRecall(db(), owner, number)).items) await decide(number, tag, { seen: outcome })
    await closePartRecall(db(), bench, { number })
    expect(await partsOf(out.tag)).toEqual([])
  })
  it('is reached through a part that was pulled from another', async () => {
    const lot = await insertPartLot(db(), owner)
    const [donor, next] = [await onBench(), await onBench()]
    const fitting = await insertFitting(db(), bench, donor.id, lot.id, { removedAt: new Date() })
    await db().update(units).set({ state: 'parted' }).where(eq(units.id, donor.id))
    const pulled = await insertPartLot(db(), owner, { sourceKind: 'donor', donorUnitId: donor.id, fromFittingId: fitting.id, condition: 'pulled' })
    await insertFitting(db(), bench, next.id, pulled.id)
    const { number } = await ofLot(lot.tag)
    expect((await partsOf(next.tag))[0]).toMatchObject({ number, parts: expect.stringContaining('pulled from U ') })
  })
})
