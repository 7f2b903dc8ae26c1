import { asc, eq } from 'drizzle-orm'
import { describe, expect, it, beforeEach } from 'vitest'
import { keptWithItems, ledger, modelKitItems, models, tagCounters, unitCoverage, units } from '../../../../drizzle/schema'
import { bookInUnit } from '../../../../server/services/intake'
import { addModel, changeModel, getModel, listModels } from '../../../../server/services/models'
import { editUnit, priceUnit } from '../../../../server/services/units-edit'
import { parseTag } from '../../../../shared/domain/tag'
import { changedModel, newModel } from '../../../../shared/schemas/model'
import type { NewUnitSent } from '../../../../shared/schemas/unit'
import { changedUnit, newUnit } from '../../../../shared/schemas/unit'
import type { ModelView } from '../../../../shared/types/model'
import type { Person } from '../../../../shared/types/person'
import { useTestDatabase } from '../../../support/database'
import { makePerson, makePlace, makeShop } from '../../../support/records'

const site = useTestDatabase()
let owner: Person
let floor: Person
let model: ModelView
let round = 0

const band = (label: string, lower: string, upper: string) => ({ label, function: 'generates' as const, lower, upper, tolerance: '' })

beforeEach(async () => {
  await makeShop(site.db)
  owner = await makePerson(site.db, 'owner')
  floor = await makePerson(site.db, 'floor')
  model = await addModel(site.db, owner, newModel.parse({
    maker: 'Oxmarden', designation: `318-${++round}`, kind: 'rf_generator', dialTolerancePercent: '±2 %', modulationHz: '400 c/s', yearsFrom: '1958', yearsTo: '',
    bands: [band('A', '85 kc', '175 kc'), band('B', '170 kc', '360 kc'), band('C', '400 kc', '1 Mc')],
    kit: [{ kind: 'lead', description: 'Terminated output lead', quantity: '1' }, { kind: 'probe', description: 'Probe', quantity: '2' }, { kind: 'manual', description: 'Handbook', quantity: '1' }],
  }))
})

const typed = (values: Partial<NewUnitSent> = {}): NewUnitSent => ({
  modelId: model.id, serialAnswer: 'known', serial: '4417', ownership: 'bought', sourceKind: 'club_sale', acquiredOn: '2026-03-02', ...values,
})
const bookIn = (values: Partial<NewUnitSent> = {}, actor = owner) => bookInUnit(site.db, actor, newUnit.parse(typed(values)))
const rowOf = async (tag: string) => (await site.db.select().from(units).where(eq(units.tag, tag)))[0]
const coverageOf = async (tag: string) => site.db.select({ function: unitCoverage.function, ranges: unitCoverage.ranges }).from(unitCoverage)
  .innerJoin(units, eq(units.id, unitCoverage.unitId)).where(eq(units.tag, tag))
const eventsOf = async (tag: string) => site.db.select({ event: ledger.event, details: ledger.details }).from(ledger)
  .innerJoin(units, eq(units.id, ledger.unitId)).where(eq(units.tag, tag)).orderBy(asc(ledger.id))

