import { beforeAll, describe, expect, it } from 'vitest'
import { keptWithItems, triages } from '../../../../drizzle/schema'
import { appendUnitLedger } from '../../../../server/services/ledger'
import { takeTag } from '../../../../server/services/tags'
import { getToday } from '../../../../server/services/today'
import { listUnits } from '../../../../server/services/units-list'
import { UNIT_NEEDS } from '../../../../shared/domain/unit-needs'
import { unitsListQuery } from '../../../../shared/schemas/units-list'
import { useTestDatabase } from '../../../support/database'
import { makePerson, makePlace, makeShop, makeUnit } from '../../../support/records'

describe('the day-book', () => {
  const database = useTestDatabase()

  beforeAll(async () => {
    const { db } = database
    await makeShop(db)
    const owner = await makePerson(db, 'owner')
    const place = await makePlace(db)
    const looked = await makeUnit(db, owner, { state: 'ready', locationId: place.id })
    await db.insert(triages).values({
      unitId: looked.id, safetyClass: 'earthed', lead: 'sound', plug: 'sound', fuse: 'sound', verdict: 'may_be_powered', doneBy: owner.id,
    })
    await db.transaction(async tx => tx.insert(keptWithItems).values({
      tag: await takeTag(tx, 'K'), unitId: looked.id, kind: 'manual', description: 'Handbook', originality: 'original', whereabouts: 'missing', missingSince: new Date(),
    }))
    await makeUnit(db, owner, { state: 'bench', hazardHold: 'Asbestos board', locationId: place.id })
    await makeUnit(db, owner, { state: 'held' })
    await makeUnit(db, owner, { state: 'sold' })
    await makeUnit(db, owner, { state: 'dispatched' })
    await appendUnitLedger(db, owner, looked.id, 'cost_changed', { changes: [{ field: 'cost', from: null, to: '45.00' }] })
    await appendUnitLedger(db, owner, looked.id, 'hazard_lifted', { why: 'Board encapsulated' })
  })

  it('counts what waits, and each count leads to a list of exactly so many', async () => {
    const { db } = database
    const today = await getToday(db, { role: 'owner' })
    expect(Object.fromEntries(today.lines.map(line => [line.key, line.total]))).toEqual({
      hazard: 1, triage: 2, bench: 1, ready: 1, held: 1, dispatch: 1, missing: 1, place: 1,
    })
    for (const need of UNIT_NEEDS) {
      const listed = await listUnits(db, { role: 'owner' }, unitsListQuery.parse({ needs: need }))
      expect([need, listed.total]).toEqual([need, today.lines.find(line => line.key === need)?.total ?? 0])
    }
    expect(today.inStock).toBe(3)
  })

  it('tells the latest of the story, without money to those who may not see it', async () => {
    const events = async (role: 'owner' | 'reader') => (await getToday(database.db, { role })).story.map(entry => entry.event)
    expect(await events('owner')).toEqual(['hazard_lifted', 'cost_changed'])
    expect(await events('reader')).toEqual(['hazard_lifted'])
  })
})
