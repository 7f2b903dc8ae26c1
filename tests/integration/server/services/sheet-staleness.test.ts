import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { driftReadings, readings, safetyChecks, sheetChecks, testSheets } from '../../../../drizzle/schema'
import { getBenchQueue } from '../../../../server/services/bench-queue'
import { correctModification, logModification, markDoesNotAffect, withdrawModification } from '../../../../server/services/modifications'
import { findSafetyCheck } from '../../../../server/services/safety-checks'
import { getTestSheet, listTestSheets } from '../../../../server/services/test-sheet-view'
import type { Section } from '../../../../shared/domain/checkpoint'
import type { CheckResult } from '../../../../shared/domain/sheet-checks'
import { newModification } from '../../../../shared/schemas/modification'
import type { Person } from '../../../../shared/types/person'
import { useTestDatabase } from '../../../support/database'
import { makePerson, makeShop, makeUnit } from '../../../support/records'

interface Held { read?: Section[], unread?: Section[], checks?: CheckResult[], drift?: boolean, signed?: boolean }

describe('whether a test sheet still holds', () => {
  const database = useTestDatabase()
  let bench: Person
  let unit: Awaited<ReturnType<typeof makeUnit>>

  beforeAll(async () => {
    await makeShop(database.db)
    bench = await makePerson(database.db, 'bench')
  })
  beforeEach(async () => {
    unit = await makeUnit(database.db, bench)
  })

  /** A sheet signed on 9 January 2026, before anything that the tests log. */
  async function makeSheet({ read = [], unread = [], checks = [], drift = false, signed = true }: Held): Promise<void> {
    const [sheet] = await database.db.insert(testSheets).values({
      unitId: unit.id, number: 1, testedOn: '2026-01-09', testedBy: bench.id, ...signed && { signedAt: new Date('2026-01-09T16:00:00Z'), signedBy: bench.id },
    }).returning({ id: testSheets.id })
    if (!sheet) throw new Error('The sheet was not written')
    const points = [...read.map(section => ({ section, isRead: true })), ...unread.map(section => ({ section, isRead: false }))]
    if (points.length) {
      await database.db.insert(readings).values(points.map(({ section, isRead }, index) => ({
        sheetId: sheet.id, position: index + 1, section, quantity: 'voltage' as const, ...isRead && { foundText: '1 V', foundValue: 1 },
      })))
    }
    if (checks.length) await database.db.insert(sheetChecks).values(checks.map((result, index) => ({ sheetId: sheet.id, position: index + 1, name: `Check ${index}`, result })))
    if (drift) await database.db.insert(driftReadings).values({ sheetId: sheet.id, position: 1, minutes: 5, readingText: '1 V', readingValue: 1 })
  }
  const answers = (said: Record<string, unknown>) => newModification.parse({
    hand: 'done_by_us', place: 'SR2', before: 'Selenium stack', after: 'Silicon bridge', reversibility: 're_solder', disposition: 'discarded', ...said,
  })
  const log = (said: Record<string, unknown> = {}) => logModification(database.db, bench, { ...answers(said), tag: unit.tag })
  const sheet = async () => (await listTestSheets(database.db, unit.id))[0]

  it('says which work overtook it, what no longer holds, and under which version that work may be marked', async () => {
    await makeSheet({ read: ['dial', 'output_level', 'attenuator'] })
    expect(await sheet()).toMatchObject({ staleBecause: null, staleWork: null })
    const entry = await log({ touches: ['supply'] })
    expect(await sheet()).toMatchObject({
      staleBecause: 'A rectifier was changed after it was signed (SR2: Selenium stack, now Silicon bridge): the HT may have shifted, and with it the dial. Dial and output level no longer hold.',
      staleWork: { id: entry.id, version: 1 },
    })
    expect(await getTestSheet(database.db, { tag: unit.tag, number: 1 })).toMatchObject({ staleWork: { id: entry.id, version: 1 } })
  })

  it.each([
    ['read another part', { read: ['attenuator'], unread: ['dial'] }, false],
    ['read the part', { read: ['attenuator', 'dial'] }, true],
    ['answered a check', { read: ['attenuator'], checks: ['pass'] }, true],
    ['found a check failed', { read: ['attenuator'], checks: ['fail'] }, true],
    ['left its checks undone', { read: ['attenuator'], checks: ['not_done', 'not_applicable'] }, false],
    ['watched it warm up', { read: ['attenuator'], drift: true }, true],
    ['holds no readings at all', {}, true],
    ['is not signed', { read: ['dial'], signed: false }, false],
  ] satisfies [string, Held, boolean][])('is held against work on the supply when it %s', async (_name, held, isStale) => {
    await makeSheet(held)
    await log({ touches: ['supply'] })
    expect((await sheet())?.staleBecause !== null).toBe(isStale)
  })

  it('holds again once the work is marked, corrected or withdrawn, and the safety check never does', async () => {
    await makeSheet({ read: ['dial'] })
    await database.db.insert(safetyChecks).values({
      unitId: unit.id, safetyClass: 'low_voltage', leadAndPlug: 'pass', fuse: 'pass', polarity: 'pass', visual: 'pass', earthBondLimitMilliohm: 100,
      insulationLimitKilohm: 1000, leakageLimitMicroamp: 3500, limitsOrigin: 'the shop', passed: true, doneBy: bench.id, createdAt: new Date('2026-01-09T16:00:00Z'),
    })
    const isCurrent = async () => (await findSafetyCheck(database.db, unit.id))?.current
    expect(await isCurrent()).toBe(true)
    const first = await log()
    const second = await log({ place: 'Knob' })
    const third = await log({ place: 'Case' })
    expect((await sheet())?.staleWork?.id).toBe(first.id)
    await markDoesNotAffect(database.db, bench, { tag: unit.tag, id: first.id, version: 1, why: 'The old stack was isolated, not removed' })
    expect((await sheet())?.staleWork?.id).toBe(second.id)
    const { removedPartsBag: _bag, ...corrected } = answers({ place: 'Knob', touches: ['nothing_measured'] })
    await correctModification(database.db, bench, { ...corrected, tag: unit.tag, id: second.id, version: 1, why: 'Only the knob' })
    expect((await sheet())?.staleWork?.id).toBe(third.id)
    const queued = async () => (await getBenchQueue(database.db)).stale.items.filter(({ unitTag }) => unitTag === unit.tag)
    expect(await queued()).toMatchObject([{ number: 1, staleBecause: expect.stringContaining('Case') }])
    await withdrawModification(database.db, bench, { tag: unit.tag, id: third.id, version: 1, why: 'Another unit' })
    expect(await sheet()).toMatchObject({ staleBecause: null, staleWork: null })
    expect(await queued()).toEqual([])
    // Two entries stand, both judged harmless to what was measured: the safety check is overtaken all the same.
    expect(await isCurrent()).toBe(false)
  })

  it('never holds one unit’s work against another’s sheet', async () => {
    await makeSheet({ read: ['dial'] })
    const tested = unit
    unit = await makeUnit(database.db, bench)
    await log()
    expect((await listTestSheets(database.db, tested.id))[0]).toMatchObject({ staleBecause: null })
  })
})
