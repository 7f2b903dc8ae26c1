import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DIAL_DECISION_RULE, dialCheckpoints, errorPercent, formatErrorPercent, judgeDial, middleOfBand } from '../../../../shared/domain/dial-check'

describe('judgeDial', () => {
  // Common practice, no source: 2 % of the dial setting is the usual tolerance of a service-grade generator.
  it.each<[number, number, string, boolean]>([
    [100_000, 98_200, '−1.80 %', true],
    [300_000, 293_600, '−2.13 %', false],
    [11_000_000, 10_770_000, '−2.09 %', false],
    [1_100_000, 1_093_400, '−0.60 %', true],
  ])('set %d Hz, read %d Hz: %s, within 2 %%: %s', (setting, reading, shown, within) => {
    const verdict = judgeDial(setting, reading, 2)
    expect(verdict.within).toBe(within)
    expect(formatErrorPercent(verdict.errorPercent, 2).replace('\u202F', ' ')).toBe(shown)
  })

  it('gives the error of the issue to its decimals', () => {
    expect(errorPercent(100_000, 98_200)).toBeCloseTo(-1.8, 10)
    expect(errorPercent(300_000, 293_600)).toBeCloseTo(-2.13, 2)
  })

  it('accepts a reading on its limit and refuses one beyond: simple acceptance, ILAC-G8:09/2019, w = 0', () => {
    expect(judgeDial(100_000, 98_000, 2)).toMatchObject({ within: true, limitLowHz: 98_000, limitHighHz: 102_000 })
    expect(judgeDial(100_000, 102_000, 2).within).toBe(true)
    expect(judgeDial(100_000, 97_999, 2).within).toBe(false)
    expect(judgeDial(100_000, 102_001, 2).within).toBe(false)
    expect(DIAL_DECISION_RULE).toContain('w = 0')
  })

  it('counts the limit itself as within, whatever binary arithmetic makes of it', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 3e9 }), fc.constantFrom(0.1, 0.3, 0.5, 1, 1.5, 2, 3, 5), (setting, tolerance) => {
      const { limitLowHz, limitHighHz } = judgeDial(setting, setting, tolerance)
      expect(judgeDial(setting, limitLowHz, tolerance).within).toBe(true)
      expect(judgeDial(setting, limitHighHz, tolerance).within).toBe(true)
      expect(judgeDial(setting, limitHighHz + setting * 1e-6, tolerance).within).toBe(false)
    }))
  })

  it('has no per cent of nought', () => {
    expect(() => errorPercent(0, 5)).toThrow(RangeError)
  })

  it('never shows what contradicts the verdict', () => {
    expect(formatErrorPercent(2.004, 2)).toBe('+2.004\u202F%')
    expect(formatErrorPercent(2.004)).toBe('+2.00\u202F%')
    expect(formatErrorPercent(-0.001)).toBe('0.00\u202F%')
  })
})

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
