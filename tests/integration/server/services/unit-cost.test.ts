import { eq } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import type { units } from '../../../../drizzle/schema'
import { partLots, shop } from '../../../../drizzle/schema'
import type { Person } from '../../../../shared/types/person'
import { breakUnit, putLotBack } from '../../../../server/services/donors'
import { listFittingsOf, undoFitting } from '../../../../server/services/fittings'
import { logModification, withdrawModification } from '../../../../server/services/modifications'
import { listStory } from '../../../../server/services/story'
import { getUnitCost, setCeiling } from '../../../../server/services/unit-cost'
import { getUnitView } from '../../../../server/services/unit-view'
import { makeTriage } from '../../../support/bench'
import { useTestDatabase } from '../../../support/database'
import { makeLot, typedBreak, typedFitting, typedWork } from '../../../support/lots'
import { makePerson, makeShop, makeUnit } from '../../../support/records'

const test = useTestDatabase()
const db = () => test.db
let owner: Person
let bench: Person

beforeAll(async () => {
  await makeShop(db())
  await db().update(shop).set({ benchRateMinor: 2800 })
  owner = await makePerson(db(), 'owner')
  bench = await makePerson(db(), 'bench')
})

const onBench = (values: Partial<typeof units.$inferInsert> = {}) => makeUnit(db(), owner, {
  state: 'bench', costMinor: 15_000, costCurrency: 'GBP', askingMinor: 42_000, askingCurrency: 'GBP', ...values,
})
const work = (tag: string, fittings: Record<string, unknown>[], said: Record<string, unknown> = {}) => logModification(db(), bench, { ...typedWork(fittings, said), tag })

describe('what a unit has really cost', () => {
  it('is what was paid, the parts at what their lots cost, and the bench time: the trade note’s invented example as far as it goes', async () => {
    const unit = await onBench()
    const lot = await makeLot(db(), owner, { quantity: '3', cost: '114.00' })
    await work(unit.tag, [typedFitting(lot.tag)], { minutes: '4 h' })
    await work(unit.tag, [], { minutes: '60' })
    expect(await getUnitCost(db(), unit.tag)).toMatchObject({
      currency: 'GBP', totalMinor: 32_800, marginBeforeBenchMinor: 23_200, marginMinor: 9200, missing: [], apart: [],
      lines: [{ key: 'purchase', minor: 15_000 }, { key: 'parts', minor: 3800 }, { key: 'bench', minor: 14_000 }],
      minutesSpent: 300, ceilingMinutes: null, benchTime: { standing: 'none' },
    })
  })

  it('leaves out what was undone or withdrawn, and the time of earlier hands', async () => {
    const unit = await onBench()
    const lot = await makeLot(db(), owner)
    await work(unit.tag, [typedFitting(lot.tag)], { minutes: '30' })
    const withdrawn = await work(unit.tag, [typedFitting(lot.tag)], { minutes: '90' })
    await withdrawModification(db(), bench, { tag: unit.tag, id: withdrawn.id, version: withdrawn.version, why: 'The wrong unit' })
    await work(unit.tag, [], { hand: 'found_like_this', minutes: '600' })
    const before = await getUnitCost(db(), unit.tag)
    expect(before).toMatchObject({ minutesSpent: 30, totalMinor: 15_000 + 125 + 1400 })
    const [fitting] = await listFittingsOf(db(), owner, unit.tag)
    await undoFitting(db(), bench, { tag: unit.tag, id: fitting?.id ?? '', why: 'It was never fitted' })
    expect((await getUnitCost(db(), unit.tag)).totalMinor).toBe(before.totalMinor - 125)
  })

  it('counts the parts whose cost nobody knows, and the entries without minutes', async () => {
    const unit = await onBench({ costMinor: null, costCurrency: null })
    const lot = await makeLot(db(), owner, { cost: '' })
    await work(unit.tag, [typedFitting(lot.tag), typedFitting(null, { description: 'A knob from the tin' })])
    expect(await getUnitCost(db(), unit.tag)).toMatchObject({
      lines: [], totalMinor: 0, missing: ['What was paid for it is not known yet', '2 parts of unknown cost', 'One entry of work without its minutes'],
    })
  })

  it('lists a lot bought in another currency apart', async () => {
    const unit = await onBench()
    await db().update(shop).set({ currency: 'EUR' })
    const lot = await makeLot(db(), owner, { cost: '20.00' })
    await db().update(shop).set({ currency: 'GBP' })
    await work(unit.tag, [typedFitting(lot.tag, { quantity: '5' })], { minutes: '0' })
    expect(await getUnitCost(db(), unit.tag)).toMatchObject({ totalMinor: 15_000, apart: [{ term: 'One part fitted', minor: 1000, currency: 'EUR' }] })
  })

  it('gives the parts pulled from it their shares, which come back with them', async () => {
    const unit = await onBench({ askingMinor: null, askingCurrency: null })
    await makeTriage(db(), bench, unit.id)
    const donor = await breakUnit(db(), owner, {
      ...typedBreak(unit.version, [{ type: { kind: 'transformer', description: 'Mains transformer' }, quantity: '1', share: '60' }, { type: { kind: 'knob', description: 'Knob' }, quantity: '4', share: '15.55' }]),
      tag: unit.tag,
    })
    expect(await getUnitCost(db(), unit.tag)).toMatchObject({ totalMinor: 7445, lines: [{ key: 'purchase' }, { key: 'shares', minor: -7555 }], marginMinor: null })
    const transformer = donor.pulled.find(({ shareMinor }) => shareMinor === 6000)
    const [row] = await db().select({ version: partLots.version }).from(partLots).where(eq(partLots.tag, transformer?.lot.tag ?? ''))
    await putLotBack(db(), owner, { tag: transformer?.lot.tag ?? '', version: row?.version ?? 0, why: 'Kept whole after all' })
    expect((await getUnitCost(db(), unit.tag)).totalMinor).toBe(13_445)
  })

  it('knows no unit with a tag that nothing has', async () => {
    await expect(getUnitCost(db(), 'U0999995')).rejects.toMatchObject({ statusCode: 404, data: { code: 'no-such-unit' } })
  })
})