describe('bookInUnit', () => {
  it('gives each piece the next tag without a gap, however many are booked in at once', async () => {
    const [before] = await site.db.select().from(tagCounters).where(eq(tagCounters.kind, 'U'))
    const bad = () => bookIn({ kit: [{ kitItemId: owner.id, found: 'here' }] })
    const booked = await Promise.allSettled([...Array.from({ length: 12 }, () => bookIn()), bad(), bad(), ...Array.from({ length: 12 }, () => bookIn())])
    const numbers = booked.flatMap((each) => {
      const read = each.status === 'fulfilled' ? parseTag(each.value.tag) : null
      return read?.ok ? [read.number] : []
    }).sort((a, b) => a - b)
    const first = (before?.last ?? 0) + 1
    expect(numbers).toEqual(Array.from({ length: 24 }, (_, index) => first + index))
  })

  it('writes tag, coverage, place, cost and the first of the story together', async () => {
    const place = await makePlace(site.db)
    const unit = await bookIn({ placeTag: place.tag, cost: '£1,250', sourceName: 'Winifred Aldous', sourceNote: 'Garage in Fenwold' })
    expect(unit).toMatchObject({ state: 'intake', costMinor: 125_000, costCurrency: 'GBP', sourceName: 'Winifred Aldous', place: { tag: place.tag } })
    expect(await coverageOf(unit.tag)).toEqual([{ function: 'generates', ranges: '{[85000,360001),[400000,1000001)}' }])
    expect((await eventsOf(unit.tag)).map(each => each.event)).toEqual(['booked_in', 'moved'])
  })

  it('counts the kit: each thing with a tag, the missing ones too, and says what nobody looked for', async () => {
    const [lead, probe, book] = model.kit
    const unit = await bookIn({
      kit: [{ kitItemId: lead?.id ?? '', found: 'missing' }, { kitItemId: probe?.id ?? '', found: 'here', count: 1 }, { kitItemId: book?.id ?? '', found: 'not_looked' }],
      extras: [{ kind: 'case', description: 'Wooden case', originality: 'original' }],
    })
    expect(unit.keptWith.map(({ description, whereabouts }) => [description, whereabouts])).toEqual([
      ['Terminated output lead', 'missing'], ['Probe (1 of 2)', 'with_unit'], ['Probe (2 of 2)', 'missing'], ['Wooden case', 'with_unit'],
    ])
    for (const item of unit.keptWith) expect(parseTag(item.tag)).toMatchObject({ ok: true, kind: 'K' })
    expect((await eventsOf(unit.tag))[0]?.details).toMatchObject({ notLooked: ['Handbook'] })
  })

  it('makes a new model once, whoever names it first, and lets the floor do so', async () => {
    const name = { maker: 'Lindvassa', designation: `V ${round}4`, kind: 'rf_generator' as const }
    const [a, b] = await Promise.all([bookIn({ modelId: null, newModel: name }, floor), bookIn({ modelId: null, newModel: { ...name, maker: 'LINDVASSA' } }, floor)])
    expect(a.model.id).toBe(b.model.id)
    expect(await coverageOf(a.tag)).toEqual([])
  })

  it('refuses a cost from those who never see one, and writes nothing', async () => {
    const before = await site.db.$count(units)
    await expect(bookIn({ cost: '40' }, floor)).rejects.toMatchObject({ statusCode: 403 })
    expect(await site.db.$count(units)).toBe(before)
    const unit = await bookIn({ sourceName: 'Winifred Aldous' }, floor)
    expect(unit).toMatchObject({ costMinor: null, sourceName: null, sourceNote: null })
  })

  it.each([
    ['an amount that can be read two ways', { cost: '1.250' }, 'cost'],
    ['another currency', { cost: '$40' }, 'cost'],
    ['a day to come', { acquiredOn: '2999-01-01' }, 'acquiredOn'],
    ['a model that is not there', { modelId: '3f0e4f0c-0000-4000-8000-000000000000' }, 'model'],
  ] satisfies [string, Partial<NewUnitSent>, string][])('refuses %s at its field', async (_, values, path) => {
    await expect(bookIn(values)).rejects.toMatchObject({ statusCode: 422, data: { errors: [{ path }] } })
  })

  it('keeps an emoji and right-to-left serial as it is', async () => {
    for (const serial of ['SN-\u{1F4FB}-7', 'מספר-12', 'רقم ٤٤']) {
      const unit = await bookIn({ serial })
      expect((await rowOf(unit.tag))?.serial).toBe(serial)
    }
  })

  it('is refused by the database too when a constraint is broken', async () => {
    const unit = await bookIn()
    await expect(site.db.update(units).set({ serial: null }).where(eq(units.tag, unit.tag))).rejects.toMatchObject({ cause: { constraint: 'units_serial_is_answered' } })
    await expect(site.db.update(units).set({ costMinor: -1, costCurrency: 'GBP' }).where(eq(units.tag, unit.tag))).rejects.toMatchObject({ cause: { constraint: 'units_cost_not_negative' } })
    await expect(site.db.update(units).set({ tag: 'U1' }).where(eq(units.tag, unit.tag))).rejects.toMatchObject({ cause: { constraint: 'units_tag_form' } })
  })
})

