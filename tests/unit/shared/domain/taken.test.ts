import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readTaken } from '../../../../shared/domain/taken'

const dial = { section: 'dial', quantity: 'frequency', nominal: 100_000, atHz: 100_000 } as const
const rail = { section: 'rail', quantity: 'voltage', nominal: 250, atHz: null } as const
const depth = { section: 'modulation', quantity: 'percent', nominal: 50, atHz: null } as const
const sentenceOf = (typed: string, point: Parameters<typeof readTaken>[1]) => {
  const taken = readTaken(typed, point)
  return taken.ok ? null : taken.sentence
}

describe('one reading', () => {
  it.each([
    ['98.2 kc', dial, { value: 98_200, step: 100, count: 1, deviation: 0, unitAssumed: false, question: null }],
    ['98,20', dial, { value: 98_200, step: 10, unitAssumed: true, typedUnit: 'kHz' }],
    ['9.82e4 c/s', dial, { value: 98_200, step: 1 }],
    ['−12 V', rail, { value: -12 }], ['0 V', rail, { value: 0 }], ['250 V;', rail, { value: 250, count: 1 }],
  ] as const)('%s', (typed, point, expected) => {
    expect(readTaken(typed, point)).toMatchObject({ ok: true, ...expected })
  })
  it('takes the frequency of the setting for what is expected of a frequency, and of nothing else', () => {
    expect(readTaken('98.2', { ...dial, nominal: null })).toMatchObject({ ok: true, value: 98_200, unitAssumed: true })
    expect(readTaken('10 V', { ...rail, nominal: null, atHz: 100 })).toMatchObject({ ok: true, value: 10, question: null })
  })
  it('keeps the highest frequency there is', () => {
    expect(readTaken('3000 GHz', { ...dial, nominal: null, atHz: null })).toMatchObject({ ok: true, value: 3e12 })
  })
  it('is questioned ten times off its nominal, and kept', () => {
    expect(readTaken('25 V', rail)).toMatchObject({ ok: true, value: 25, question: '25 V is about ten times below 250 V. Check the decimal point and the unit.' })
  })
  it.each([
    ['250', rail, 'Say what 250 is in: V, mV or µV.'], ['0 c/s', dial, 'must be above zero'], ['-5 kc', dial, 'can’t be below zero'], ['1e999 V', rail, 'beyond what can be kept'],
    ['3001 GHz', dial, 'highest frequency kept'], [';', rail, 'is not a reading'], ['', rail, 'Enter the reading'], ['1,250 kc', dial, 'can mean 1250 or 1.250'],
  ] as const)('“%s” is refused with a sentence', (typed, point, sentence) => {
    expect(sentenceOf(typed, point)).toContain(sentence)
  })
})

describe('repeat readings', () => {
  it.each([
    ['98.2; 98.3 kc', dial, 98_250], ['98.2 kc; 98 300 c/s', dial, 98_250], ['98.2 kc; 0.0983 Mc', dial, 98_250], ['98.3; 98.2', dial, 98_250], ['250 V; 0.251 kV', rail, 250.5], ['250; 251 V;', rail, 250.5],
  ] as const)('%s: the mean, and a unit said once at the end holds for all', (typed, point, value) => {
    expect(readTaken(typed, point)).toMatchObject({ ok: true, value, count: 2 })
  })
  it('are as fine as the coarsest of them', () => {
    expect(readTaken('98.2 kc; 98 300 c/s', dial)).toMatchObject({ step: 100 })
  })
  it('are fifty at most, and fifty may be', () => {
    expect(readTaken(Array(50).fill('1 V').join(';'), { ...rail, nominal: null })).toMatchObject({ ok: true, value: 1, count: 50, deviation: 0 })
  })
  it('scatter by the standard deviation of single values (GUM 4.2.2)', () => {
    // 2 4 4 4 5 5 7 9: sum of squares 32 over n − 1 = 7.
    expect(readTaken('2; 4; 4; 4; 5; 5; 7; 9 V', { ...rail, nominal: null })).toMatchObject({ value: 5, count: 8, deviation: expect.closeTo(Math.sqrt(32 / 7), 12) })
  })
  it('ask about the one that is ten times off, and say when a unit was taken for any of them', () => {
    expect(readTaken('250 V; 25 V', rail)).toMatchObject({ ok: true, question: expect.stringContaining('25 V is about ten times below') })
    expect(readTaken('98.2 kc; 98.3', dial)).toMatchObject({ ok: true, unitAssumed: true })
  })
  it.each([
    ['250 V; 251', rail, 'Say what 251 is in'], ['250; 251 V; 252', rail, 'Say what 250 is in'], ['98 kc; 0 kc', dial, 'above zero'], [Array(51).fill('1 V').join(';'), rail, 'Type 50 repeat readings at most'],
    ['1.7e308 V; 1.7e308 V', rail, 'beyond what can be kept'], ['1e200 V; 2e200 V', rail, 'beyond what can be kept'],
  ] as const)('“%s” are refused with a sentence', (typed, point, sentence) => {
    expect(sentenceOf(typed, point)).toContain(sentence)
  })
  it('mean the same in any order', () => {
    const lists = fc.array(fc.integer({ min: 90_000, max: 110_000 }), { minLength: 2, maxLength: 12 }).chain(list => fc.tuple(fc.constant(list), fc.shuffledSubarray(list, { minLength: list.length })))
    fc.assert(fc.property(lists, ([list, shuffled]) => {
      const [one, other] = [list, shuffled].map(values => readTaken(values.map(hz => `${hz} c/s`).join(';'), dial))
      if (!one?.ok || !other?.ok) throw new Error('Not read')
      expect(other.value).toBeCloseTo(one.value, 6)
      expect(other.deviation).toBeCloseTo(one.deviation, 6)
      expect({ step: other.step, count: other.count }).toEqual({ step: one.step, count: one.count })
    }))
  })
})

