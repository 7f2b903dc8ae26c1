import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { dialCheckpoint, formatErrorPercent } from '../../../../shared/domain/dial-check'
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
  it.each([
    [100_000, '98.2 kc', '−1.80 %', 'pass'], [300_000, '293.6 kc', '−2.13 %', 'fail'], [11_000_000, '10.77 Mc', '−2.09 %', 'fail'], [1_100_000, '1093.4 kc', '−0.60 %', 'pass'],
  ])('set to %d Hz and read as %s is out by %s: a %s within ±2 %% by simple acceptance', (setting, typed, error, expected) => {
    const evaluated = evaluateReading(typed, dialCheckpoint('A', setting, 2), [], null, SIMPLE)
    if (!evaluated.ok) throw new Error(evaluated.sentence)
    expect(evaluated.result.judgement).toMatchObject({ verdict: expected, conformance: null, ratio: null, guardBand: null })
    expect(formatErrorPercent(evaluated.result.errorPercent ?? Number.NaN, 2).replace('\u202F', ' ')).toBe(error)
  })
  it('counts its limit as within by simple acceptance, whatever binary arithmetic makes of it (ILAC-G8:09/2019, w = 0)', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 3e9 }), fc.constantFrom(0.1, 0.3, 0.5, 1, 1.5, 2, 3, 5), (setting, tolerance) => {
      const point = dialCheckpoint('A', setting, tolerance)
      // Typed in decimals: per mille of a whole number of hertz ends after three places.
      const edge = (way: number) => ((setting * 1000 + way * Math.round(setting * tolerance * 10)) / 1000).toFixed(3)
      expect([edge(-1), edge(1)].map(typed => verdict(`${typed} c/s`, point, [], SIMPLE))).toEqual(['pass', 'pass'])
      const beyond = Number(edge(1)) + setting * 1e-6
      expect(verdict(`${beyond} c/s`, point, [], SIMPLE)).toBe('fail')
    }))
  })
  it('has an error but no per cent where the setting is nought, and no error where none is set', () => {
    const zero = { ...dial, section: 'rail' as const, quantity: 'voltage' as const, atHz: null, nominal: 0, limit: { kind: 'absolute' as const, amount: 0.1 } }
    expect(evaluateReading('50 mV', zero, [], null, SIMPLE)).toMatchObject({ ok: true, result: { error: 0.05, errorPercent: null, judgement: { verdict: 'pass' } } })
    expect(evaluateReading('50 mV', { ...zero, nominal: null }, [], null, SIMPLE)).toMatchObject({ ok: true, result: { error: null, errorPercent: null, judgement: null, limitProblem: 'A ± limit needs the nominal value' } })
  })
  it('is off by so many counts of the last place that was read', () => {
    // 98.2 kc is read to 0.1 kc: 1.8 kc below 100 kc are 18 counts.
    expect(evaluateReading('98.2 kc', dial, [counter], null, GUARD)).toMatchObject({ ok: true, result: { errorCounts: expect.closeTo(-18, 9) } })
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
  it('says nothing against an instrument where there is one limit only, and admits where its accuracy is not known', () => {
    const rail = { ...dial, section: 'rail' as const, quantity: 'voltage' as const, atHz: null, nominal: null, limit: { kind: 'at_least' as const, value: 10 } }
    const meter = (percentOfReading: number | null) => gauge('meter', [makeCapability({ quantity: 'voltage', lower: 0, upper: 30, percentOfReading })])
    const of = (taker: Gauge) => evaluateReading('15.0 V', rail, [taker], null, GUARD)
    expect(of(meter(1))).toMatchObject({ ok: true, result: { fitness: 'one_limit', fitnessSentence: expect.stringMatching(/^Measured with meter\./), judgement: { verdict: 'pass', ratio: null } } })
    expect(of(meter(null))).toMatchObject({ ok: true, result: { fitness: 'not_known', fitnessSentence: expect.stringMatching(/^How well meter measures this is not known/), judgement: { verdict: 'conditional_pass' } } })
  })
  it('is put down to an instrument of known accuracy before one of unknown, and of equals to the first', () => {
    const unknown = gauge('unknown', [makeCapability({ quantity: 'frequency', lower: 10, upper: 100e6 })])
    const takenBy = (...gauges: Gauge[]) => {
      const evaluated = evaluateReading('98.2 kc', dial, gauges, null, GUARD)
      return evaluated.ok ? evaluated.result.instrumentId : evaluated.sentence
    }
    expect([takenBy(unknown, wavemeter), takenBy(wavemeter, unknown), takenBy(unknown), takenBy({ ...wavemeter, id: 'twin' }, wavemeter)]).toEqual(['wavemeter', 'wavemeter', 'unknown', 'twin'])
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
  it('that scatter far less than the instrument is accurate leave its k at 2, not at what no table holds', () => {
    const aged = gauge('aged', [makeCapability({ quantity: 'frequency', lower: 10, upper: 1e9, ppm: 10, ageingPpmPerYear: 10 })], 1)
    const evaluated = evaluateReading('100.0000000; 100.0000001; 100.0000000 Mc', dialCheckpoint('A', 100e6, 2), [aged], null, GUARD)
    // Two rectangles of ±10 ppm of 100 MHz: u = √2·1000/√3 Hz.
    expect(evaluated).toMatchObject({ ok: true, result: { uncertainty: { standard: expect.closeTo(1000 * Math.SQRT2 / Math.sqrt(3), 1), factor: expect.closeTo(2, 4) } } })
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
  it('moving a reading away from its setting never betters it', () => {
    const rank = ['pass', 'conditional_pass', 'conditional_fail', 'fail']
    fc.assert(fc.property(fc.integer({ min: 0, max: 5000 }), fc.integer({ min: 0, max: 5000 }), fc.constantFrom(1, -1), fc.constantFrom(SIMPLE, GUARD), fc.constantFrom(counter, wavemeter), (one, more, way, rule, taker) => {
      const [near, far] = [one, one + more].map(off => rank.indexOf(verdict(`${100_000 + way * off} c/s`, dial, [taker], rule) ?? ''))
      expect(far).toBeGreaterThanOrEqual(near ?? -1)
      expect(near).toBeGreaterThanOrEqual(0)
    }))
  })
  it('limits in per cent of a full scale that is not known are said, and judge nothing', () => {
    const noSpan = { ...dial, limit: { kind: 'percent_of_span' as const, amount: 3 } }
    expect(evaluateReading('98.2 kc', noSpan, [counter], null, GUARD)).toMatchObject({ ok: true, result: { judgement: null, bounds: null, limitProblem: expect.stringContaining('needs the full scale') } })
  })
  it('a result is the same after it was kept as JSON, as a signed sheet keeps it', () => {
    for (const typed of ['98.2 kc', '98.2; 98.3; 98.2 kc', '9.82 kc']) {
      for (const gauges of [[], [counter], [wavemeter]]) {
        const evaluated = evaluateReading(typed, dial, gauges, null, GUARD)
        if (!evaluated.ok) throw new Error(evaluated.sentence)
        expect(JSON.parse(JSON.stringify(evaluated.result))).toEqual(evaluated.result)
      }
    }
  })
  it('limits the wrong way round are said, and judge nothing', () => {
    const wrong = { ...dial, limit: { kind: 'between' as const, lower: 2, upper: 1 } }
    expect(evaluateReading('98.2 kc', wrong, [counter], null, GUARD)).toMatchObject({ ok: true, result: { judgement: null, limitProblem: expect.stringContaining('above the upper') } })
  })
})
