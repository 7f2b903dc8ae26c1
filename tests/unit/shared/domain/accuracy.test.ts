import { describe, expect, it } from 'vitest'
import { accuracyInWords, covers, readingComponents, yearsBetween } from '../../../../shared/domain/accuracy'
import { combine } from '../../../../shared/domain/uncertainty'
import { makeCapability } from '../../../support/bench'

const reading = (value: number, step: number) => ({ value, step, count: 1, deviation: 0 })

describe('a frequency counter', () => {
  /** Grid computed from the usual theory: ±1 count is 1/gate, the time base f·|Δf₀/f₀|, each a rectangle. Within ±0.1 %. */
  it.each([
    [10e6, 1, 1e-6, 5.802], [10e6, 1, 1e-7, 0.8165], [10e6, 10, 1e-8, 0.081_65], [455e3, 1, 1e-6, 0.6343], [146e6, 0.1, 1e-6, 84.49], [1e3, 1, 1e-6, 0.5774],
  ])('at %f Hz with a gate of %f s and a time base of %f has u = %f Hz', (hz, gateSeconds, base, standard) => {
    const counter = makeCapability({ quantity: 'frequency', lower: 1, upper: 1e9, ppm: base * 1e6, gateSeconds })
    expect(combine(readingComponents(counter, reading(hz, 1 / gateSeconds), null)) / standard).toBeCloseTo(1, 3)
  })
  it('counts the last place read where it is coarser than its own count, and not twice where it is not', () => {
    const counter = makeCapability({ quantity: 'frequency', lower: 1, upper: 1e9, ppm: 0.1, gateSeconds: 1 })
    const labels = (step: number) => readingComponents(counter, reading(98_200, step), null).map(({ label }) => label)
    expect(labels(100)).toContain('last place read')
    expect(labels(1)).not.toContain('last place read')
  })
  it('counts no cycles of a time: there the last place read stands alone beside the time base', () => {
    const timer = makeCapability({ quantity: 'duration', lower: 0, upper: 100, ppm: 1, gateSeconds: 1 })
    expect(readingComponents(timer, reading(10, 0.01), null).map(({ label }) => label)).toEqual(['time base, ±1 ppm', 'last place read'])
  })
  it('ages with the years since its calibration, where one is known', () => {
    const counter = makeCapability({ quantity: 'frequency', lower: 1, upper: 1e9, ageingPpmPerYear: 1 })
    // 2 years at 1 ppm a year of 10 MHz: ±20 Hz, a rectangle.
    expect(combine(readingComponents(counter, reading(10e6, 0), 2))).toBeCloseTo(20 / Math.sqrt(3), 9)
    expect(readingComponents(counter, reading(10e6, 0), null)).toEqual([])
    expect(yearsBetween('2024-11-30', '2026-11-30')).toBeCloseTo(2, 2)
    expect([yearsBetween(null, '2026-01-01'), yearsBetween('2027-01-01', '2026-01-01')]).toEqual([null, 0])
  })
})

describe('a multimeter', () => {
  const meter = makeCapability({ quantity: 'voltage', lower: 0, upper: 20, percentOfReading: 0.03, percentOfRange: 0.01, digits: 2, digitStep: 0.001 })
  it('adds its limits as its maker adds them, and takes them as one rectangle', () => {
    // 10 V: 3 mV + 2 mV + 2 mV = 7 mV.
    expect(readingComponents(meter, reading(10, 0.001), null)).toMatchObject([{ standard: expect.closeTo(0.007 / Math.sqrt(3), 12), shape: 'rectangular' }])
    expect(accuracyInWords(meter)).toBe('±(0.03 % of reading + 0.01 % of range + 2 digits)')
  })
  it('covers its range by size, whichever the sign, and no other quantity', () => {
    expect([covers(meter, 'voltage', -19), covers(meter, 'voltage', 21), covers(meter, 'current', 1)]).toEqual([true, false, false])
  })
  it('covers both ends of its range', () => {
    const range = makeCapability({ quantity: 'voltage', lower: 2, upper: 20 })
    expect([1.99, 2, 20, 20.01, -2].map(value => covers(range, 'voltage', value))).toEqual([false, true, true, false, true])
  })
  it('takes a digit as finely as it was read, where its maker gives no step', () => {
    const plain = makeCapability({ quantity: 'voltage', lower: 0, upper: 20, digits: 1 })
    expect(readingComponents(plain, reading(10, 0.01), null)).toMatchObject([{ label: 'accuracy ±(1 digit)', standard: expect.closeTo(0.01 / Math.sqrt(3), 12) }])
  })
  it('adds what repeat readings scatter (Type A)', () => {
    expect(readingComponents(meter, { value: 10, step: 0.001, count: 4, deviation: 0.01 }, null)[1]).toMatchObject({ evaluation: 'A', standard: 0.005, degrees: 3 })
  })
})

describe('decibels', () => {
  it('are added to a level, and multiply a voltage', () => {
    const level = makeCapability({ quantity: 'level', lower: 0, upper: 60, decibels: 0.3 })
    expect(readingComponents(level, reading(-20, 0.1), null)[0]?.standard).toBeCloseTo(0.3 / Math.sqrt(3), 12)
    const voltage = makeCapability({ quantity: 'voltage', lower: 0, upper: 3, decibels: 1 })
    expect(readingComponents(voltage, reading(1, 0), null)[0]?.standard).toBeCloseTo((10 ** (1 / 20) - 1) / Math.sqrt(3), 12)
  })
})

describe('an accuracy as its maker would write it', () => {
  it.each([
    [{ quantity: 'frequency', ppm: 0.2, ageingPpmPerYear: 1, gateSeconds: 10 }, '±0.2 ppm, ageing 1 ppm a year, ±1 count at 10 s'],
    [{ quantity: 'voltage', percentOfReading: 0.5, digits: 1 }, '±(0.5 % of reading + 1 digit)'],
    [{ quantity: 'level', decibels: 0.3 }, '±0.3 dB'], [{ quantity: 'voltage', percentOfRange: 3 }, '±3 % of range'], [{ quantity: 'resistance' }, 'Ω, accuracy not stated'],
  ] as const)('%j', (said, words) => {
    expect(accuracyInWords(makeCapability({ lower: 0, upper: 1, ...said }))).toBe(words)
  })
})

it('adds no last place to digits that count it already, and one where the reading was taken more coarsely', () => {
  const meter = makeCapability({ quantity: 'voltage', lower: 0, upper: 20, digits: 2, digitStep: 0.001 })
  expect([0.001, 0.002, 0.1].map(step => readingComponents(meter, reading(10, step), null).length)).toEqual([1, 1, 2])
})

it('knows nothing of a display alone', () => {
  expect(readingComponents(makeCapability({ quantity: 'voltage', lower: 0, upper: 3 }), reading(1, 0.1), null)).toEqual([])
})
