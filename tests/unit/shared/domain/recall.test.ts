import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { correctedReading } from '../../../../shared/domain/recall'

describe('a reading put right', () => {
  it.each([
    ['8 % too high', 108, 'voltage', { kind: 'percent', amount: 8 }, 100],
    ['4.1 ppm too low', 9_999_959, 'frequency', { kind: 'ppm', amount: -4.1 }, 10_000_000],
    ['0.5 V too high', 10.5, 'voltage', { kind: 'absolute', amount: 0.5 }, 10],
    ['6.02 dB too high, of a voltage', 2, 'voltage', { kind: 'decibel', amount: 6.0206 }, 1],
    ['1.5 dB too high, of a level', -18.5, 'level', { kind: 'decibel', amount: 1.5 }, -20],
  ] as const)('was %s', (_name, read, quantity, error, truly) => {
    expect((correctedReading(read, quantity, error) ?? 0) / truly).toBeCloseTo(1, 5)
  })
  it('can’t be put right where the error is not known, or leaves nothing', () => {
    expect(correctedReading(1, 'voltage', { kind: 'not_known', amount: null })).toBeNull()
    expect(correctedReading(1, 'voltage', { kind: 'percent', amount: -100 })).toBeNull()
    // An error that would leave an infinite or a negative value is a slip of typing.
    expect([-1e6, -2e6].map(amount => correctedReading(1, 'frequency', { kind: 'ppm', amount }))).toEqual([null, null])
    expect(correctedReading(1, 'voltage', { kind: 'decibel', amount: -1e5 })).toBeNull()
    expect(correctedReading(1, 'voltage', { kind: 'absolute', amount: Number.NaN })).toBeNull()
  })
  it('shows again what was shown, when the error is put back', () => {
    fc.assert(fc.property(fc.double({ min: 1, max: 1e6, noNaN: true }), fc.double({ min: -50, max: 50, noNaN: true }), (value, amount) => {
      expect((correctedReading(value * (1 + amount / 100), 'voltage', { kind: 'percent', amount }) ?? 0) / value).toBeCloseTo(1, 9)
    }))
  })
})