describe('a modulation depth from an envelope: (max − min)/(max + min)', () => {
  // 50/10 from a school's exemplar solution, 15/5 and the four decimals from an engineer's published examples; others computed.
  it.each([
    ['50/10', 66.67], ['50 V / 10 V', 66.67], ['8/2', 60], ['3/1', 50], ['2/0', 100], ['15/5', 50], ['19.2032/14.7968', 12.96], ['19/14.7968', 12.4367], ['15/14.7968', 0.6820], ['8,5/2,5 div', 54.5455], ['4/4', 0],
  ])('%s is %f %%', (typed, percent) => {
    const taken = readTaken(typed, depth)
    expect(taken.ok && taken.value).toBeCloseTo(percent, 2)
  })
  // One step of the lower edge moves it by 2·max/(max + min)² steps, the derivative of the formula: 2·8/10² = 0.16 and 2·8.5/11² of 0.1.
  it.each([['8/2', 16], ['8.5/2.5', 1.404_96], ['8.50/2.5', 1.404_96], ['2/0', 100]])('%s is read to %f %%', (typed, step) => {
    const taken = readTaken(typed, depth)
    expect(taken.ok && taken.step).toBeCloseTo(step, 4)
  })
  it('is as fine as the envelope was read', () => {
    fc.assert(fc.property(fc.integer({ min: 2, max: 100 }), fc.integer({ min: 1, max: 100 }), (top, bottom) => {
      fc.pre(bottom < top)
      const [here, above, below] = [`${top}/${bottom}`, `${top + 1}/${bottom}`, `${top}/${bottom - 1}`].map(typed => readTaken(typed, depth))
      if (!here?.ok || !above?.ok || !below?.ok) throw new Error('Not read')
      expect(Math.abs(above.value - here.value)).toBeLessThanOrEqual(here.step)
      // To first order; a step down of the lower edge bends the curve a little more.
      expect(Math.abs(below.value - here.value)).toBeLessThanOrEqual(here.step * (top + bottom) / (top + bottom - 1) * (1 + 1e-9))
    }))
  })
  it('never exceeds 100 %, which an envelope can’t show', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 1e6 }), fc.integer({ min: 0, max: 1e6 }), (one, other) => {
      const taken = readTaken(`${Math.max(one, other)}/${Math.min(one, other)}`, depth)
      expect(taken.ok && taken.value >= 0 && taken.value <= 100).toBe(true)
    }))
  })
  it.each([
    ['1/8', 'highest of the envelope comes first'], ['0/0', 'no depth'], ['8/-1', 'is not a reading'], ['8/2/1', 'is not a reading'], ['.../.', 'highest and the lowest'], ['1,250/1', 'highest and the lowest'],
    ['800 mV/0.2 V', 'in the same unit'],
  ])('“%s” is asked again', (typed, sentence) => {
    expect(sentenceOf(typed, depth)).toContain(sentence)
  })
  it('is not looked for in a reading of anything else', () => {
    expect(sentenceOf('8/2', rail)).toContain('is not a reading')
  })
})

it('never throws, and never keeps what is not a number', () => {
  fc.assert(fc.property(fc.oneof(fc.string(), fc.array(fc.string()).map(parts => parts.join(';')), fc.stringMatching(/^[\d.,;/e-]{0,12} ?[kMmV]{0,2}$/)), fc.constantFrom(dial, rail, depth), (typed, point) => {
    const taken = readTaken(typed, point)
    if (taken.ok) expect([taken.value, taken.step, taken.deviation].every(Number.isFinite)).toBe(true)
    else expect(taken.sentence).toMatch(/[.:]/)
  }), { numRuns: 1000 })
})
