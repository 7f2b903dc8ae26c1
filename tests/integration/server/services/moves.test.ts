import { eq } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import { holds, keptWithItems, modifications, safetyChecks, triages, unitDisclosures, units } from '../../../../drizzle/schema'
import { releaseLapsedHolds } from '../../../../server/services/holds'
import { addKeptWith, changeKeptWith, setPacked } from '../../../../server/services/kept-with'
import { discloseNotEnergised, holdUnit, moveUnit, releaseHold } from '../../../../server/services/moves'
import { listStory } from '../../../../server/services/story'
import { getUnitView } from '../../../../server/services/unit-view'
import { DISCLOSURE_KEYS } from '../../../../shared/domain/disclosures'
import type { UnitState } from '../../../../shared/domain/unit-state-names'
import type { Person } from '../../../../shared/types/person'
import { makePerson, makePlace, makeShop, makeUnit } from '../../../support/records'
import { useTestDatabase } from '../../../support/database'

const TOMORROW = new Date(Date.now() + 86_400_000).toISOString().slice(0, 10)

describe('moving a unit through its states', () => {
  const database = useTestDatabase()
  let owner: Person
  let bench: Person
  let floor: Person

  beforeAll(async () => {
    await makeShop(database.db)
    owner = await makePerson(database.db, 'owner')
    bench = await makePerson(database.db, 'bench')
    floor = await makePerson(database.db, 'floor')
  })

  const view = (tag: string) => getUnitView(database.db, owner, tag)
  const unitIn = (state: UnitState, values: Partial<typeof units.$inferInsert> = {}) => makeUnit(database.db, owner, { state, ...values })

  async function move(tag: string, to: UnitState, said: { why?: string, ownerConsent?: string, version?: number, actor?: Person } = {}) {
    const { actor = owner, why = '', ownerConsent = '', version = (await view(tag)).version } = said
    return moveUnit(database.db, actor, { tag, to, why, ownerConsent, version })
  }

  const refusedBy = (guards: string[]) => ({
    statusCode: 409,
    data: { code: 'move-refused', refusals: guards.map(guard => expect.objectContaining({ guard, sentence: expect.any(String), remedy: expect.any(String) })) },
  })

  const triage = (unitId: string) => database.db.insert(triages).values({
    unitId, safetyClass: 'earthed', lead: 'sound', plug: 'sound', fuse: 'sound', verdict: 'may_be_powered', doneBy: bench.id,
  })
  const check = (unitId: string, passed = true) => database.db.insert(safetyChecks).values({
    unitId, safetyClass: 'earthed', leadAndPlug: 'pass', fuse: 'pass', polarity: 'pass', visual: 'pass', earthBondLimitMilliohm: 100,
    insulationLimitKilohm: 1000, leakageLimitMicroamp: 3500, limitsOrigin: 'invented', passed, doneBy: bench.id,
  })
  const work = (unitId: string) => database.db.insert(modifications).values({
    unitId, hand: 'done_by_us', after: 'New lead', reason: 'safety', reversibility: 'no_trace', disposition: 'discarded', doneOn: '2026-01-05', loggedBy: bench.id,
  })
  const disclose = (unitId: string, keys: readonly (typeof DISCLOSURE_KEYS)[number][] = DISCLOSURE_KEYS) =>
    database.db.insert(unitDisclosures).values(keys.map(key => ({ unitId, key, answer: 'not_looked' as const, answeredBy: owner.id })))

  it('refuses readiness until triaged and checked, each with a page that mends it, and allows it then', async () => {
    const unit = await unitIn('bench')
    await expect(move(unit.tag, 'ready')).rejects.toMatchObject(refusedBy(['triage', 'safety-check']))
    const refused = (await view(unit.tag)).moves.find(({ to }) => to === 'ready')?.refusals
    expect(refused?.map(({ href }) => href)).toEqual([`/units/${unit.tag}/triage`, `/units/${unit.tag}/safety`])
    await triage(unit.id)
    await expect(move(unit.tag, 'ready')).rejects.toMatchObject(refusedBy(['safety-check']))
    await check(unit.id)
    expect(await move(unit.tag, 'ready', { actor: floor })).toMatchObject({ state: 'ready', version: 2 })
  })

  it('counts no safety check older than the last work, nor one that a later failure overtook', async () => {
    const unit = await unitIn('bench')
    await triage(unit.id)
    await check(unit.id)
    await work(unit.id)
    await expect(move(unit.tag, 'ready')).rejects.toMatchObject(refusedBy(['safety-check']))
    await check(unit.id)
    await check(unit.id, false)
    await expect(move(unit.tag, 'ready')).rejects.toMatchObject(refusedBy(['safety-check']))
    await check(unit.id)
    expect(await move(unit.tag, 'ready')).toMatchObject({ state: 'ready' })
  })

  it('takes “untested, not to be energised” in place of a safety check, until it is taken back', async () => {
    const unit = await unitIn('bench')
    await triage(unit.id)
    const text = 'Sold untested, not to be energised.'
    const disclosed = await discloseNotEnergised(database.db, bench, { tag: unit.tag, text, version: 1 })
    expect(disclosed).toMatchObject({ notEnergisedDisclosure: text, version: 2 })
    await discloseNotEnergised(database.db, bench, { tag: unit.tag, text: '', version: 2 })
    await expect(move(unit.tag, 'ready')).rejects.toMatchObject(refusedBy(['safety-check']))
    await discloseNotEnergised(database.db, bench, { tag: unit.tag, text, version: 3 })
    expect(await move(unit.tag, 'ready')).toMatchObject({ state: 'ready' })
  })

  it('lets a hazard hold go nowhere but the bench', async () => {
    const unit = await unitIn('ready', { hazardHold: 'Asbestos pad under the lamp' })
    await triage(unit.id)
    await check(unit.id)
    await disclose(unit.id)
    await database.db.update(units).set({ askingMinor: 9000, askingCurrency: 'GBP' }).where(eq(units.id, unit.id))
    await expect(move(unit.tag, 'offered')).rejects.toMatchObject(refusedBy(['hazard-hold']))
    expect(await move(unit.tag, 'bench')).toMatchObject({ state: 'bench' })
  })

  it('offers nothing before the buyer is told everything and there is a price', async () => {
    const unit = await unitIn('ready')
    await triage(unit.id)
    await check(unit.id)
    await disclose(unit.id, DISCLOSURE_KEYS.slice(1))
    await expect(move(unit.tag, 'offered')).rejects.toMatchObject(refusedBy(['disclosures', 'asking-price']))
    await disclose(unit.id, DISCLOSURE_KEYS.slice(0, 1))
    await expect(move(unit.tag, 'offered')).rejects.toMatchObject(refusedBy(['asking-price']))
    await database.db.update(units).set({ askingMinor: 9000, askingCurrency: 'GBP' }).where(eq(units.id, unit.id))
    await expect(move(unit.tag, 'offered', { actor: bench })).rejects.toMatchObject({ statusCode: 403 })
    expect(await move(unit.tag, 'offered')).toMatchObject({ state: 'offered' })
  })

  it('dispatches only once each kept-with item is packed or its absence disclosed, and clears the shelf', async () => {
    const place = await makePlace(database.db)
    const unit = await unitIn('sold', { locationId: place.id })
    await triage(unit.id)
    const item = { kind: 'lead', originality: 'original', condition: '', whereabouts: 'with_unit', placeTag: null, absenceDisclosed: '' } as const
    const lead = await addKeptWith(database.db, floor, { tag: unit.tag, ...item, description: 'Output lead' })
    const aerial = await addKeptWith(database.db, floor, { tag: unit.tag, ...item, description: 'Dummy aerial', whereabouts: 'missing' })
    await expect(move(unit.tag, 'dispatched')).rejects.toMatchObject({
      data: { refusals: [{ guard: 'kept-with', sentence: expect.stringContaining('Output lead and Dummy aerial'), href: `/units/${unit.tag}/pack` }] },
    })
    await setPacked(database.db, floor, { tag: lead.tag, packed: true })
    await expect(move(unit.tag, 'dispatched')).rejects.toMatchObject(refusedBy(['kept-with']))
    await changeKeptWith(database.db, floor, { tag: aerial.tag, ...item, description: 'Dummy aerial', whereabouts: 'missing', absenceDisclosed: 'No dummy aerial', version: aerial.version })
    expect(await move(unit.tag, 'dispatched', { actor: floor })).toMatchObject({ state: 'dispatched', place: null })
    await expect(setPacked(database.db, floor, { tag: lead.tag, packed: false })).rejects.toMatchObject({ data: { code: 'record-closed' } })
  })

  it('writes off and breaks for parts only with a reason, and a consigned piece only with its owner’s consent', async () => {
    const unit = await unitIn('bench', { ownership: 'consigned' })
    await triage(unit.id)
    await expect(move(unit.tag, 'parted')).rejects.toMatchObject(refusedBy(['reason', 'owner-consent']))
    await expect(move(unit.tag, 'parted', { why: 'Dropped', actor: bench })).rejects.toMatchObject({ statusCode: 403 })
    expect(await move(unit.tag, 'parted', { why: 'Dropped', ownerConsent: 'By letter, 3 March' })).toMatchObject({ state: 'parted', moves: [{ to: 'bench', refusals: [] }] })
    await expect(move(unit.tag, 'ready')).rejects.toMatchObject(refusedBy(['parted']))
    const { items } = await listStory(database.db, owner, { tag: unit.tag, limit: 1 })
    expect(items[0]).toMatchObject({ sentence: 'Went from “On the bench” to “Broken for parts”', details: ['Why: Dropped. Its owner agreed: By letter, 3 March'] })
    const other = await unitIn('intake')
    await expect(move(other.tag, 'written_off')).rejects.toMatchObject(refusedBy(['reason']))
    expect(await move(other.tag, 'written_off', { why: 'Lost in the flood' })).toMatchObject({ state: 'written_off' })
    await expect(move(other.tag, 'bench')).rejects.toMatchObject(refusedBy(['reason']))
    expect(await move(other.tag, 'bench', { why: 'It was in the loft' })).toMatchObject({ state: 'bench' })
  })

  it('names the moves there are when asked for one there is not', async () => {
    const unit = await unitIn('intake')
    await expect(move(unit.tag, 'dispatched')).rejects.toMatchObject(refusedBy(['no-such-move']))
    await expect(move(unit.tag, 'intake')).rejects.toMatchObject(refusedBy(['no-such-move']))
  })

  it('refuses a stale version with the unit as it stands', async () => {
    const unit = await unitIn('intake')
    await move(unit.tag, 'bench', { version: 1 })
    await expect(move(unit.tag, 'written_off', { version: 1, why: 'x' })).rejects.toMatchObject({
      statusCode: 409, data: { code: 'stale', current: { tag: unit.tag, state: 'bench', version: 2 } },
    })
  })

  it('lets one of two people who move it at the same moment win, in one ledger entry', async () => {
    const unit = await unitIn('intake')
    const both = await Promise.allSettled([move(unit.tag, 'bench', { version: 1 }), move(unit.tag, 'bench', { version: 1 })])
    expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected'])
    expect((await listStory(database.db, owner, { tag: unit.tag, limit: 10 })).items).toHaveLength(1)
  })

  describe('holds', () => {
    const offered = async () => {
      const unit = await unitIn('offered', { askingMinor: 9000, askingCurrency: 'GBP' })
      await triage(unit.id)
      await check(unit.id)
      await disclose(unit.id)
      return unit
    }
    const hold = (tag: string, values: { until?: string, version?: number } = {}) =>
      holdUnit(database.db, floor, { tag, heldFor: 'Mr Pell', note: '', until: TOMORROW, version: 1, ...values })

    it('puts an offered piece by and shows the name only to those who may see it', async () => {
      const { tag } = await offered()
      expect(await hold(tag)).toMatchObject({ state: 'held', hold: { heldFor: null, until: TOMORROW } })
      expect(await view(tag)).toMatchObject({ hold: { heldFor: 'Mr Pell' } })
      expect((await listStory(database.db, floor, { tag, limit: 10 })).items.map(({ event }) => event)).toEqual(['state_changed'])
      expect((await listStory(database.db, owner, { tag, limit: 10 })).items.map(({ event }) => event)).toEqual(['state_changed', 'held'])
    })

    it('refuses a day that is past, and a piece that is not offered', async () => {
      const { tag } = await offered()
      await expect(hold(tag, { until: '2020-01-01' })).rejects.toMatchObject({ statusCode: 422, data: { errors: [{ path: 'until' }] } })
      await hold(tag)
      await expect(hold(tag, { version: 2 })).rejects.toMatchObject(refusedBy(['no-such-move']))
    })

    it('can be released by hand, and again held', async () => {
      const { tag } = await offered()
      await hold(tag)
      expect(await releaseHold(database.db, floor, { tag, why: 'He rang off', version: 2 })).toMatchObject({ state: 'offered', hold: null })
      expect(await hold(tag, { version: 3 })).toMatchObject({ state: 'held' })
    })

    it('lapses by itself once its last day is past, for whoever looks next', async () => {
      const { id, tag } = await offered()
      await hold(tag)
      await database.db.update(holds).set({ until: '2020-01-01' }).where(eq(holds.unitId, id))
      expect(await view(tag)).toMatchObject({ state: 'offered', hold: null })
      const { items } = await listStory(database.db, owner, { tag, limit: 2 })
      expect(items).toMatchObject([{ event: 'state_changed', who: null }, { event: 'hold_released', who: null, details: ['Why: The hold lapsed'] }])
    })

    it('lapses once, however many look at once', async () => {
      const { id, tag } = await offered()
      await hold(tag)
      await database.db.update(holds).set({ until: '2020-01-01' }).where(eq(holds.unitId, id))
      const counts = await Promise.all([1, 2, 3].map(() => releaseLapsedHolds(database.db)))
      expect(counts.reduce((sum, count) => sum + count, 0)).toBe(1)
    })

    it('is asked for on its own page, not by a bare move', async () => {
      const { tag } = await offered()
      await expect(move(tag, 'held')).rejects.toMatchObject({ data: { code: 'own-form' } })
    })
  })

  it('keeps the ledger as it was written, whoever asks', async () => {
    const unit = await unitIn('intake')
    await move(unit.tag, 'bench')
    await expect(database.pool.query('update ledger set event = \'edited\'')).rejects.toThrow('append-only')
    await expect(database.pool.query('delete from ledger')).rejects.toThrow('append-only')
    await expect(database.pool.query('truncate ledger')).rejects.toThrow('append-only')
  })

  it('pages the story from the newest and refuses a cursor that is not ours', async () => {
    const unit = await unitIn('intake')
    for (const to of ['bench', 'written_off', 'bench'] as const) {
      if (to === 'written_off') await triage(unit.id)
      await move(unit.tag, to, { why: 'As told' })
    }
    const first = await listStory(database.db, owner, { tag: unit.tag, limit: 2 })
    expect(first.items.map(({ sentence }) => sentence)).toEqual(['Went from “Written off” to “On the bench”', 'Went from “On the bench” to “Written off”'])
    const second = await listStory(database.db, owner, { tag: unit.tag, limit: 2, cursor: first.nextCursor ?? '' })
    expect(second).toMatchObject({ items: [{ sentence: 'Went from “Intake” to “On the bench”' }], nextCursor: null })
    await expect(listStory(database.db, owner, { tag: unit.tag, limit: 2, cursor: 'banana' })).rejects.toMatchObject({ statusCode: 400 })
  })

  it('refuses a kept-with change from an older version, with the item as it stands', async () => {
    const unit = await unitIn('intake')
    const place = await makePlace(database.db)
    const values = { kind: 'manual', description: 'Handbook', originality: 'original', condition: '', whereabouts: 'with_unit', placeTag: null, absenceDisclosed: '' } as const
    const item = await addKeptWith(database.db, floor, { tag: unit.tag, ...values })
    const moved = await changeKeptWith(database.db, floor, { ...values, tag: item.tag, whereabouts: 'elsewhere', placeTag: place.tag, version: 1 })
    expect(moved).toMatchObject({ place: { tag: place.tag }, version: 2 })
    await expect(changeKeptWith(database.db, floor, { ...values, tag: item.tag, description: 'Handbook, 2nd issue', version: 1 }))
      .rejects.toMatchObject({ data: { code: 'stale', current: { version: 2 } } })
    const [row] = await database.db.select().from(keptWithItems).where(eq(keptWithItems.tag, item.tag))
    expect(row).toMatchObject({ description: 'Handbook', whereabouts: 'elsewhere' })
  })
})
