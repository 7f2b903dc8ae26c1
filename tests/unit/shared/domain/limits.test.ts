import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { Limit, LimitBase } from '../../../../shared/domain/limits'
import { boundsOf } from '../../../../shared/domain/limits'

const hz = (nominal: number | null, span: number | null = null): LimitBase => ({ quantity: 'frequency', nominal, span })
const volts = (nominal: number | null, span: number | null = null): LimitBase => ({ quantity: 'voltage', nominal, span })
const edges = (limit: Limit, base: LimitBase) => {
  const read = boundsOf(limit, base)
  return read.ok ? [read.bounds.lower, read.bounds.upper].map(edge => edge === null ? null : Number(edge.toPrecision(9))) : read.sentence
}

describe('the larger of two', () => {
  it('is never narrower than either, whichever comes first', () => {
    const simple = fc.oneof(
      fc.double({ min: 0, max: 50, noNaN: true }).map(amount => ({ kind: 'percent_of_setting' as const, amount })),
      fc.double({ min: 0, max: 50, noNaN: true }).map(amount => ({ kind: 'absolute' as const, amount })),
      fc.double({ min: 0, max: 20, noNaN: true }).map(amount => ({ kind: 'decibel' as const, amount })),
    )
    fc.assert(fc.property(simple, simple, fc.double({ min: -1000, max: 1000, noNaN: true }), (one, other, nominal) => {
      const [both, swapped, first, second] = [{ kind: 'larger_of' as const, of: [one, other] as [typeof one, typeof other] }, { kind: 'larger_of' as const, of: [other, one] as [typeof one, typeof other] }, one, other].map(limit => boundsOf(limit, volts(nominal)))
      if (!both?.ok || !first?.ok || !second?.ok) throw new Error('No bounds')
      expect(swapped).toEqual(both)
      expect(both.bounds).toEqual({ lower: Math.min(first.bounds.lower ?? 0, second.bounds.lower ?? 0), upper: Math.max(first.bounds.upper ?? 0, second.bounds.upper ?? 0) })
      expect((both.bounds.lower ?? 0) <= nominal && nominal <= (both.bounds.upper ?? 0)).toBe(true)
    }))
  })
})

describe('limits in figures', () => {
  it.each([
    [{ kind: 'percent_of_setting', amount: 2 }, hz(100_000), [98_000, 102_000]],
    [{ kind: 'percent_of_span', amount: 3 }, volts(5, 15), [4.55, 5.45]],
    [{ kind: 'absolute', amount: 2000 }, hz(100_000), [98_000, 102_000]],
    [{ kind: 'percent_of_setting', amount: 5 }, volts(-20), [-21, -19]],
    // ±6.0206 dB is a factor of two of a voltage, 3.0103 dB of a power; of a level it is added.
    [{ kind: 'decibel', amount: 6.020_599_913 }, volts(1), [0.5, 2]],
    [{ kind: 'decibel', amount: 3.010_299_957 }, { quantity: 'power', nominal: 10, span: null }, [5, 20]],
    [{ kind: 'decibel', amount: 1.5 }, { quantity: 'level', nominal: -20, span: null }, [-21.5, -18.5]],
    [{ kind: 'at_least', value: 20 }, { quantity: 'level', nominal: null, span: null }, [20, null]],
    [{ kind: 'at_most', value: 0.05 }, volts(null), [null, 0.05]],
    [{ kind: 'between', lower: 1, upper: 3 }, volts(null), [1, 3]], [{ kind: 'between', lower: 2, upper: 2 }, volts(null), [2, 2]],
    [{ kind: 'larger_of', of: [{ kind: 'percent_of_setting', amount: 1 }, { kind: 'absolute', amount: 2000 }] }, hz(100_000), [98_000, 102_000]],
    [{ kind: 'larger_of', of: [{ kind: 'percent_of_setting', amount: 1 }, { kind: 'absolute', amount: 2000 }] }, hz(1_000_000), [990_000, 1_010_000]],
  ] as const satisfies readonly (readonly [Limit, LimitBase, unknown])[])('%j about %j', (limit, base, expected) => {
    expect(edges(limit, base)).toEqual(expected)
  })

  it.each([
    [{ kind: 'between', lower: 3, upper: 1 }, volts(2), 'The lower limit is above the upper: swap them or mend one'],
    [{ kind: 'percent_of_span', amount: 3 }, volts(5), 'A limit in per cent of full scale needs the full scale'],
    [{ kind: 'percent_of_setting', amount: 3 }, volts(null), 'A limit in per cent of the setting needs the setting'],
    [{ kind: 'absolute', amount: 3 }, volts(null), 'A ± limit needs the nominal value'],
    [{ kind: 'absolute', amount: -1 }, volts(1), 'A limit must be zero or more'],
    [{ kind: 'percent_of_setting', amount: Number.POSITIVE_INFINITY }, volts(1), 'A limit must be zero or more'],
    [{ kind: 'decibel', amount: 1 }, volts(null), 'A limit in dB needs the nominal value'],
    [{ kind: 'decibel', amount: -1 }, volts(1), 'A limit must be zero or more'], [{ kind: 'decibel', amount: Number.POSITIVE_INFINITY }, volts(1), 'A limit must be zero or more'],
    [{ kind: 'larger_of', of: [{ kind: 'absolute', amount: 1 }, { kind: 'percent_of_span', amount: 1 }] }, volts(1), 'A limit in per cent of full scale needs the full scale'],
    [{ kind: 'larger_of', of: [{ kind: 'percent_of_span', amount: 1 }, { kind: 'absolute', amount: 1 }] }, volts(1), 'A limit in per cent of full scale needs the full scale'],
  ] as const satisfies readonly (readonly [Limit, LimitBase, string])[])('says what is wrong with %j about %j', (limit, base, sentence) => {
    expect(edges(limit, base)).toBe(sentence)
  })
})
