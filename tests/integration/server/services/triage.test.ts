import { asc, eq } from 'drizzle-orm'
import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { ledger, triages, units } from '../../../../drizzle/schema'
import { findTriage, recordTriage } from '../../../../server/services/triage'
import { newTriage } from '../../../../shared/schemas/triage'
import type { Person } from '../../../../shared/types/person'
import { useTestDatabase } from '../../../support/database'
import { makePerson, makeShop, makeUnit } from '../../../support/records'

const look = (answers: Record<string, unknown> = {}) => newTriage.parse({
  safetyClass: 'earthed', lead: 'sound', plug: 'sound', fuse: 'sound', fuseRating: 'T1A', voltageSetting: '240 V', verdict: 'may_be_powered', ...answers,
})

describe('triage', () => {
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

  const record = (answers: Record<string, unknown> = {}) => recordTriage(database.db, bench, { ...look(answers), tag: unit.tag })
  const holdOf = async () => (await database.db.select({ hold: units.hazardHold }).from(units).where(eq(units.id, unit.id)))[0]?.hold
  const events = async () => (await database.db.select().from(ledger).where(eq(ledger.unitId, unit.id)).orderBy(asc(ledger.id))).map(entry => entry.event)

  it('keeps every look and counts the newest', async () => {
    expect(await findTriage(database.db, unit.id)).toBeNull()
    await record({ verdict: 'do_not_power', lead: 'perished', hazards: ['stored_charge', 'perished_insulation'] })
    await record()
    expect(await findTriage(database.db, unit.id)).toMatchObject({ verdict: 'may_be_powered', fuseRating: 'T1A', hazards: [] })
    expect(await database.db.$count(triages, eq(triages.unitId, unit.id))).toBe(2)
  })

  it('holds a piece with its reason until a later look says what was done', async () => {
    await record({ verdict: 'hazard_hold', holdBecause: 'Asbestos sheet behind the dropper', hazards: ['asbestos'] })
    expect(await holdOf()).toBe('Asbestos sheet behind the dropper')
    await expect(record()).rejects.toMatchObject({ statusCode: 422, data: { errors: [{ path: 'liftedBecause' }] } })
    expect(await holdOf()).toBe('Asbestos sheet behind the dropper')
    expect(await database.db.$count(triages, eq(triages.unitId, unit.id))).toBe(1)
    await record({ liftedBecause: 'Sheet removed by a licensed firm' })
    expect(await holdOf()).toBeNull()
    expect(await events()).toEqual(['triaged', 'hazard_held', 'triaged', 'hazard_lifted'])
  })

  it('is not recorded on a piece that has left', async () => {
    unit = await makeUnit(database.db, bench, { state: 'dispatched' })
    await expect(record()).rejects.toMatchObject({ statusCode: 409 })
  })

  it('refuses a hold without a reason, and a hazard that is not of the list', () => {
    expect(newTriage.safeParse({ ...look(), verdict: 'hazard_hold', holdBecause: ' ' }).error?.issues).toMatchObject([{ path: ['holdBecause'] }])
    expect(newTriage.safeParse({ ...look(), hazards: ['dragons'] }).success).toBe(false)
  })
})
