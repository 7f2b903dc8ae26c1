import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { FoundError } from '../../../../shared/domain/recall'
import { correctedReading, rejudge } from '../../../../shared/domain/recall'
import { dialCheckpoint } from '../../../../shared/domain/dial-check'
import { evaluateReading } from '../../../../shared/domain/evaluation'

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
  it('is not put below nought where nothing can be, and may be where something can', () => {
    const error = { kind: 'absolute', amount: 200 } as const
    expect([correctedReading(100, 'frequency', error), correctedReading(200, 'frequency', error), correctedReading(100, 'voltage', error)]).toEqual([null, 0, -100])
  })
  it('shows again what was shown, when the error is put back', () => {
    fc.assert(fc.property(fc.double({ min: 1, max: 1e6, noNaN: true }), fc.double({ min: -50, max: 50, noNaN: true }), (value, amount) => {
      expect((correctedReading(value * (1 + amount / 100), 'voltage', { kind: 'percent', amount }) ?? 0) / value).toBeCloseTo(1, 9)
    }))
  })
})

describe('a reading judged anew', () => {
  const dial = dialCheckpoint('A', 100_000, 2)
  const rule = { rule: 'simple', factor: 1 } as const
  const again = (error: FoundError, point = dial) => {
    const evaluated = evaluateReading('98.2 kc', point, [], null, rule)
    if (!evaluated.ok) throw new Error(evaluated.sentence)
    return rejudge(point, evaluated.result, error, rule)
  }
  it('keeps or changes its verdict with the error taken off', () => {
    expect(again({ kind: 'absolute', amount: 100 })).toMatchObject({ corrected: 98_100, verdict: 'pass', changes: false, sentence: expect.stringContaining('still a pass') })
    expect(again({ kind: 'absolute', amount: 300 })).toMatchObject({ corrected: 97_900, verdict: 'fail', changes: true, sentence: expect.stringContaining('was a pass and is a fail') })
  })
  it('has no verdict to change without a limit', () => {
    expect(again({ kind: 'absolute', amount: 100 }, { ...dial, limit: null })).toMatchObject({ corrected: 98_100, verdict: null, changes: false, sentence: expect.stringContaining('no limit to be judged by') })
  })
  it('says why it can’t be put right', () => {
    expect(again({ kind: 'not_known', amount: null })).toMatchObject({ corrected: null, changes: true, sentence: expect.stringMatching(/^By how much it was out is not known/) })
    expect(again({ kind: 'absolute', amount: 98_300 })).toMatchObject({ corrected: null, changes: true, sentence: expect.stringMatching(/^The error found is more than this reading/) })
  })
})
