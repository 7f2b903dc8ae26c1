import { describe, expect, it } from 'vitest'
import { warmUpOf } from '../../../../shared/domain/warm-up'

/** An oscillator that settles as e^(−t/τ), from 1 % high. */
const settling = (tau: number, times: readonly number[]) => times.map(minutes => ({ minutes, value: 1e6 * (1 + 0.01 * Math.exp(-minutes / tau)) }))

describe('the warm-up', () => {
  it('finds when an exponential drift has come within the band', () => {
    const outcome = warmUpOf(settling(10, [0, 5, 10, 15, 20, 25, 30, 60]), 0.1)
    // 1 % · e^(−t/10) is within 0.1 % of its end from t = 10·ln(10) = 23 minutes on; the next reading taken is at 25.
    expect(outcome).toMatchObject({ kind: 'drift', settledAt: 25 })
    expect(outcome.kind === 'drift' && outcome.totalPercent).toBeCloseTo(-0.99, 1)
    expect(outcome.sentence).toContain('From 25 minutes on')
  })
  it('does not call it settled by its last reading alone', () => {
    expect(warmUpOf(settling(30, [0, 5, 10, 15]))).toMatchObject({ kind: 'drift', settledAt: null, sentence: expect.stringContaining('had not settled') })
  })
  it('says so when it never moved', () => {
    expect(warmUpOf(settling(1, [20, 30, 40]))).toMatchObject({ settledAt: 20, sentence: expect.stringContaining('from the first reading on') })
  })
  it.each([
    ['too few readings', [{ minutes: 0, value: 1 }, { minutes: 5, value: 1 }], 'too_few'],
    ['times that do not rise', [{ minutes: 0, value: 1 }, { minutes: 5, value: 1 }, { minutes: 5, value: 1 }], 'out_of_order'],
    ['a value of nought', [{ minutes: 0, value: 1 }, { minutes: 5, value: 1 }, { minutes: 9, value: 0 }], 'too_few'],
  ] as const)('asks again for %s', (_name, readings, kind) => {
    expect(warmUpOf(readings)).toMatchObject({ kind })
  })
})
