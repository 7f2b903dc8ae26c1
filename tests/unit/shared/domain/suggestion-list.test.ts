import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readList, readSteps } from '../../../../shared/domain/suggestion-list'

const valuesOf = (list: string) => readList(list, ['voltage']).entries.map(({ value }) => value)

describe('readList', () => {
  it.each<[string, number[]]>([
    ['3 V, 10 V, 30 V', [3, 10, 30]],
    ['3, 10, 30 V', [3, 10, 30]],
    ['3 V,10 V,30 V', [3, 10, 30]],
    ['50 mV, 0.1, 1 V', [0.05, 0.1, 1]],
    ['1, 3 mV, 10 V', [0.001, 0.003, 10]],
    ['1 000 V, 10 000 V', [1000, 10_000]],
    ['1e3 V', [1000]],
    ['1,5 V; 5 V', [1.5, 5]],
    ['1,5 V\n5 V', [1.5, 5]],
    ['−150 V', [-150]],
    ['3 V, 10 V; 30 V', [3, 10, 30]],
    ['', []],
    [' , ; ', []],
  ])('%j is %j', (list, values) => {
    expect(readList(list, ['voltage'])).toMatchObject({ problems: [] })
    expect(valuesOf(list)).toEqual(values)
  })

  it.each<[string, string, number]>([
    ['V3 anode 180 V', 'V3 anode', 180],
    ['HT1 250 V', 'HT1', 250],
    ['HT: 250V', 'HT', 250],
    ['AC 30 V', 'AC', 30],
    ['Range 1 30 V', 'Range 1', 30],
    ['V3 anode 1 200 V', 'V3 anode', 1200],
  ])('%j is named %j and is %d V', (list, label, value) => {
    expect(readList(list, ['voltage'])).toEqual({ entries: [{ label, value, quantity: 'voltage', limit: null }], problems: [] })
  })

  it.each<[string, string, number]>([
    ['HT 250 V ±10 %', 'percent_of_setting', 10],
    ['HT 250 V +/-10%', 'percent_of_setting', 10],
    ['HT 250 V ± 0.5 per cent', 'percent_of_setting', 0.5],
    ['HT 250 V ±1 dB', 'decibel', 1],
  ])('%j has a limit of its own', (list, kind, amount) => {
    expect(readList(list, ['voltage'])).toEqual({ entries: [{ label: 'HT', value: 250, quantity: 'voltage', limit: { kind, amount } }], problems: [] })
  })

  it('takes the quantity whose unit was typed', () => {
    const read = readList('1 V, 20 mA, 0 dBm', ['voltage', 'current', 'power_level'])
    expect(read.entries.map(({ quantity }) => quantity)).toEqual(['voltage', 'current', 'power_level'])
    expect(readList('7', ['voltage', 'power_level']).problems).toHaveLength(1)
  })

  // "1,5 V" is one and a half to one reader and two entries to another: neither is taken in silence.
  it.each(['1,5 V, 5 V', '10,20 V', '3,10,30 V', '1,000 V'])('does not guess what the comma of %j means', (list) => {
    const { entries, problems } = readList(list, ['voltage'])
    expect(problems).toHaveLength(1)
    expect(problems[0]).toContain(list.split(', ')[0])
    expect(problems[0]).toContain('decimal comma')
    expect(entries).toHaveLength(list.includes(', ') ? 1 : 0)
  })

  it.each(['250', 'HT', 'HT 250 furlongs', '3 V 10 V x', '3 V 10 V', 'HT 250 V ±10', '1e999 V', '20 dB × 5'])('names %j, which is no amount', (list) => {
    const { entries, problems } = readList(list, ['voltage'])
    expect(entries).toEqual([])
    expect(problems).toHaveLength(1)
    expect(problems[0]).toContain(`“${list}”`)
  })

  it('reads or names every entry and never throws, whatever is typed', () => {
    fc.assert(fc.property(fc.oneof(fc.string({ unit: 'grapheme', maxLength: 80 }), fc.stringMatching(/^[\dV ,.;±%dB×-]{0,40}$/)), (list) => {
      for (const { entries, problems } of [readList(list, ['voltage', 'current']), readSteps(list)]) {
        expect(entries.every(({ value }) => Number.isFinite(value))).toBe(true)
        expect(problems.every(problem => problem.startsWith('“'))).toBe(true)
        if (/\d/.test(list) && !/^[\s,;]*$/u.test(list)) expect(entries.length + problems.length).toBeGreaterThan(0)
      }
    }))
  })
})

describe('readSteps', () => {
  const steps = (list: string) => readSteps(list).entries.map(({ value }) => value)

  it.each<[string, number[]]>([
    // Five steps of 20 dB are 100 dB in all.
    ['20 dB × 5', [0, -20, -40, -60, -80, -100]],
    ['20 x 2', [0, -20, -40]],
    ['-20 dB * 1', [0, -20]],
    ['0, -20, -40 dB', [0, -20, -40]],
    ['0, 20, 40 dB', [0, -20, -40]],
    ['10 dB × 2, 40 dB', [0, -10, -20, -40]],
  ])('%j is %j dB', (list, expected) => {
    expect(readSteps(list).problems).toEqual([])
    expect(steps(list)).toEqual(expected)
  })

  it.each(['20 dB × 0', '0 dB × 5', '20 dB × 900', 'x × 5', '20 V'])('names %j', (list) => {
    expect(readSteps(list)).toMatchObject({ entries: [], problems: [expect.stringContaining(`“${list}”`)] })
  })

  it('never gives a step that raises the level', () => {
    fc.assert(fc.property(fc.integer({ min: -140, max: 140 }), fc.integer({ min: 1, max: 30 }), (step, times) => {
      const made = [...steps(`${step} dB`), ...steps(`${step} dB × ${times}`)]
      expect(made.every(value => value <= 0 && !Object.is(value, -0))).toBe(true)
    }))
  })
})
