import fc from 'fast-check'
import { eq } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import { bands, locations, unitCoverage, units } from '../../../../drizzle/schema'
import { listUnits } from '../../../../server/services/units-list'
import { takeTag } from '../../../../server/services/tags'
import type { Database } from '../../../../server/utils/db'
import { coverageOf, covers, formatMultirange, overlaps } from '../../../../shared/domain/coverage'
import type { CoverageBand, Interval } from '../../../../shared/domain/coverage'
import { FUNCTIONS } from '../../../../shared/domain/functions'
import type { Role } from '../../../../shared/domain/roles'
import { makeTag } from '../../../../shared/domain/tag'
import { unitsListQuery } from '../../../../shared/schemas/units-list'
import type { Person } from '../../../../shared/types/person'
import { useTestDatabase } from '../../../support/database'
import { makeModel, makePerson, makePlace, makeShop, makeUnit } from '../../../support/records'

async function writeCoverage(db: Database, unitId: string, of: readonly CoverageBand[]): Promise<void> {
  await db.delete(unitCoverage).where(eq(unitCoverage.unitId, unitId))
  const coverage = coverageOf(of)
  for (const name of FUNCTIONS) {
    if (coverage[name].length > 0) await db.insert(unitCoverage).values({ unitId, function: name, ranges: formatMultirange(coverage[name]) })
  }
}

async function tagsFound(db: Database, query: Record<string, unknown>, role: Role = 'owner'): Promise<string[]> {
  const page = await listUnits(db, { role }, unitsListQuery.parse({ limit: 500, ...query }))
  expect(page.total).toBe(page.items.length)
  return page.items.map(unit => unit.tag).sort()
}

