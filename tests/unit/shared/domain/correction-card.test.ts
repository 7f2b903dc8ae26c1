import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { CardPoint } from '../../../../shared/domain/correction-card'
import { settingFor, trueFrequency } from '../../../../shared/domain/correction-card'

const points: CardPoint[] = [{ dialHz: 100_000, trueHz: 98_200 }, { dialHz: 180_000, trueHz: 180_900 }, { dialHz: 320_000, trueHz: 317_000 }]

describe('the dial correction card', () => {
  it('goes through every point that was read', () => {
    for (const { dialHz, trueHz } of points) {
      expect(trueFrequency(points, dialHz)).toBeCloseTo(trueHz, 6)
      expect(settingFor(points, trueHz)).toBeCloseTo(dialHz, 2)
    }
  })
  it('takes the relative error as straight in the logarithm of frequency', () => {
    const middle = Math.sqrt(100_000 * 180_000)
    expect(trueFrequency(points, middle)).toBeCloseTo(middle * (0.982 + 1.005) / 2, 4)
  })
  it('says nothing beyond what was read', () => {
    expect([trueFrequency(points, 99_999), trueFrequency(points, 320_001), settingFor(points, 98_000), settingFor(points, 318_000), settingFor([], 1), settingFor(points.slice(0, 1), 98_200)]).toEqual([null, null, null, null, null, expect.anything()])
  })
  it('finds a setting that gives what was wanted', () => {
    fc.assert(fc.property(fc.integer({ min: 98_200, max: 317_000 }), (wanted) => {
      const set = settingFor(points, wanted)
      expect(set === null ? Number.NaN : trueFrequency(points, set)).toBeCloseTo(wanted, 1)
    }))
  })
})
