import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { dialCheckpoint } from '../../../../shared/domain/dial-check'
import type { DecisionRule } from '../../../../shared/domain/decision'
import type { Gauge } from '../../../../shared/domain/evaluation'
import { evaluateReading } from '../../../../shared/domain/evaluation'
import { makeCapability } from '../../../support/bench'

const SIMPLE: DecisionRule = { rule: 'simple', factor: 1 }
const GUARD: DecisionRule = { rule: 'guard_band', factor: 1 }
const gauge = (id: string, capabilities: Gauge['capabilities'], yearsSinceCalibration: number | null = 0): Gauge => ({ id, name: id, capabilities, yearsSinceCalibration })
const counter = gauge('counter', [makeCapability({ quantity: 'frequency', lower: 10, upper: 100e6, ppm: 0.1, gateSeconds: 1 })])
const wavemeter = gauge('wavemeter', [makeCapability({ quantity: 'frequency', lower: 10, upper: 100e6, percentOfReading: 1 })])
const dial = dialCheckpoint('A', 100_000, 2)

const verdict = (typed: string, point = dial, gauges: Gauge[] = [counter], rule = GUARD) => {
  const evaluated = evaluateReading(typed, point, gauges, null, rule)
  return evaluated.ok ? evaluated.result.judgement?.verdict ?? null : evaluated.sentence
}

describe('a reading of a dial', () => {
  // Common practice, no source: the usual tolerance of a service-grade dial is 2 % of the setting.
  it.each([['98.2 kc', 'pass'], ['98.0', 'pass'], ['97.99 kc', 'fail'], ['102.0 kc', 'pass'], ['102.01k', 'fail']])('typed as %s is judged by simple acceptance', (typed, expected) => {
    expect(verdict(typed, dial, [], SIMPLE)).toBe(expected)
  })
  it('is judged with the doubt of what took it', () => {
    // 98.05 kHz lies 50 Hz inside the limit: the counter is sure of that, a wavemeter of ±1 % is not.
    expect(verdict('98.050 kc')).toBe('pass')
    expect(verdict('98.050 kc', dial, [wavemeter])).toBe('conditional_pass')
    expect(verdict('97.950 kc', dial, [wavemeter])).toBe('conditional_fail')
    expect(verdict('90 kc', dial, [wavemeter])).toBe('fail')
  })
  it('is put down to the instrument that measures it best, unless another is named', () => {
    const best = evaluateReading('98.2 kc', dial, [wavemeter, counter], null, GUARD)
    expect(best).toMatchObject({ ok: true, result: { instrumentId: 'counter', fitness: 'decides' } })
    const named = evaluateReading('98.2 kc', dial, [wavemeter, counter], 'wavemeter', GUARD)
    expect(named).toMatchObject({ ok: true, result: { instrumentId: 'wavemeter', fitness: 'near_limits' } })
  })
  it('says when no range of an instrument covers it', () => {
    const narrow = gauge('narrow', [makeCapability({ quantity: 'frequency', lower: 1e6, upper: 2e6, ppm: 1 })])
    expect(evaluateReading('98.2 kc', dial, [narrow], null, GUARD)).toMatchObject({ ok: true, result: { instrumentId: null, uncertainty: null, fitnessSentence: expect.stringContaining('None of the instruments') } })
    expect(evaluateReading('98.2 kc', dial, [narrow], 'narrow', GUARD)).toMatchObject({ ok: true, result: { instrumentId: 'narrow', uncertainty: null, fitnessSentence: expect.stringContaining('no range on record that covers') } })
  })
  it('questions a slip of ten and keeps it', () => {
    expect(evaluateReading('9.82 kc', dial, [counter], null, GUARD)).toMatchObject({ ok: true, taken: { question: expect.stringContaining('about ten times below') } })
  })
  it.each([
    ['', 'Enter the reading'], ['banana', 'is not a reading'], ['0 kc', 'must be above zero'], ['-98 kc', 'below zero'], ['4000 GHz', 'highest frequency kept'], ['98.2 m', 'can mean more than one thing'], ['1', 'Say what 1 is in'],
  ])('refuses “%s” with a sentence', (typed, sentence) => {
    expect(verdict(typed)).toContain(sentence)
  })
})