describe('the ceiling of bench time', () => {
  it('is set, told, kept against a stale form, and taken off', async () => {
    const unit = await onBench()
    await work(unit.tag, [], { minutes: '3 h 20' })
    const set = await setCeiling(db(), bench, { tag: unit.tag, minutes: 240, version: unit.version })
    expect(set).toMatchObject({ ceilingMinutes: 240, benchTime: { standing: 'near' }, version: unit.version + 1 })
    expect(await getUnitView(db(), await makePerson(db(), 'floor'), unit.tag)).toMatchObject({ ceilingMinutes: 240, costMinor: null })
    await expect(setCeiling(db(), owner, { tag: unit.tag, minutes: 300, version: unit.version })).rejects.toMatchObject({
      statusCode: 409, data: { code: 'stale', current: { ceilingMinutes: 240 } },
    })
    await work(unit.tag, [], { minutes: '50' })
    expect((await getUnitCost(db(), unit.tag)).benchTime.standing).toBe('passed')
    expect(await setCeiling(db(), owner, { tag: unit.tag, minutes: null, version: set.version })).toMatchObject({ ceilingMinutes: null, benchTime: { standing: 'none' } })
    const { items } = await listStory(db(), owner, { tag: unit.tag, limit: 20 })
    expect(items.filter(({ event }) => event === 'ceiling_set').map(({ sentence }) => sentence)).toEqual([
      'Set the ceiling of bench time: none', 'Set the ceiling of bench time: 4\u202Fh',
    ])
  })

  it('writes nothing when it is what it was', async () => {
    const unit = await onBench({ ceilingMinutes: 60 })
    expect((await setCeiling(db(), owner, { tag: unit.tag, minutes: 60, version: unit.version })).version).toBe(unit.version)
    expect((await listStory(db(), owner, { tag: unit.tag, limit: 5 })).items).toEqual([])
  })
})
