import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { Money } from '../../../../shared/domain/money'
import type { UnitCostFacts } from '../../../../shared/domain/unit-cost'
import { benchCost, benchTime, unitCost } from '../../../../shared/domain/unit-cost'

const gbp = (pounds: number): Money => ({ minor: Math.round(pounds * 100), currency: 'GBP' })
const facts = (said: Partial<UnitCostFacts> = {}): UnitCostFacts => ({
  currency: 'GBP', isConsigned: false, purchase: gbp(150), shares: [], fittings: [], minutes: 0, entriesWithoutMinutes: 0, benchRateMinor: 2800, price: gbp(420), isSold: false, ...said,
})

describe('what a piece has cost', () => {
  it('agrees with the trade note’s worked example, which is invented, as far as it goes', () => {
    // In 150; parts 38; 5 h at 28 = 140; sold 420. The note also takes off tax 45, fee 54.60, and 32 for packing and carriage,
    // and comes to +100.40 before bench time and −39.60 after: those three are not kept here.
    const cost = unitCost(facts({ fittings: [gbp(30), gbp(8)], minutes: 300, isSold: true }))
    const notKept = gbp(45 + 54.60 + 32).minor
    expect(cost.lines).toEqual([
      { key: 'purchase', term: 'Bought for', minor: 15_000 },
      { key: 'parts', term: '2 parts fitted', minor: 3800 },
      { key: 'bench', term: '5\u202Fh on the bench at £28.00 an hour', minor: 14_000 },
    ])
    expect(cost.totalMinor).toBe(32_800)
    expect((cost.marginBeforeBenchMinor ?? 0) - notKept).toBe(gbp(100.40).minor)
    expect((cost.marginMinor ?? 0) - notKept).toBe(gbp(-39.60).minor)
    expect(cost.missing).toEqual([])
  })

  it('takes off what parts pulled from it took with them', () => {
    // An old part that went back to the drawer at no cost is no line.
    const cost = unitCost(facts({ shares: [gbp(60), gbp(15.55), gbp(0)] }))
    expect(cost.lines[1]).toEqual({ key: 'shares', term: 'Less shares of 2 lots pulled from it', minor: -7555 })
    expect(cost.totalMinor).toBe(7445)
  })

  it('says what is missing rather than count it as nothing', () => {
    expect(unitCost(facts({ purchase: null, fittings: [null, null, gbp(1)], shares: [null], minutes: 90, benchRateMinor: null, entriesWithoutMinutes: 1 })).missing).toEqual([
      'What was paid for it is not known yet', 'One lot pulled from it took no share of its cost', '2 parts of unknown cost',
      '1\u202Fh\u202F30 on the bench: no rate an hour is set', 'One entry of work without its minutes',
    ])
  })

  it('has nothing paid for a consigned piece, and owes its owner', () => {
    const cost = unitCost(facts({ isConsigned: true, purchase: null, fittings: [gbp(5)] }))
    expect(cost.lines.map(({ key }) => key)).toEqual(['parts'])
    expect(cost.missing).toEqual(['It is on consignment: its owner’s share of the price is still to come off'])
  })

  it('lists another currency apart, and adds none of it', () => {
    const cost = unitCost(facts({ purchase: { minor: 9900, currency: 'EUR' }, fittings: [gbp(2), { minor: 300, currency: 'EUR' }], price: { minor: 50_000, currency: 'EUR' } }))
    expect(cost.totalMinor).toBe(200)
    expect(cost.apart).toEqual([{ term: 'Bought for', minor: 9900, currency: 'EUR' }, { term: 'One part fitted', minor: 300, currency: 'EUR' }])
    expect([cost.marginMinor, cost.marginBeforeBenchMinor]).toEqual([null, null])
  })

  const money = fc.record({ minor: fc.integer({ min: 0, max: 999_999_999 }), currency: fc.constantFrom('GBP', 'GBP', 'EUR', 'JPY') })
  const unsure = fc.option(money)
  const anyFacts = fc.record({
    currency: fc.constant('GBP'), isConsigned: fc.boolean(), purchase: unsure, shares: fc.array(unsure, { maxLength: 8 }), fittings: fc.array(unsure, { maxLength: 30 }),
    minutes: fc.integer({ min: 0, max: 1_000_000 }), entriesWithoutMinutes: fc.nat(3), benchRateMinor: fc.option(fc.integer({ min: 0, max: 999_999_999 })), price: unsure, isSold: fc.boolean(),
  })

  it('has lines that add up to the total, and margins that differ by the bench time, to the cent', () => {
    fc.assert(fc.property(anyFacts, (said) => {
      const cost = unitCost(said)
      expect(cost.lines.reduce((sum, { minor }) => sum + minor, 0)).toBe(cost.totalMinor)
      const bench = said.benchRateMinor === null ? 0 : benchCost(said.minutes, said.benchRateMinor)
      if (cost.marginMinor !== null) {
        expect(cost.marginMinor + cost.totalMinor).toBe(said.price?.minor)
        expect((cost.marginBeforeBenchMinor ?? NaN) - cost.marginMinor).toBe(bench)
      }
    }))
  })

  it('loses no amount: every currency’s lines are what came in less what went out', () => {
    fc.assert(fc.property(anyFacts, (said) => {
      const cost = unitCost(said)
      for (const currency of ['EUR', 'JPY']) {
        const sum = (amounts: readonly (Money | null)[]) => amounts.reduce((total, amount) => total + (amount?.currency === currency ? amount.minor : 0), 0)
        const apart = cost.apart.filter(each => each.currency === currency).reduce((total, { minor }) => total + minor, 0)
        expect(apart).toBe(sum([said.isConsigned ? null : said.purchase]) + sum(said.fittings) - sum(said.shares))
      }
    }))
  })
})