describe('repeat readings', () => {
  it('stand as their mean, with what they scatter among the components', () => {
    const evaluated = evaluateReading('100.0; 100.2; 100.1 kc', dial, [counter], null, GUARD)
    if (!evaluated.ok) throw new Error(evaluated.sentence)
    expect(evaluated.result).toMatchObject({ value: expect.closeTo(100_100, 6), count: 3 })
    expect(evaluated.result.uncertainty?.components.find(({ evaluation }) => evaluation === 'A')).toMatchObject({ standard: expect.closeTo(100 / Math.sqrt(3), 6), degrees: 2 })
    // Two effective degrees of freedom: the factor is that of t, not 2.
    expect(evaluated.result.uncertainty?.factor).toBeGreaterThan(2.5)
  })
  it('mean the same in any order', () => {
    fc.assert(fc.property(fc.array(fc.integer({ min: 90_000, max: 110_000 }), { minLength: 2, maxLength: 6 }), (values) => {
      const value = (list: readonly number[]) => {
        const evaluated = evaluateReading(list.map(hz => `${hz} c/s`).join('; '), dial, [counter], null, GUARD)
        return evaluated.ok ? evaluated.result.value : Number.NaN
      }
      expect(value([...values].reverse())).toBeCloseTo(value(values), 6)
    }))
  })
  it('refuse one that can’t be read, and say which', () => {
    expect(verdict('100.0 kc; banana')).toContain('banana')
  })
})

describe('a modulation depth', () => {
  const depth = { section: 'modulation' as const, bandLabel: '', label: 'Depth', quantity: 'percent' as const, atHz: null, nominal: 50, span: null, limit: { kind: 'percent_of_setting' as const, amount: 10 } }
  // An engineer's published examples and a school's exemplar solution; (max − min)/(max + min).
  it.each([['50/10', 66.67], ['15/5', 50], ['8/2', 60], ['3 div / 1 div', 50], ['2/0', 100], ['19.2032/14.7968', 12.96], ['30 %', 30], ['4/4', 0]])('typed as %s is %f %%', (typed, percent) => {
    const evaluated = evaluateReading(typed, depth, [], null, SIMPLE)
    expect(evaluated.ok && evaluated.result.value).toBeCloseTo(percent, 2)
  })
  it('asks again where the envelope makes no sense', () => {
    expect(verdict('1/8', depth)).toContain('highest of the envelope comes first')
    expect(verdict('0/0', depth)).toContain('no depth')
  })
})

describe('laws', () => {
  it('a verdict does not change with the unit that is typed', () => {
    fc.assert(fc.property(fc.integer({ min: 90_000, max: 110_000 }), fc.constantFrom(SIMPLE, GUARD), (hz, rule) => {
      const point = { ...dial }
      // The same last place in each: three decimals of kc are one of c/s.
      const inHz = verdict(`${hz} c/s`, point, [counter], rule)
      expect(verdict(`${(hz / 1e3).toFixed(3)} kc`, point, [counter], rule)).toBe(inHz)
      expect(verdict(`${(hz / 1e6).toFixed(6)} Mc`, point, [counter], rule)).toBe(inHz)
    }))
  })
  it('limits the wrong way round are said, and judge nothing', () => {
    const wrong = { ...dial, limit: { kind: 'between' as const, lower: 2, upper: 1 } }
    expect(evaluateReading('98.2 kc', wrong, [counter], null, GUARD)).toMatchObject({ ok: true, result: { judgement: null, limitProblem: expect.stringContaining('above the upper') } })
  })
})
