import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { CoverageBand, Interval } from '../../../../shared/domain/coverage'
import {
  coverageOf, covers, describeCoverage, formatMultirange, FUNCTIONS, gapsWithin, isInterval, overlaps, parseMultirange, shortfall, unionOf,
} from '../../../../shared/domain/coverage'

const MOST = 40
const plain = (text: string | null): string | null => text === null ? null : text.replaceAll('\u202F', ' ')
const interval = fc.tuple(fc.integer({ min: 0, max: MOST }), fc.integer({ min: 0, max: MOST }))
  .map(([a, b]) => ({ lowerHz: Math.min(a, b), upperHz: Math.max(a, b) }))
const intervals = fc.array(interval, { maxLength: 8 })

/** The oracle: every whole hertz that some interval holds. */
function points(list: readonly Interval[]): Set<number> {
  const held = new Set<number>()
  for (const { lowerHz, upperHz } of list) for (let hz = lowerHz; hz <= upperHz; hz += 1) held.add(hz)
  return held
}
const band = (lowerHz: number, upperHz: number, name: CoverageBand['function'] = 'generates'): CoverageBand => ({ function: name, lowerHz, upperHz })

describe('against an oracle that holds every whole hertz', () => {
  it('the union holds what its parts hold, disjoint, rising and with a gap between any two', () => {
    fc.assert(fc.property(intervals, (list) => {
      const union = unionOf(list)
      expect(points(union)).toEqual(points(list))
      for (const [index, piece] of union.entries()) {
        expect(isInterval(piece)).toBe(true)
        const next = union[index + 1]
        if (next) expect(next.lowerHz).toBeGreaterThan(piece.upperHz + 1)
      }
      expect(unionOf(union)).toEqual(union)
    }), { numRuns: 500 })
  })

  it('covers, overlaps and gaps agree with counting', () => {
    fc.assert(fc.property(intervals, interval, (list, range) => {
      const held = points(list)
      const wanted = [...points([range])]
      expect(covers(list, range)).toBe(wanted.every(hz => held.has(hz)))
      expect(overlaps(list, range)).toBe(wanted.some(hz => held.has(hz)))
      expect([...points(gapsWithin(list, range))]).toEqual(wanted.filter(hz => !held.has(hz)))
      expect(shortfall(list, range) === null).toBe(covers(list, range))
    }), { numRuns: 1000 })
  })

  it('goes through PostgreSQL text and back', () => {
    fc.assert(fc.property(intervals, (list) => {
      expect(parseMultirange(formatMultirange(list))).toEqual(unionOf(list))
    }))
  })

  it('keeps the functions apart', () => {
    const bands = fc.array(fc.tuple(interval, fc.constantFrom(...FUNCTIONS)).map(([range, name]) => ({ ...range, function: name })), { maxLength: 10 })
    fc.assert(fc.property(bands, (list) => {
      const coverage = coverageOf(list)
      for (const name of FUNCTIONS) expect(points(coverage[name])).toEqual(points(list.filter(one => one.function === name)))
    }))
  })

  it('leaves what it is given alone', () => {
    const given = [{ lowerHz: 5, upperHz: 9 }, { lowerHz: 1, upperHz: 6 }]
    unionOf(given)
    expect(given).toEqual([{ lowerHz: 5, upperHz: 9 }, { lowerHz: 1, upperHz: 6 }])
  })
})

describe('edges', () => {
  it('joins neighbours and not what one hertz parts', () => {
    expect(unionOf([band(100, 200), band(201, 300)])).toEqual([{ lowerHz: 100, upperHz: 300 }])
    expect(unionOf([band(100, 200), band(202, 300)])).toHaveLength(2)
    expect(covers([band(100, 200), band(202, 300)], { lowerHz: 100, upperHz: 300 })).toBe(false)
  })

  it('has DC and spot frequencies', () => {
    expect(covers([band(0, 10)], { lowerHz: 0, upperHz: 0 })).toBe(true)
    expect(covers([band(1_000_000, 1_000_000)], { lowerHz: 1_000_000, upperHz: 1_000_000 })).toBe(true)
    expect(isInterval({ lowerHz: 0, upperHz: 0 })).toBe(true)
  })

  it.each([[-1, 5], [5, 4], [0.5, 1], [Number.NaN, 1], [0, Infinity]])('takes %d to %d for no interval', (lowerHz, upperHz) => {
    expect(isInterval({ lowerHz, upperHz })).toBe(false)
  })
})

describe('PostgreSQL int8multirange text', () => {
  it('is written canonically, half open', () => {
    expect(formatMultirange([band(100_000, 320_000), band(500_000, 500_000)])).toBe('{[100000,320001),[500000,500001)}')
    expect(formatMultirange([])).toBe('{}')
  })

  it('is read whichever ends are open', () => {
    expect(parseMultirange('{(99999,320000], empty,[5,5]}')).toEqual([{ lowerHz: 5, upperHz: 5 }, { lowerHz: 100_000, upperHz: 320_000 }])
    expect(parseMultirange('{[5,5)}')).toEqual([])
    expect(parseMultirange('{}')).toEqual([])
  })

  it.each(['', '[1,2)', '{[1,)}', '{(,5)}', '{[a,b)}', '{[1,2)', '{[-5,2)}', '{[1,2),}'])('refuses %s', (text) => {
    expect(() => parseMultirange(text)).toThrow(RangeError)
  })
})

describe('shortfall', () => {
  const generator = [band(100_000, 300_000), band(400_000, 22_000_000)]
  it.each<[number, number, string | null]>([
    [100_000, 30_000_000, 'stops at 22 MHz, 8 MHz short · gap 300–400 kHz'],
    [50_000, 200_000, 'starts at 100 kHz, 50 kHz short'],
    [350_000, 350_000, 'stops at 300 kHz · starts again at 400 kHz'],
    [88_000_000, 108_000_000, 'stops at 22 MHz'],
    [1000, 2000, 'starts at 100 kHz'],
    [500_000, 1_000_000, null],
    [250_000, 350_000, 'stops at 300 kHz, 50 kHz short'],
  ])('of %d to %d Hz reads %s', (lowerHz, upperHz, says) => {
    expect(plain(shortfall(generator, { lowerHz, upperHz }))).toBe(says)
  })

  it('says when nothing is recorded', () => {
    expect(shortfall([], { lowerHz: 1, upperHz: 2 })).toBe('no coverage recorded')
  })
})

describe('describeCoverage', () => {
  it('speaks plainly', () => {
    const five = [band(100e3, 320e3), band(320e3, 1e6), band(1e6, 3.2e6), band(3.2e6, 10e6), band(10e6, 32e6)]
    expect(plain(describeCoverage(five))).toBe('100 kHz to 32 MHz in five bands, no gaps')
    expect(plain(describeCoverage([band(100e3, 300e3), band(400e3, 1e6)]))).toBe('100 kHz to 1 000 kHz in two bands, a gap at 300–400 kHz')
    expect(plain(describeCoverage([band(0, 10e6)]))).toBe('DC to 10 MHz in one band')
    expect(plain(describeCoverage([band(1e6, 1e6)]))).toBe('1 000 kHz only')
    expect(plain(describeCoverage([band(1e6, 1e6), band(5e6, 5e6)]))).toBe('2 spot frequencies from 1 000 kHz to 5 MHz')
    expect(describeCoverage([])).toBe('No coverage recorded')
  })

  it('names the functions when there are several', () => {
    expect(plain(describeCoverage([band(100e3, 30e6, 'measures'), band(1e6, 1e6)])))
      .toBe('Generates 1 000 kHz only; measures 100 kHz to 30 MHz in one band')
  })
})