describe('changeModel', () => {
  const answers = (view: ModelView) => ({ ...view, dialTolerancePercent: '2', modulationHz: '400 c/s', bands: [band('A', '85 kc', '1 Mc')], kit: view.kit.map(line => ({ ...line, quantity: String(line.quantity) })) })

  it('works out anew what each of its units covers, and tells only those it changed for', async () => {
    const unit = await bookIn()
    const changed = await changeModel(site.db, owner, { ...changedModel.parse(answers(model)), id: model.id })
    expect(await coverageOf(unit.tag)).toEqual([{ function: 'generates', ranges: '{[85000,1000001)}' }])
    expect((await eventsOf(unit.tag)).at(-1)).toMatchObject({ event: 'coverage_changed', details: { to: expect.stringContaining('85–1') } })
    const count = (await eventsOf(unit.tag)).length
    await changeModel(site.db, owner, { ...changedModel.parse({ ...answers(changed), summary: 'Eight bands.' }), id: model.id })
    expect((await eventsOf(unit.tag)).length).toBe(count)
  })

  it('keeps the lines of the kit that stay, so that what was counted still answers them', async () => {
    const [lead] = model.kit
    const unit = await bookIn({ kit: [{ kitItemId: lead?.id ?? '', found: 'here' }] })
    const given = answers(model)
    await changeModel(site.db, owner, { ...changedModel.parse({ ...given, kit: [...given.kit.slice(0, 1).map(line => ({ ...line, description: 'Output lead' })), { kind: 'other', description: 'Dummy aerial' }] }), id: model.id })
    expect((await getModel(site.db, model.id)).kit.map(line => line.description)).toEqual(['Output lead', 'Dummy aerial'])
    const [item] = await site.db.select({ kitItemId: keptWithItems.kitItemId }).from(keptWithItems).innerJoin(units, eq(units.id, keptWithItems.unitId)).where(eq(units.tag, unit.tag))
    expect(item?.kitItemId).toBe(lead?.id)
    expect(await site.db.$count(modelKitItems, eq(modelKitItems.modelId, model.id))).toBe(2)
  })

  it('refuses a stale version with the model as it stands, and a name that another has', async () => {
    await changeModel(site.db, owner, { ...changedModel.parse({ ...answers(model), supply: '240 V' }), id: model.id })
    await expect(changeModel(site.db, owner, { ...changedModel.parse(answers(model)), id: model.id }))
      .rejects.toMatchObject({ statusCode: 409, data: { code: 'stale', current: { supply: '240 V', version: 2 } } })
    await expect(addModel(site.db, owner, newModel.parse({ maker: 'OXMARDEN', designation: model.designation, kind: 'other' })))
      .rejects.toMatchObject({ statusCode: 422, data: { errors: [{ path: 'designation' }] } })
  })

  it('never leaves a unit that is booked in meanwhile on the old bands', async () => {
    const [booked] = await Promise.all([
      Promise.all(Array.from({ length: 6 }, () => bookIn())),
      changeModel(site.db, owner, { ...changedModel.parse(answers(model)), id: model.id }),
    ])
    for (const unit of booked) expect((await coverageOf(unit.tag)).map(each => each.ranges)).toEqual(['{[85000,1000001)}'])
  })
})

describe('listModels', () => {
  it('finds by parts, by words in any order and with a typing error, page by page', async () => {
    for (const q of [`318-${round}`, `oxmarden 318-${round}`, `318-${round} oxm`, `oxmardn 318-${round}`]) {
      const { items } = await listModels(site.db, { q, limit: 50 })
      expect(items.map(each => each.id), q).toContain(model.id)
    }
    expect((await listModels(site.db, { q: '%', limit: 50 })).items).toEqual([])
    const seen: string[] = []
    let cursor: string | undefined
    do {
      const page = await listModels(site.db, { limit: 2, cursor })
      seen.push(...page.items.map(each => each.id))
      cursor = page.nextCursor ?? undefined
    } while (cursor)
    expect(new Set(seen).size).toBe(seen.length)
    expect(seen.length).toBe(await site.db.$count(models))
  })
})

