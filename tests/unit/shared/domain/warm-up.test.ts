import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { warmUpOf } from '../../../../shared/domain/warm-up'

/** An oscillator that settles as e^(−t/τ), from 1 % high. */
const settling = (tau: number, times: readonly number[]) => times.map(minutes => ({ minutes, value: 1e6 * (1 + 0.01 * Math.exp(-minutes / tau)) }))
const at = (...pairs: [minutes: number, value: number][]) => pairs.map(([minutes, value]) => ({ minutes, value }))

describe('the warm-up', () => {
  it('finds when an exponential drift has come within the band', () => {
    const outcome = warmUpOf(settling(10, [0, 5, 10, 15, 20, 25, 30, 60]), 0.1)
    // 1 % · e^(−t/10) is within 0.1 % of its end from t = 10·ln(10) = 23 minutes on; the next reading taken is at 25.
    expect(outcome).toMatchObject({ kind: 'drift', settledAt: 25 })
    expect(outcome.kind === 'drift' && outcome.totalPercent).toBeCloseTo(-0.99, 1)
    expect(outcome.sentence).toContain('From 25 minutes on it stayed within ±0.1\u202F%: warm it up at least so long before measuring.')
  })
  it('tells the drift of each reading in per cent and in parts per million', () => {
    const outcome = warmUpOf(at([0, 1_000_200], [10, 1_000_050], [20, 1_000_000]), 0.01)
    expect(outcome.kind === 'drift' && outcome.points.map(({ driftPercent, driftPpm }) => [driftPercent, driftPpm])).toEqual([
      [expect.closeTo(0.02, 9), expect.closeTo(200, 5)], [expect.closeTo(0.005, 9), expect.closeTo(50, 5)], [0, 0],
    ])
    expect(outcome).toMatchObject({ settledAt: 10, totalPercent: expect.closeTo(-0.02, 9) })
  })
  it('takes the share of the nominal value where one is given', () => {
    const readings = at([0, 90], [10, 80], [20, 80])
    expect(warmUpOf(readings, 1, 100)).toMatchObject({ totalPercent: -10, settledAt: 10 })
    expect(warmUpOf(readings, 1)).toMatchObject({ totalPercent: -12.5, settledAt: 10 })
    // The band is of the nominal value too: 1 of 100 is within 1.1 %, 1 of 80 is not.
    expect(warmUpOf(at([0, 81], [10, 81], [20, 80]), 1.1, 100)).toMatchObject({ settledAt: 0 })
    expect(warmUpOf(at([0, 81], [10, 81], [20, 80]), 1.1)).toMatchObject({ settledAt: null })
    expect(warmUpOf(at([0, 0.2], [10, 0], [20, 0]), 1, 5)).toMatchObject({ kind: 'drift', settledAt: 10 })
  })
  it('does not call it settled by its last reading alone', () => {
    expect(warmUpOf(settling(30, [0, 5, 10, 15]))).toMatchObject({ kind: 'drift', settledAt: null, sentence: expect.stringContaining('had not settled to ±0.1\u202F% after 15 minutes') })
  })
  it('is not settled by a moment within the band from which it strays again', () => {
    expect(warmUpOf(at([0, 100], [10, 101], [20, 103], [30, 101], [40, 101]), 1)).toMatchObject({ settledAt: 30 })
  })
  it('says so when it never moved', () => {
    expect(warmUpOf(settling(1, [20, 30, 40]))).toMatchObject({ settledAt: 20, sentence: expect.stringContaining('from the first reading on') })
    expect(warmUpOf(at([0, 5], [1, 5], [2, 5])).sentence).toBe('It moved 0\u202F% in 2 minutes. It stayed within ±0.1\u202F% from the first reading on.')
  })
  it('writes what is small in parts per million, and never with a power of ten', () => {
    expect(warmUpOf(at([0, 10_000_012], [30, 10_000_001], [60, 10_000_000]), 0.0001).sentence)
      .toBe('It moved \u22121.2\u202Fppm in 60 minutes. From 30 minutes on it stayed within ±1\u202Fppm: warm it up at least so long before measuring.')
  })
  it.each([
    ['too few readings', at([0, 1], [5, 1]), 'too_few', 'at least 3'],
    ['no readings', [], 'too_few', 'at least 3'],
    ['a time twice', at([0, 1], [5, 1], [5, 1]), 'out_of_order', 'two readings at 5 minutes'],
    ['a time that falls', at([0, 1], [15, 1], [5, 1]), 'out_of_order', 'at 5 minutes comes after a later one'],
    ['a time before power on', at([-1, 1], [5, 1], [6, 1]), 'out_of_order', 'from power on'],
    ['a share of nought', at([0, 1], [5, 1], [9, 0]), 'refused', 'of nought'],
    ['what is not a number', at([0, 1], [5, Number.NaN], [9, 1]), 'refused', 'as numbers'],
  ] as const)('asks again for %s', (_name, readings, kind, says) => {
    expect(warmUpOf(readings)).toEqual({ kind, sentence: expect.stringContaining(says) })
  })
  it.each([0, -1, Number.NaN])('asks for a band above nought, not %f', (within) => {
    expect(warmUpOf(at([0, 1], [5, 1], [9, 1]), within)).toMatchObject({ kind: 'refused', sentence: expect.stringContaining('more than nought') })
  })
  it('holds its promise: every reading from then on is within the band, and the one before is not', () => {
    const values = fc.array(fc.integer({ min: 900, max: 1100 }), { minLength: 3, maxLength: 20 })
    fc.assert(fc.property(values, fc.constantFrom(0.1, 1, 3, 10), (list, within) => {
      const outcome = warmUpOf(list.map((value, index) => ({ minutes: index * 5, value })), within, 1000)
      if (outcome.kind !== 'drift') throw new Error(outcome.sentence)
      const end = list.at(-1) ?? 0
      const isNear = list.map(value => Math.abs(value - end) <= within * 10)
      if (outcome.settledAt === null) {
        expect(isNear.at(-2)).toBe(false)
        return
      }
      const from = outcome.settledAt / 5
      expect(isNear.slice(from).every(Boolean)).toBe(true)
      if (from > 0) expect(isNear[from - 1]).toBe(false)
    }))
  })
})
