import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { dialCheckpoint, dialCheckpoints, formatErrorPercent, middleOfBand, modelCheckpoints } from '../../../../shared/domain/dial-check'

describe('middleOfBand: the geometric mean, rounded to the nearest mark of two significant figures inside the band', () => {
  it.each([
    [100_000, 320_000, 180_000], [320_000, 1_000_000, 570_000], [540_000, 1_600_000, 930_000], [10_000_000, 32_000_000, 18_000_000],
    [88_000_000, 108_000_000, 97_000_000], [20, 200, 63], [10_000_000, 10_700_000, 10_300_000], [455_000, 455_000, 455_000], [0, 10_000_000, 5_000_000],
    [450_000, 460_000, 455_000], [5, 6, 6],
  ])('of %d to %d Hz is %d Hz', (lower, upper, middle) => {
    expect(middleOfBand(lower, upper)).toBe(middle)
  })

  it('always lies inside, strictly where there is room', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 3e12 }), fc.integer({ min: 0, max: 3e12 }), (a, b) => {
      const [lower, upper] = [Math.min(a, b), Math.max(a, b)]
      const middle = middleOfBand(lower, upper)
      expect(Number.isSafeInteger(middle)).toBe(true)
      if (upper - lower >= 2) expect(middle > lower && middle < upper).toBe(true)
      else expect(middle).toBe(upper)
    }), { numRuns: 500 })
  })
})

describe('dialCheckpoints', () => {
  it('gives low, middle and high', () => {
    expect(dialCheckpoints({ lowerHz: 100_000, upperHz: 320_000 })).toEqual([
      { position: 'low', settingHz: 100_000 }, { position: 'middle', settingHz: 180_000 }, { position: 'high', settingHz: 320_000 },
    ])
  })

  it('checks a spot once and never sets a dial to DC', () => {
    expect(dialCheckpoints({ lowerHz: 1_000_000, upperHz: 1_000_000 })).toEqual([{ position: 'middle', settingHz: 1_000_000 }])
    expect(dialCheckpoints({ lowerHz: 0, upperHz: 10_000_000 }).map(point => point.settingHz)).toEqual([1_000_000, 5_000_000, 10_000_000])
  })

  it('rises without repeating, above nought', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 1e10 }), fc.integer({ min: 0, max: 1e10 }), (a, b) => {
      const settings = dialCheckpoints({ lowerHz: Math.min(a, b), upperHz: Math.max(a, b, 1) }).map(point => point.settingHz)
      expect(settings.length).toBeGreaterThan(0)
      for (const [index, hz] of settings.entries()) expect(hz).toBeGreaterThan(settings[index - 1] ?? 0)
    }))
  })
})

describe('the dial checkpoints of a model', () => {
  const band = { label: 'A', function: 'generates' as const, lowerHz: 100_000, upperHz: 320_000, dialTolerancePercent: null }

  it('stand low, middle and high on every band that a dial sets', () => {
    expect(modelCheckpoints([band], 2)).toEqual([100_000, 180_000, 320_000].map(hz => dialCheckpoint('A', hz, 2)))
  })
  it('take a band’s own tolerance before the model’s', () => {
    expect(modelCheckpoints([{ ...band, dialTolerancePercent: 1 }], 2).map(({ limit }) => limit)).toEqual(Array(3).fill({ kind: 'percent_of_setting', amount: 1 }))
  })
  it('stand nowhere without a dial, or where no tolerance is known', () => {
    expect(modelCheckpoints([{ ...band, function: 'measures' }], 2)).toEqual([])
    expect(modelCheckpoints([band], null)).toEqual([])
  })
})

// Common practice, no source: ±2 % of the setting; errors worked out by hand.
describe('an error as it is shown', () => {
  it.each([[-1.8, 2, '−1.80 %'], [-2.1333, 2, '−2.13 %'], [2, 2, '+2.00 %'], [2.004, 2, '+2.004 %'], [-0.6, undefined, '−0.60 %'], [0.001, 2, '0.00 %']])('%f %% against ±%s %% never contradicts its verdict', (error, tolerance, words) => {
    expect(formatErrorPercent(error, tolerance).replace('\u202F', ' ')).toBe(words)
  })
})
