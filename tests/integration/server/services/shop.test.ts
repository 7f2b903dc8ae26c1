import { desc, eq } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import { ledger, shop } from '../../../../drizzle/schema'
import { changeShop, getShop } from '../../../../server/services/shop'
import type { Person } from '../../../../shared/types/person'
import { useTestDatabase } from '../../../support/database'
import { makePerson, makeShop } from '../../../support/records'

describe('the shop’s settings', () => {
  const database = useTestDatabase()
  let owner: Person

  beforeAll(async () => {
    await makeShop(database.db)
    owner = await makePerson(database.db, 'owner')
  })

  it('starts with a guard band of once the uncertainty', async () => {
    expect(await getShop(database.db, owner)).toMatchObject({ decisionRule: 'guard_band', guardFactor: 1, benchRateMinor: null })
  })

  it('keeps how a reading is judged, and tells the change', async () => {
    const { ituRegion: _region, ...before } = await getShop(database.db, owner)
    const changed = await changeShop(database.db, owner, { ...before, ituRegion: 1, decisionRule: 'simple', guardFactor: 0.83 })
    expect(changed).toMatchObject({ decisionRule: 'simple', guardFactor: 0.83, version: before.version + 1 })
    const [entry] = await database.db.select({ details: ledger.details }).from(ledger).where(eq(ledger.event, 'changed')).orderBy(desc(ledger.id))
    expect(entry?.details).toMatchObject({
      changes: [{ field: 'how a reading is judged', from: 'Guard band', to: 'Simple acceptance' }, { field: 'factor of the guard band', from: '1', to: '0.83' }],
    })
    await expect(changeShop(database.db, owner, { ...before, ituRegion: 1 })).rejects.toMatchObject({ statusCode: 409, data: { code: 'stale', current: { decisionRule: 'simple' } } })
  })

  it('keeps what an hour on the bench costs, in its own currency, for those who may see costs', async () => {
    const { ituRegion: _region, ...before } = await getShop(database.db, owner)
    const said = { ...before, ituRegion: 1 } as const
    const changed = await changeShop(database.db, owner, { ...said, benchRate: '£28' })
    expect(changed.benchRateMinor).toBe(2800)
    const [entry] = await database.db.select({ details: ledger.details }).from(ledger).where(eq(ledger.event, 'changed')).orderBy(desc(ledger.id))
    expect(entry?.details).toMatchObject({ changes: [{ field: 'bench rate', from: null, to: '£28.00 an hour' }] })
    expect((await getShop(database.db, await makePerson(database.db, 'floor'))).benchRateMinor).toBeNull()
    expect((await getShop(database.db, await makePerson(database.db, 'bench'))).benchRateMinor).toBe(2800)
    await expect(changeShop(database.db, owner, { ...said, version: changed.version, benchRate: '€30' })).rejects.toMatchObject({
      statusCode: 422, data: { errors: [{ path: 'benchRate', message: expect.stringContaining('another currency') }] },
    })
    // Left out it stays; in another currency it means nothing any more.
    const same = await changeShop(database.db, owner, { ...said, version: changed.version, name: 'Fenwold and Daughter' })
    expect(same.benchRateMinor).toBe(2800)
    const moved = await changeShop(database.db, owner, { ...said, version: same.version, currency: 'JPY' })
    expect(moved.benchRateMinor).toBeNull()
    const yen = await changeShop(database.db, owner, { ...said, version: moved.version, currency: 'JPY', benchRate: '4000' })
    expect(yen.benchRateMinor).toBe(4000)
    expect((await changeShop(database.db, owner, { ...said, version: yen.version, benchRate: '' })).benchRateMinor).toBeNull()
  })

  it('holds the factor to what makes sense, whatever is written', async () => {
    await expect(database.db.update(shop).set({ guardFactor: 3.5 })).rejects.toMatchObject({ cause: { constraint: 'shop_guard_factor' } })
  })
})