describe('editUnit', () => {
  it('changes what is given, leaves the rest, and tells cost apart', async () => {
    const unit = await bookIn({ conditionNotes: 'Dusty', sourceName: 'Winifred Aldous' })
    const edited = await editUnit(site.db, owner, { ...changedUnit.parse({ serialAnswer: 'could_not_tell', cost: '80', sourceName: 'Harold Pym', version: 1 }), tag: unit.tag })
    expect(edited).toMatchObject({ serial: { answer: 'could_not_tell', text: null }, conditionNotes: 'Dusty', costMinor: 8000, sourceName: 'Harold Pym', version: 2 })
    const told = (await eventsOf(unit.tag)).slice(1)
    expect(told.map(each => each.event)).toEqual(['edited', 'cost_changed'])
    expect(JSON.stringify(told[0])).not.toMatch(/Pym|Aldous|80/u)
  })

  it('gives both versions of a unit that two people change', async () => {
    const unit = await bookIn()
    await editUnit(site.db, owner, { ...changedUnit.parse({ supplyAsSet: '240 V', version: 1 }), tag: unit.tag })
    await expect(editUnit(site.db, floor, { ...changedUnit.parse({ supplyAsSet: '115 V', version: 1 }), tag: unit.tag }))
      .rejects.toMatchObject({ statusCode: 409, data: { code: 'stale', current: { supplyAsSet: '240 V', costMinor: null } } })
    expect((await rowOf(unit.tag))?.supplyAsSet).toBe('240 V')
  })

  it('keeps costs and names from those who may not see them', async () => {
    const unit = await bookIn({ cost: '40', sourceName: 'Winifred Aldous' })
    for (const hidden of [{ cost: '' }, { sourceName: '' }, { sourceNote: 'x' }]) {
      await expect(editUnit(site.db, floor, { ...changedUnit.parse({ ...hidden, version: 1 }), tag: unit.tag })).rejects.toMatchObject({ statusCode: 403 })
    }
  })

  it('refuses a consigned piece with a cost or without its owner', async () => {
    const bought = await bookIn({ cost: '40', sourceName: 'Winifred Aldous' })
    await expect(editUnit(site.db, owner, { ...changedUnit.parse({ ownership: 'consigned', version: 1 }), tag: bought.tag })).rejects.toMatchObject({ data: { errors: [{ path: 'cost' }] } })
    const nameless = await bookIn()
    await expect(editUnit(site.db, owner, { ...changedUnit.parse({ ownership: 'consigned', version: 1 }), tag: nameless.tag })).rejects.toMatchObject({ data: { errors: [{ path: 'sourceName' }] } })
  })

  it('follows the bands of another model', async () => {
    const other = await addModel(site.db, owner, newModel.parse({ maker: 'Oxmarden', designation: `other ${round}`, kind: 'oscilloscope', bands: [{ label: 'Y', function: 'measures', lower: 'DC', upper: '10 MHz' }] }))
    const unit = await bookIn()
    await editUnit(site.db, owner, { ...changedUnit.parse({ modelId: other.id, version: 1 }), tag: unit.tag })
    expect(await coverageOf(unit.tag)).toEqual([{ function: 'measures', ranges: '{[0,10000001)}' }])
  })
})

describe('priceUnit', () => {
  it('sets, changes and takes off the asking price, each in the story', async () => {
    const unit = await bookIn()
    expect(await priceUnit(site.db, owner, { tag: unit.tag, asking: '£140', version: 1 })).toMatchObject({ askingMinor: 14_000, askingCurrency: 'GBP', version: 2 })
    expect(await priceUnit(site.db, owner, { tag: unit.tag, asking: '', version: 2 })).toMatchObject({ askingMinor: null, askingCurrency: null })
    await expect(priceUnit(site.db, owner, { tag: unit.tag, asking: '0', version: 3 })).rejects.toMatchObject({ statusCode: 422 })
    await expect(priceUnit(site.db, owner, { tag: unit.tag, asking: '5', version: 1 })).rejects.toMatchObject({ statusCode: 409 })
    expect((await eventsOf(unit.tag)).slice(1).map(each => each.details)).toEqual([
      { fromMinor: null, toMinor: 14_000, currency: 'GBP' }, { fromMinor: 14_000, toMinor: null, currency: 'GBP' },
    ])
  })
})
