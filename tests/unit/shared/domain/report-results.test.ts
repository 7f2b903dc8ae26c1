import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { formatToPlace } from '../../../../shared/domain/amount'
import { budgetsOf } from '../../../../shared/domain/report-budgets'
import { conformanceInWords, ratioInWords, reportTables } from '../../../../shared/domain/report-results'
import { bound, boundTag } from '../../../../shared/domain/report-words'
import type { Typed } from '../../../support/signed-sheet'
import { COUNTER, makeReadings, makeSignedSheet, METER } from '../../../support/signed-sheet'

const plain = (text: string) => text.replaceAll(/[\u202F\u00A0]/g, ' ')
const RULE = { rule: 'guard_band', factor: 1 } as const
const dialAt = (nominal: number, found: string): Typed => ({ section: 'dial', quantity: 'frequency', bandLabel: 'A', atHz: nominal, nominal, limit: { kind: 'percent_of_setting', amount: 2 }, found })
const tablesOf = (...typed: Typed[]) => reportTables(makeReadings(typed, [COUNTER, METER], RULE), [COUNTER, METER])

describe('the results of a report', () => {
  it.each([
    [99_900, 0, 'frequency', '99.900 kHz'], [99_900, 2, 'frequency', '99.9 kHz'], [10_199_933.33, 1, 'frequency', '10.19993 MHz'], [1_008_210, 1, 'frequency', '1 008.21 kHz'], [-0.7, -1, 'level', '−0.7 dB'],
    [0, -1, 'level', '0.0 dB'], [0.2203, -4, 'voltage', '220.3 mV'], [2_000, 2, 'resistance', '2.0 kΩ'],
  ] as const)('%f to the place %i of %s is %s', (value, place, quantity, words) => {
    expect(plain(formatToPlace(value, place, quantity))).toBe(words)
  })

  it('shows a value as finely as it was read, noughts and all', () => {
    expect(tablesOf(dialAt(100_000, '99.90 kc'), dialAt(180_000, '180 kc'))[0]?.rows.map(({ read }) => plain(read))).toEqual(['99.90 kHz', '180 kHz'])
  })
  it('shows a mean as finely as its uncertainty, and the readings it is of beneath', () => {
    const [table] = tablesOf(dialAt(10_000_000, '10.1999 Mc; 10.2002 Mc; 10.1997 Mc'))
    expect(plain(table?.rows[0]?.read ?? '')).toBe('10.19993 MHz')
    expect(table?.notes.map(plain)).toEqual(['Read with Frequency counter (B 000001 1).', 'A, 10 MHz: the mean of 10.1999 Mc; 10.2002 Mc; 10.1997 Mc.'])
  })
  it('passes on the note of a reading, and says when an instrument can’t decide', () => {
    const [table] = tablesOf({ section: 'output_level', quantity: 'level', label: 'Carrier', nominal: 0, limit: { kind: 'decibel', amount: 0.3 }, found: '-0.2 dB', note: 'Set line faint' })
    expect(plain(table?.notes[1] ?? '')).toMatch(/^Carrier: Bench multimeter .* can’t decide this .*; Set line faint\.$/)
  })
  it('names the instrument of each part, and which took what where there were several', () => {
    const [table] = tablesOf({ section: 'other', quantity: 'voltage', label: 'Bias', found: '1.0 V' }, { section: 'other', quantity: 'frequency', label: 'Crystal', found: '1.0001 Mc' })
    expect(table?.notes.map(plain)).toEqual(['Read with Bench multimeter (B 000002 Z): Bias. With Frequency counter (B 000001 1): Crystal.'])
    expect(table?.rows.map(({ verdictWords }) => verdictWords)).toEqual(['no limit', 'no limit'])
  })

  it('never shows a chance as certain, nor a ratio as more than it is', () => {
    expect([1, 0.9995, 0.9939, 0.67, 0.004, 0, null].map(each => plain(conformanceInWords(each)))).toEqual(['> 99.9 %', '> 99.9 %', '99.4 %', '67 %', '0.4 %', '< 0.1 %', ''])
    expect([3.96, 4, 17.9, 250, 0.94, null].map(each => plain(ratioInWords(each)))).toEqual(['3.9', '4.0', '17', '> 100', '0.9', ''])
    fc.assert(fc.property(fc.double({ min: 0, max: 99.9, noNaN: true }), (ratio) => {
      expect(Number(ratioInWords(ratio))).toBeLessThanOrEqual(ratio + 1e-9)
    }))
  })
})

describe('the budgets of a report', () => {
  const budgets = budgetsOf(makeSignedSheet())

  it('gives one for each range used, at its widest reading', () => {
    expect(budgets.map(({ accuracy, reading }) => [plain(accuracy), plain(reading)])).toEqual([
      ['±2 ppm, ageing 1 ppm a year, ±1 count at 1 s', 'D, 10 MHz: 10.19993 MHz ± 0.00068 MHz'], ['±0.5 dB', 'Carrier at the set line, 100 kHz: 0.20 dB ± 0.48 dB'],
      ['±4 % of reading', 'Depth, 30 MHz, 30 %: 31.1 % ± 5.3 %'], ['±(0.5 % of reading + 2 digits)', 'HT after the choke, 250 V: 243.2 V ± 1.4 V'],
    ])
  })
  // By hand: 2 ppm of 10.2 MHz over √3 is 11.78 Hz; 10.1999, 10.2002 and 10.1997 MHz have s = 251.7 Hz, over √3 145.3 Hz.
  it('lists each component with its kind, degrees of freedom and standard uncertainty', () => {
    const [counter] = budgets
    expect(counter?.lines.map(({ label, evaluation, degrees, standard }) => [label, evaluation, degrees, standard].map(plain))).toEqual([
      ['time base, ±2 ppm', 'Type B, rectangular', '∞', '11.8 Hz'], ['time base, aged 0.83 ppm since calibration', 'Type B, rectangular', '∞', '4.89 Hz'], ['±1 count at 1 s gate', 'Type B, rectangular', '∞', '0.577 Hz'],
      ['last place read', 'Type B, rectangular', '∞', '28.9 Hz'], ['repeat readings, 3 of them', 'Type A, normal', '2', '145 Hz'],
    ])
    // NIST TN 1297, table B.1 (laid out as GUM table G.2): 4.53 for 95.45 % and two degrees of freedom (VERIFIED-P).
    expect([counter?.combined, counter?.degrees, counter?.factor, counter?.expanded].map(each => plain(each ?? ''))).toEqual(['149 Hz', '2', '4.53', '±680 Hz'])
  })
  it('has none where no uncertainty is known', () => {
    expect(budgetsOf(makeSignedSheet({ instrumentList: [] }))).toEqual([])
  })
})

describe('words that stay together', () => {
  it('binds a number to its unit, and a tag in itself', () => {
    expect(bound('240 V 50 Hz after 30 minutes, ±(0.5 % of reading + 2 digits)')).toBe('240\u202FV 50\u202FHz after 30\u202Fminutes, ±(0.5\u202F% of reading + 2\u202Fdigits)')
    expect(bound('3 Valves, 2 sections')).toBe('3 Valves, 2 sections')
    expect(boundTag('U0000016')).not.toContain(' ')
  })
})
