import fc from 'fast-check'
import jstat from 'jstat'
import { describe, expect, it } from 'vitest'
import { coverageFactor, mean, normalCdf, standardDeviation, withinT } from '../../../../shared/domain/statistics'

const { jStat } = jstat

/**
 * NIST TN 1297, table B.1 (the layout of GUM table G.2): t for a fraction, by degrees of freedom. The columns headed by one,
 * two and three sigma hold for 68.2689…, 95.4499… and 99.7300… %.
 */
const SIGMA = [0.682_689_492, 0.90, 0.95, 0.954_499_736, 0.99, 0.997_300_204] as const
const TABLE: readonly [degrees: number, ...t: number[]][] = [
  [1, 1.84, 6.31, 12.71, 13.97, 63.66, 235.80], [2, 1.32, 2.92, 4.30, 4.53, 9.92, 19.21], [3, 1.20, 2.35, 3.18, 3.31, 5.84, 9.22],
  [4, 1.14, 2.13, 2.78, 2.87, 4.60, 6.62], [5, 1.11, 2.02, 2.57, 2.65, 4.03, 5.51], [7, 1.08, 1.89, 2.36, 2.43, 3.50, 4.53],
  [10, 1.05, 1.81, 2.23, 2.28, 3.17, 3.96], [16, 1.03, 1.75, 2.12, 2.17, 2.92, 3.54], [20, 1.03, 1.72, 2.09, 2.13, 2.85, 3.42],
  // The 90 % cell of ν = 35 is printed 1.70; the exact value is 1.6896, which rounds to 1.69: off by one in the last place.
  [35, 1.01, 1.69, 2.03, 2.07, 2.72, 3.23], [50, 1.01, 1.68, 2.01, 2.05, 2.68, 3.16], [100, 1.005, 1.660, 1.984, 2.025, 2.626, 3.077],
  [Number.POSITIVE_INFINITY, 1.000, 1.645, 1.960, 2.000, 2.576, 3.000],
]

describe('the normal distribution', () => {
  it('agrees with jstat between −6 and 6', () => {
    for (let z = -6; z <= 6; z += 0.05) expect(normalCdf(z)).toBeCloseTo(jStat.normal.cdf(z, 0, 1), 12)
  })
  it('keeps its figures far out, where 1 − Φ would have none', () => {
    // Tail of the normal distribution at 6 and 10 standard deviations (computed from the asymptotic series, checked by hand).
    expect(normalCdf(-6) / 9.865_876_45e-10).toBeCloseTo(1, 6)
    expect(normalCdf(-10) / 7.619_853_02e-24).toBeCloseTo(1, 6)
    expect([normalCdf(-40), normalCdf(40)]).toEqual([expect.closeTo(0, 300), 1])
  })
  it('keeps its tail between the bounds of Mills’s ratio all the way out', () => {
    // z/(z² + 1)·φ(z) < 1 − Φ(z) < φ(z)/z, for every z above 0 (a standard inequality).
    for (let z = 0.5; z <= 37; z += 0.25) {
      const density = Math.exp(-z * z / 2) / Math.sqrt(2 * Math.PI)
      expect(normalCdf(-z)).toBeGreaterThan(z / (z * z + 1) * density)
      expect(normalCdf(-z)).toBeLessThan(density / z)
    }
  })
  it('rises, is symmetrical about nought, and knows what is no number', () => {
    fc.assert(fc.property(fc.double({ min: -30, max: 30, noNaN: true }), fc.double({ min: 0, max: 30, noNaN: true }), (z, more) => {
      expect(normalCdf(z + more)).toBeGreaterThanOrEqual(normalCdf(z) * (1 - 1e-13))
      expect(normalCdf(z) + normalCdf(-z)).toBeCloseTo(1, 14)
    }))
    expect([normalCdf(0), normalCdf(Number.NEGATIVE_INFINITY), normalCdf(Number.POSITIVE_INFINITY), normalCdf(Number.NaN)]).toEqual([0.5, 0, 1, Number.NaN])
  })
})

describe('the t distribution', () => {
  it.each(TABLE)('gives the tabled factors for ν = %s', (degrees, ...row) => {
    row.forEach((tabled, index) => expect(Math.abs(coverageFactor(SIGMA[index] ?? 0, degrees) - tabled)).toBeLessThanOrEqual(0.005 + 1e-9))
  })
  it('agrees with jstat, both ways', () => {
    for (const degrees of [1, 2, 3, 5, 8, 16, 33, 120]) {
      for (const t of [0.1, 0.5, 1, 2, 4, 9]) expect(withinT(t, degrees)).toBeCloseTo(2 * jStat.studentt.cdf(t, degrees) - 1, 7)
      for (const p of [0.5, 0.9, 0.95, 0.99]) expect(coverageFactor(p, degrees)).toBeCloseTo(jStat.studentt.inv((1 + p) / 2, degrees), 5)
    }
  })
  it('agrees with the closed forms for one and two degrees of freedom, to twelve figures', () => {
    for (const t of [0.1, 0.5, 1, 2, 4, 9]) {
      expect(withinT(t, 1)).toBeCloseTo(2 / Math.PI * Math.atan(t), 12)
      expect(withinT(t, 2)).toBeCloseTo(t / Math.sqrt(2 + t * t), 12)
    }
  })
  // Cornish-Fisher expansion of t about the normal z (Abramowitz and Stegun, 26.7.5, from memory), first two terms: exact to 1e-7 from ν = 1000 on.
  it.each([1e3, 1e4, 1e6, 1e7, 1e8, 1e9, 1e12, 1e15, 1e16, 1e18, 1e25, 1e60])('comes to the normal factor as the degrees of freedom grow: %s', (degrees) => {
    const z = 2
    const expected = z + (z ** 3 + z) / (4 * degrees) + (5 * z ** 5 + 16 * z ** 3 + 3 * z) / (96 * degrees * degrees)
    expect(Math.abs(coverageFactor(0.954_499_736, degrees) - expected)).toBeLessThanOrEqual(5e-7)
  })
  it('falls as the degrees of freedom grow, and rises with the probability', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 20 }), fc.double({ min: 1, max: 30, noNaN: true }), fc.double({ min: 0.5, max: 0.99, noNaN: true }), (power, times, probability) => {
      const degrees = 10 ** (power - 1)
      expect(coverageFactor(probability, degrees * times)).toBeLessThanOrEqual(coverageFactor(probability, degrees) + 1e-6)
      expect(coverageFactor(probability + 0.005, degrees)).toBeGreaterThan(coverageFactor(probability, degrees))
    }))
  })
  it('refuses what has no factor', () => {
    for (const degrees of [0, 0.9, -1, Number.NaN]) expect(() => coverageFactor(0.95, degrees)).toThrow(RangeError)
    for (const probability of [0, 1, -0.1, 1.1, Number.NaN]) expect(() => coverageFactor(probability, 5)).toThrow(RangeError)
  })
})

describe('mean and deviation', () => {
  it('are those of the values, and nought of one', () => {
    expect(mean([2, 4, 4, 4, 5, 5, 7, 9])).toBe(5)
    // Sum of squares 32 over n − 1 = 7.
    expect(standardDeviation([2, 4, 4, 4, 5, 5, 7, 9])).toBeCloseTo(Math.sqrt(32 / 7), 12)
    expect(standardDeviation([3])).toBe(0)
  })
})
