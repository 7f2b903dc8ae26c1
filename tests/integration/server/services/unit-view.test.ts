import { beforeAll, describe, expect, it } from 'vitest'
import { parties } from '../../../../drizzle/schema'
import { getUnitView } from '../../../../server/services/unit-view'
import { makePerson, makeShop, makeUnit } from '../../../support/records'
import { useTestDatabase } from '../../../support/database'

describe('the page of one unit', () => {
  const database = useTestDatabase()
  let tag = ''

  beforeAll(async () => {
    const { db } = database
    await makeShop(db)
    const owner = await makePerson(db, 'owner')
    const [seller] = await db.insert(parties).values({ name: 'Winifred Aldous' }).returning()
    const unit = await makeUnit(db, owner, {
      sourcePartyId: seller?.id, sourceNote: 'Mrs Aldous’s late husband’s', costMinor: 4500, costCurrency: 'GBP', askingMinor: 14_500, askingCurrency: 'GBP',
    })
    tag = unit.tag
  })

  it('carries what the model publishes and the moves it can make next', async () => {
    const view = await getUnitView(database.db, { role: 'owner' }, tag)
    expect(view.model).toMatchObject({ maker: 'Oxmarden', yearsFrom: 1951, yearsTo: 1959 })
    expect(view.bands.map(band => band.label)).toEqual(['A', 'B', 'C', 'D', 'E'])
    expect(view.moves.map(move => move.to)).toEqual(['bench', 'parted', 'written_off'])
    expect(view).toMatchObject({ costMinor: 4500, askingMinor: 14_500, sourceName: 'Winifred Aldous' })
  })

  it.each([
    ['bench', { costMinor: 4500, costCurrency: 'GBP', askingMinor: 14_500, sourceName: 'Winifred Aldous' }],
    ['floor', { costMinor: null, costCurrency: null, askingMinor: 14_500, askingCurrency: 'GBP', sourceName: null, sourceNote: null }],
    ['reader', { costMinor: null, costCurrency: null, askingMinor: null, askingCurrency: null, sourceName: null, sourceNote: null }],
  ] as const)('shows %s only the money and names that the role may see', async (role, seen) => {
    expect(await getUnitView(database.db, { role }, tag)).toMatchObject(seen)
  })

  it('says which unit there is not', async () => {
    await expect(getUnitView(database.db, { role: 'owner' }, 'U0000996')).rejects.toMatchObject({ statusCode: 404, message: expect.stringContaining('U 000099 6') })
  })
})