describe('bench time at a rate', () => {
  it('is rounded once, to the nearest, a half upwards', () => {
    // 28.00 an hour is 46⅔ pence a minute: 1 min 47, 3 min 140, and 90 min exactly 42.00.
    expect([1, 3, 90].map(minutes => benchCost(minutes, 2800))).toEqual([47, 140, 4200])
    expect(benchCost(1, 30)).toBe(1)
  })

  it('is never further from the exact amount than half a minor unit', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 1e6 }), fc.integer({ min: 0, max: 1e9 }), (minutes, rate) => {
      const off = BigInt(benchCost(minutes, rate)) * 60n - BigInt(minutes) * BigInt(rate)
      expect(off > -30n && off <= 30n).toBe(true)
    }))
  })
})

describe('bench time against its ceiling', () => {
  const plain = (sentence: string) => sentence.replaceAll('\u202F', ' ')

  it.each([
    [100, null, 0, 'none', '1 h 40 spent. No ceiling is set.'],
    [100, 240, 0, 'under', '1 h 40 of 4 h spent.'],
    [100, 240, 30, 'under', '1 h 40 of 4 h spent; this entry makes it 2 h 10.'],
    [191, 240, 0, 'under', '3 h 11 of 4 h spent.'],
    [192, 240, 0, 'near', '3 h 12 of 4 h spent: 48 min left.'],
    [240, 240, 0, 'near', '4 h of 4 h spent: none is left.'],
    [241, 240, 0, 'passed', '4 h 01 of 4 h spent: 1 min over the ceiling. Stop and think.'],
    [100, 240, 150, 'passed', '1 h 40 of 4 h spent; this entry makes it 4 h 10: over the ceiling. Stop and think.'],
  ] as const)('%d of %s with %d more: %s', (spent, ceiling, entered, standing, sentence) => {
    const said = benchTime(spent, ceiling, entered)
    expect({ ...said, sentence: plain(said.sentence) }).toEqual({ standing, sentence })
  })

  it('only ever rises as time is spent', () => {
    const order = ['under', 'near', 'passed']
    fc.assert(fc.property(fc.nat(5000), fc.nat(5000), fc.integer({ min: 1, max: 5000 }), (spent, more, ceiling) => {
      expect(order.indexOf(benchTime(spent, ceiling, more).standing)).toBeGreaterThanOrEqual(order.indexOf(benchTime(spent, ceiling).standing))
    }))
  })
})
