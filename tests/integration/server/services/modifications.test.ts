import { asc, eq } from 'drizzle-orm'
import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { keptWithItems, ledger, modifications, units } from '../../../../drizzle/schema'
import { correctModification, listModificationsOf, logModification, markDoesNotAffect, withdrawModification } from '../../../../server/services/modifications'
import { newModification } from '../../../../shared/schemas/modification'
import type { Person } from '../../../../shared/types/person'
import { useTestDatabase } from '../../../support/database'
import { makePerson, makeShop, makeUnit } from '../../../support/records'

const said = (answers: Record<string, unknown> = {}) => newModification.parse({
  hand: 'done_by_us', before: 'Two-pin mains inlet', after: 'Fused three-pin inlet', reversibility: 'hole_to_fill', disposition: 'kept_with_unit',
  reason: 'safety', minutes: '1 h 15', testedAfter: 'earth bond 0.06 Ω', doneOn: '2026-03-11', ...answers,
})

describe('the work log', () => {
  const database = useTestDatabase()
  let bench: Person
  let unit: Awaited<ReturnType<typeof makeUnit>>

  beforeAll(async () => {
    await makeShop(database.db)
    bench = await makePerson(database.db, 'bench', 'Ines Halloway')
  })
  beforeEach(async () => {
    unit = await makeUnit(database.db, bench)
  })

  const log = (answers: Record<string, unknown> = {}) => logModification(database.db, bench, { ...said(answers), tag: unit.tag })
  const story = async () => database.db.select().from(ledger).where(eq(ledger.unitId, unit.id)).orderBy(asc(ledger.id))

  it('keeps an entry and tells it in the story', async () => {
    const entry = await log()
    expect(entry).toMatchObject({ hand: 'done_by_us', minutes: 75, doneOn: '2026-03-11', loggedBy: 'Ines Halloway', corrected: false, withdrawnBecause: null, bagTag: null, version: 1 })
    expect(await story()).toMatchObject([{ event: 'modification_logged', personId: bench.id, details: { modificationId: entry.id, after: 'Fused three-pin inlet' } }])
  })

  it('dates work of ours today when no day is said, and leaves an earlier hand’s undated', async () => {
    expect((await log({ doneOn: '' })).doneOn).toMatch(/^\d{4}-\d{2}-\d{2}$/)
    expect((await log({ hand: 'found_like_this', doneOn: '', before: '', disposition: 'not_known' })).doneOn).toBeNull()
  })

  it('refuses a day that is still to come', async () => {
    await expect(log({ doneOn: '2199-01-01' })).rejects.toMatchObject({ statusCode: 422, data: { errors: [{ path: 'doneOn' }] } })
    expect(await database.db.$count(modifications, eq(modifications.unitId, unit.id))).toBe(0)
  })

  it('makes a bag of removed parts a kept-with item with a tag', async () => {
    const { bagTag } = await log({ removedPartsBag: 'Old inlet, lead and plug' })
    expect(bagTag).toMatch(/^K\d{5,}[0-9A-Z]$/)
    const items = await database.db.select().from(keptWithItems).where(eq(keptWithItems.unitId, unit.id))
    expect(items).toMatchObject([{ tag: bagTag, kind: 'removed_parts', description: 'Old inlet, lead and plug', whereabouts: 'with_unit' }])
    expect((await story()).map(entry => entry.event)).toEqual(['modification_logged', 'kept_with_added'])
  })

  it('asks the owner’s consent for work on a consigned piece, not for what was found', async () => {
    unit = await makeUnit(database.db, bench, { ownership: 'consigned' })
    await expect(log()).rejects.toMatchObject({ statusCode: 409, data: { code: 'owner-consent', refusals: [{ guard: 'owner-consent' }] } })
    expect(await database.db.$count(modifications, eq(modifications.unitId, unit.id))).toBe(0)
    await expect(log({ hand: 'found_like_this', before: '', doneOn: '' })).resolves.toMatchObject({ hand: 'found_like_this' })
    await expect(log({ ownerConsent: 'By telephone, 3 March' })).resolves.toMatchObject({ ownerConsent: 'By telephone, 3 March' })
  })

  it.each(['sold', 'dispatched', 'parted', 'written_off'] as const)('is closed once a unit is %s', async (state) => {
    unit = await makeUnit(database.db, bench, { state })
    await expect(log()).rejects.toMatchObject({ statusCode: 409, data: { code: 'record-closed' } })
  })

  it('corrects an entry, and the correction is in the story with what it said before', async () => {
    const entry = await log()
    const { removedPartsBag: _bag, ...answers } = said({ after: 'Fused IEC-pattern inlet', minutes: '80' })
    const corrected = await correctModification(database.db, bench, { ...answers, tag: unit.tag, id: entry.id, version: 1, why: 'Wrote down the wrong inlet' })
    expect(corrected).toMatchObject({ after: 'Fused IEC-pattern inlet', minutes: 80, corrected: true, version: 2 })
    expect((await story()).at(-1)).toMatchObject({
      event: 'modification_corrected',
      details: {
        why: 'Wrote down the wrong inlet',
        changes: [{ field: 'after', from: 'Fused three-pin inlet', to: 'Fused IEC-pattern inlet' }, { field: 'minutes', from: '75', to: '80' }],
      },
    })
  })

  it('lets only one of two people who correct the same entry at once succeed, and shows the other what stands', async () => {
    const entry = await log()
    const correct = (after: string) => {
      const { removedPartsBag: _bag, ...answers } = said({ after })
      return correctModification(database.db, bench, { ...answers, tag: unit.tag, id: entry.id, version: 1, why: 'Slip' })
    }
    const results = await Promise.allSettled([correct('One'), correct('Two')])
    expect(results.map(result => result.status).sort()).toEqual(['fulfilled', 'rejected'])
    const [standing] = await listModificationsOf(database.db, unit.tag)
    expect(results.find(result => result.status === 'rejected')).toMatchObject({ reason: { statusCode: 409, data: { code: 'stale', current: { after: standing?.after } } } })
    expect((await story()).filter(each => each.event === 'modification_corrected')).toHaveLength(1)
  })

  it('refuses a correction that corrects nothing', async () => {
    const entry = await log()
    const { removedPartsBag: _bag, ...answers } = said()
    await expect(correctModification(database.db, bench, { ...answers, tag: unit.tag, id: entry.id, version: 1, why: 'Slip' })).rejects.toMatchObject({ statusCode: 422 })
    expect(await story()).toHaveLength(1)
  })

  it('withdraws an entry with a reason, keeps it to be read, and corrects it no more', async () => {
    const entry = await log()
    await withdrawModification(database.db, bench, { tag: unit.tag, id: entry.id, version: 1, why: 'Logged on the wrong unit' })
    expect(await listModificationsOf(database.db, unit.tag)).toMatchObject([{ withdrawnBecause: 'Logged on the wrong unit' }])
    const { removedPartsBag: _bag, ...answers } = said({ after: 'x' })
    await expect(correctModification(database.db, bench, { ...answers, tag: unit.tag, id: entry.id, version: 2, why: 'Slip' })).rejects.toMatchObject({ statusCode: 409, data: { code: 'withdrawn' } })
  })

  it('keeps what work could have changed, and a correction of it is in the story', async () => {
    const entry = await log({ touches: ['supply', 'meter'] })
    expect(entry).toMatchObject({ touches: ['supply', 'meter'], affectsNothingBecause: null })
    const { removedPartsBag: _bag, ...answers } = said({ affectsNothingBecause: 'Only the shroud' })
    expect(await correctModification(database.db, bench, { ...answers, tag: unit.tag, id: entry.id, version: 1, why: 'Looked again' }))
      .toMatchObject({ touches: null, affectsNothingBecause: 'Only the shroud', version: 2 })
    expect((await story()).at(-1)?.details).toMatchObject({
      changes: [
        { field: 'only these parts could have changed', from: 'supply rails and rectifier; meter and its circuit', to: null },
        { field: 'does not affect what was measured', from: null, to: 'Only the shroud' },
      ],
    })
  })

  it('marks work of ours as affecting nothing, once from each version, with the reason in the story', async () => {
    const entry = await log({ touches: ['supply'] })
    const mark = (version: number) => markDoesNotAffect(database.db, bench, { tag: unit.tag, id: entry.id, version, why: 'Only the inlet' })
    expect(await mark(1)).toMatchObject({ touches: null, affectsNothingBecause: 'Only the inlet', version: 2 })
    await expect(mark(1)).rejects.toMatchObject({ statusCode: 409, data: { code: 'stale', current: { version: 2 } } })
    expect((await story()).at(-1)).toMatchObject({
      event: 'modification_unaffecting', details: { modificationId: entry.id, summary: 'Two-pin mains inlet → Fused three-pin inlet', why: 'Only the inlet' },
    })
  })

  it('marks neither what was found, nor what was withdrawn, nor anything once the unit is sold', async () => {
    const mark = (id: string, version = 1) => markDoesNotAffect(database.db, bench, { tag: unit.tag, id, version, why: 'x' })
    const found = await log({ hand: 'found_like_this', before: '', doneOn: '' })
    await expect(mark(found.id)).rejects.toMatchObject({ statusCode: 409, data: { code: 'not-our-work' } })
    const entry = await log()
    await withdrawModification(database.db, bench, { tag: unit.tag, id: entry.id, version: 1, why: 'Wrong unit' })
    await expect(mark(entry.id, 2)).rejects.toMatchObject({ data: { code: 'withdrawn' } })
    const other = await log()
    await database.db.update(units).set({ state: 'sold' }).where(eq(units.id, unit.id))
    await expect(mark(other.id)).rejects.toMatchObject({ data: { code: 'record-closed' } })
    expect((await story()).map(each => each.event)).not.toContain('modification_unaffecting')
  })

  it('finds no entry of another unit', async () => {
    const entry = await log()
    const other = await makeUnit(database.db, bench)
    await expect(withdrawModification(database.db, bench, { tag: other.tag, id: entry.id, version: 1, why: 'x' })).rejects.toMatchObject({ statusCode: 404 })
  })
})