describe('finding units', () => {
  const database = useTestDatabase()
  let owner: Person
  let generator: typeof units.$inferSelect
  let receiver: typeof units.$inferSelect
  let shelf: typeof locations.$inferSelect
  let room: typeof locations.$inferSelect

  beforeAll(async () => {
    const { db } = database
    await makeShop(db)
    owner = await makePerson(db, 'owner')
    room = await makePlace(db, 'Long store')
    shelf = await db.transaction(async (tx) => {
      const [row] = await tx.insert(locations).values({ tag: await takeTag(tx, 'L'), kind: 'shelf', name: 'B', parentId: room.id }).returning()
      if (!row) throw new Error('no shelf')
      return row
    })
    const model = await makeModel(db, { maker: 'Oxmarden', designation: '307-G' })
    generator = await makeUnit(db, owner, { modelId: model.id, serial: '4417', locationId: shelf.id, askingMinor: 18_500, askingCurrency: 'GBP', state: 'ready' })
    const set = await makeModel(db, { maker: 'Haldraven', designation: 'CR 88', kind: 'communications_receiver' })
    receiver = await makeUnit(db, owner, { modelId: set.id, serial: 'A/90%_7', hazardHold: 'Asbestos board behind the rectifier' })
    await writeCoverage(db, generator.id, [{ function: 'generates', lowerHz: 100_000, upperHz: 32_000_000 }])
    await writeCoverage(db, receiver.id, [
      { function: 'tunes', lowerHz: 150_000, upperHz: 400_000 }, { function: 'tunes', lowerHz: 540_000, upperHz: 30_000_000 },
      { function: 'passes', lowerHz: 455_000, upperHz: 455_000 },
    ])
  })

  it('by a frequency that is wholly covered, never across a gap or by two functions together', async () => {
    const { db } = database
    expect(await tagsFound(db, { covers: '200 kc' })).toEqual([generator.tag, receiver.tag].sort())
    expect(await tagsFound(db, { covers: '300-600 kHz' })).toEqual([generator.tag])
    expect(await tagsFound(db, { overlaps: '300-600 kHz' })).toEqual([generator.tag, receiver.tag].sort())
    expect(await tagsFound(db, { covers: '455 kHz', function: 'tunes' })).toEqual([])
    expect(await tagsFound(db, { covers: ['455kHz', '20MHz'] })).toEqual([generator.tag])
    expect(await tagsFound(db, { covers: '88-108 MHz' })).toEqual([])
  })

  it('by maker, designation, kind, serial fragment and tag, with a typing error forgiven', async () => {
    const { db } = database
    expect(await tagsFound(db, { q: 'oxmarden' })).toEqual([generator.tag])
    expect(await tagsFound(db, { q: 'Oxmardn 307' })).toEqual([generator.tag])
    expect(await tagsFound(db, { q: 'signal generater' })).toEqual([generator.tag])
    expect(await tagsFound(db, { q: 'shortwave' })).toEqual([receiver.tag])
    expect(await tagsFound(db, { q: '441' })).toEqual([generator.tag])
    expect(await tagsFound(db, { q: '90%_' })).toEqual([receiver.tag])
    expect(await tagsFound(db, { q: generator.tag.toLowerCase().replace('u', 'u ') })).toEqual([generator.tag])
    expect(await tagsFound(db, { q: 'oxmarden shortwave' })).toEqual([])
    expect(await tagsFound(db, { q: '📻 \u202E' })).toEqual([])
  })

  it('by state and by place, what stands beneath it included', async () => {
    const { db } = database
    expect(await tagsFound(db, { state: 'ready' })).toEqual([generator.tag])
    expect(await tagsFound(db, { state: 'ready,intake' })).toEqual([generator.tag, receiver.tag].sort())
    expect(await tagsFound(db, { location: room.tag })).toEqual([generator.tag])
    expect(await tagsFound(db, { location: shelf.tag.toLowerCase() })).toEqual([generator.tag])
    await expect(listUnits(db, { role: 'owner' }, unitsListQuery.parse({ location: makeTag('L', 999) }))).rejects.toThrow('No place has the tag')
  })

  it('shows bands, place and hazard, and the price to those who may see one', async () => {
    const { db } = database
    const query = unitsListQuery.parse({ q: 'oxmarden' })
    const [shown] = (await listUnits(db, { role: 'floor' }, query)).items
    expect(shown).toMatchObject({
      tag: generator.tag, askingMinor: 18_500, askingCurrency: 'GBP', thumbnailUrl: null, hazardHold: null,
      place: { tag: shelf.tag, path: 'Long store · B' }, serial: { answer: 'known', text: '4417' },
    })
    expect(shown?.bands.map(band => band.label)).toEqual(['A', 'B', 'C', 'D', 'E'])
    const [hidden] = (await listUnits(db, { role: 'reader' }, query)).items
    expect(hidden).toMatchObject({ askingMinor: null, askingCurrency: null })
    const [held] = (await listUnits(db, { role: 'reader' }, unitsListQuery.parse({ q: receiver.tag }))).items
    expect(held?.hazardHold).toBe('Asbestos board behind the rectifier')
  })

  it('refuses nonsense in a sentence', () => {
    const sentence = (query: Record<string, unknown>) => unitsListQuery.safeParse(query).error?.issues[0]?.message
    expect(sentence({ covers: 'banana' })).toBe('"banana" is not a frequency. Write it like 455 kc or 10.7 MHz.')
    expect(sentence({ covers: '0' })).toBe('A frequency must be above zero.')
    expect(sentence({ covers: '-1' })).toBe('-1 is below zero. A frequency must be above zero.')
    expect(sentence({ overlaps: '1e30' })).toContain('the highest frequency kept')
    expect(sentence({ covers: '108-88 MHz' })).toContain('runs backwards')
    expect(sentence({ state: 'lost' })).toContain('state must be one or more of intake')
    expect(sentence({ location: 'U0000016' })).toContain('place')
    expect(sentence({ covers: Array.from({ length: 6 }, () => '1 kHz') })).toBe('Ask for 5 ranges at most in covers')
    expect(sentence({ q: 'x'.repeat(201) })).toBe('Search for 200 characters at most')
  })
})

