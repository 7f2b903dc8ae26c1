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
    expect(await getShop(database.db)).toMatchObject({ decisionRule: 'guard_band', guardFactor: 1 })
  })

  it('keeps how a reading is judged, and tells the change', async () => {
    const { ituRegion: _region, ...before } = await getShop(database.db)
    const changed = await changeShop(database.db, owner, { ...before, ituRegion: 1, decisionRule: 'simple', guardFactor: 0.83 })
    expect(changed).toMatchObject({ decisionRule: 'simple', guardFactor: 0.83, version: before.version + 1 })
    const [entry] = await database.db.select({ details: ledger.details }).from(ledger).where(eq(ledger.event, 'changed')).orderBy(desc(ledger.id))
    expect(entry?.details).toMatchObject({
      changes: [{ field: 'how a reading is judged', from: 'Guard band', to: 'Simple acceptance' }, { field: 'factor of the guard band', from: '1', to: '0.83' }],
    })
    await expect(changeShop(database.db, owner, { ...before, ituRegion: 1 })).rejects.toMatchObject({ statusCode: 409, data: { code: 'stale', current: { decisionRule: 'simple' } } })
  })

  it('holds the factor to what makes sense, whatever is written', async () => {
    await expect(database.db.update(shop).set({ guardFactor: 3.5 })).rejects.toMatchObject({ cause: { constraint: 'shop_guard_factor' } })
  })
})