describe('coverage in the database', () => {
  const database = useTestDatabase()
  const hertz = fc.integer({ min: 0, max: 40 })
  const interval = fc.tuple(hertz, hertz).map(([a, b]): Interval => ({ lowerHz: Math.min(a, b), upperHz: Math.max(a, b, 1) }))
  const band = fc.record({ function: fc.constantFrom(...FUNCTIONS), of: interval }).map(({ function: name, of }): CoverageBand => ({ function: name, ...of }))

  it('agrees with the pure functions on any bands and any range', async () => {
    const { db } = database
    await makeShop(db)
    const owner = await makePerson(db, 'owner')
    const model = await makeModel(db)
    const made = await Promise.all([1, 2, 3].map(() => makeUnit(db, owner, { modelId: model.id })))
    await fc.assert(fc.asyncProperty(
      fc.tuple(fc.array(band, { maxLength: 5 }), fc.array(band, { maxLength: 5 }), fc.array(band, { maxLength: 5 })), interval,
      async (sets, range) => {
        const coverages = sets.map(coverageOf)
        for (const [index, unit] of made.entries()) await writeCoverage(db, unit.id, sets[index] ?? [])
        const text = `${range.lowerHz === 0 ? 'DC' : range.lowerHz}-${range.upperHz} Hz`
        const expected = (test: typeof covers) => made
          .filter((_, index) => FUNCTIONS.some(name => test(coverages[index]?.[name] ?? [], range))).map(unit => unit.tag).sort()
        expect(await tagsFound(db, { covers: text })).toEqual(expected(covers))
        expect(await tagsFound(db, { overlaps: text })).toEqual(expected(overlaps))
      },
    ), { numRuns: 60 })
  })
})

describe('pages of units', () => {
  const database = useTestDatabase()

  beforeAll(async () => {
    const { db } = database
    await makeShop(db)
    const owner = await makePerson(db, 'owner')
    const model = await makeModel(db)
    const others = await makeModel(db)
    // Seven of one instant, so that only the id tells them apart.
    const at = new Date('2026-03-02T10:00:00.123Z')
    for (let made = 0; made < 7; made++) await makeUnit(db, owner, { modelId: model.id, createdAt: at })
    for (let made = 0; made < 4; made++) await makeUnit(db, owner, { modelId: others.id })
  })

  it('give every unit once, whatever is booked in meanwhile', async () => {
    const { db } = database
    const all = await tagsFound(db, {})
    const owner = await makePerson(db, 'owner')
    const seen: string[] = []
    let cursor: string | undefined
    do {
      const page = await listUnits(db, { role: 'owner' }, unitsListQuery.parse({ limit: 3, cursor }))
      seen.push(...page.items.map(unit => unit.tag))
      cursor = page.nextCursor ?? undefined
      if (seen.length === 3) await makeUnit(db, owner)
    } while (cursor)
    expect(seen.length).toBe(11)
    expect([...seen].sort()).toEqual(all)
  })

  it.each(['nonsense', Buffer.from('["2026-03-02", 1]').toString('base64url'), Buffer.from('{}').toString('base64url')])('refuse the cursor %s', async (cursor) => {
    await expect(listUnits(database.db, { role: 'owner' }, unitsListQuery.parse({ cursor }))).rejects.toThrow('That cursor is not one of ours')
  })

  it('take the same number of statements for one unit as for many', async () => {
    const { db, pool } = database
    const count = async (limit: number) => {
      let statements = 0
      const listen = () => {
        statements++
      }
      pool.on('acquire', listen)
      await listUnits(db, { role: 'owner' }, unitsListQuery.parse({ limit }))
      pool.off('acquire', listen)
      return statements
    }
    expect(await count(11)).toBe(await count(1))
  })

  it('hold bands in the order of the switch', async () => {
    const { db } = database
    const [first] = (await listUnits(db, { role: 'owner' }, unitsListQuery.parse({ limit: 1 }))).items
    const stored = await db.select({ label: bands.label }).from(bands).where(eq(bands.modelId, first?.model.id ?? '')).orderBy(bands.position)
    expect(first?.bands.map(each => each.label)).toEqual(stored.map(each => each.label))
    expect(await db.$count(units)).toBeGreaterThan(11)
  })
})
