import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { writeCapacitanceCode, writeResistanceCode } from '../../../../../shared/domain/markings/letter-codes'
import type { MarkingHints } from '../../../../../shared/domain/markings/read-marking'
import { readMarking } from '../../../../../shared/domain/markings/read-marking'

const TODAY = '2026-06-15'
const plain = (text: string) => text.replaceAll('\u202F', ' ')
const read = (text: string, hints: MarkingHints = {}) => {
  const result = readMarking(text, hints)
  return result.ok ? result.readings.map(({ code, kind, words }) => `${code} ${kind}: ${plain(words)}`) : plain(result.sentence)
}
const first = (text: string, hints: MarkingHints = {}) => read(text, hints)[0]

describe('what a marking may be', () => {
  // The values as in the tests of each code; which comes first is common practice, no source.
  it.each([
    ['4K7J', 'letter resistor: 4.7 kΩ ±5 %'], ['4k7', 'letter resistor: 4.7 kΩ'], ['4n7K', 'letter capacitor: 4.7 nF ±10 %'], ['104', 'three-digits capacitor: 100 nF'], ['104K', 'three-digits capacitor: 100 nF ±10 %'],
    ['220K', 'letter resistor: 220 kΩ'], ['4R7', 'letter resistor: 4.7 Ω'], ['.01 MFD', 'old-number capacitor: 10 nF'], ['250 MMF', 'old-number capacitor: 250 pF'], ['4.7 kohm 10 %', 'plain resistor: 4.7 kΩ ±10 %'],
    ['yellow violet red gold', 'colours resistor: 4.7 kΩ ±5 %'], ['Yellow, Violet, Red', 'colours resistor: 4.7 kΩ ±20 %'], ['brown-black-gray-purple', 'colours resistor: 1 GΩ ±0.1 %'], ['4700', 'old-number capacitor: 4.7 nF'],
  ])('%s is first of all %s', (text, expected) => expect(first(text)).toBe(expected))

  it('gives every reading, with its code and why', () => {
    expect(read('103')).toEqual(['three-digits capacitor: 10 nF', 'old-number capacitor: 103 pF', 'old-number capacitor: 103 µF', 'resistor-digits resistor: 10 kΩ'])
    expect(read('104K')).toEqual(['three-digits capacitor: 100 nF ±10 %', 'letter resistor: 104 kΩ'])
    expect(read('4R7')).toEqual(['letter resistor: 4.7 Ω', 'three-digits capacitor: 4.7 pF'])
    const result = readMarking('4K7J')
    expect(result.ok && result.readings[0]).toMatchObject({ value: 4700, tolerancePercent: 5, valueText: '4.7\u202FkΩ', why: 'The letter stands where the point would be: R ohms, K kilohms, M megohms.' })
    expect(result.ok && plain(result.readings[0]?.preferred ?? '')).toBe('4.7 kΩ is a preferred value of E24, the series of ±5 %.')
  })
  it('puts the kind that is hinted at first', () => {
    expect(first('103', { kind: 'resistor' })).toBe('resistor-digits resistor: 10 kΩ')
    expect(first('4R7', { kind: 'capacitor' })).toBe('three-digits capacitor: 4.7 pF')
    expect(first('7215', { kind: 'date', today: TODAY })).toBe('date date: week 15 of 1972')
  })
  it('gives a capacitance as old circuits write it', () => {
    const old = (text: string) => {
      const result = readMarking(text)
      return result.ok && result.readings[0]?.oldText
    }
    expect([old('104'), old('4n7'), old('47p'), old('.5 MFD'), old('8 MFD'), old('4K7')].map(text => text && plain(text))).toEqual(['0.1 µF or 100 000 pF', '0.0047 µF or 4 700 pF', null, '0.5 µF or 500 000 pF', null, null])
  })
  it('tells the same value once', () => expect(read('47pF')).toEqual(['letter capacitor: 47 pF']))
  it('reads the bands from the other end too, and the likelier end first', () => {
    expect(read('red red black brown brown')).toEqual(['colours resistor: 2.2 kΩ ±1 %', 'colours resistor: 11 kΩ ±2 %'])
    // 4.99 kΩ is in E96, 119 GΩ in no series.
    expect(read('brown brown white white yellow')).toEqual(['colours resistor: 4.99 kΩ ±1 %', 'colours resistor: 119 GΩ ±0.02 %'])
    expect(read('gold red violet yellow')).toEqual(['colours resistor: 4.7 kΩ ±5 %'])
  })
  it('reads dates only when it knows the day', () => {
    expect(read('190-7215')).toContain('none of the codes')
    expect(read('190-7215', { today: TODAY })).toEqual(['date date: week 15 of 1972'])
    expect(first('7215', { today: TODAY, made: { from: 1970, to: 1973 } })).toBe('date date: week 15 of 1972')
  })
  it('reads dots where the part is a capacitor', () => {
    expect(read('red green black', { kind: 'capacitor' })).toEqual(['mica-dots capacitor: 25 pF ±20 %, 500 V', 'colours resistor: 25 Ω ±20 %'])
    expect(first('white brown red red blue black', { kind: 'capacitor' })).toBe('mica-dots capacitor: 1.2 nF, mica')
  })
  it('notes a rated voltage', () => {
    const result = readMarking('.1 MFD 400 VDC')
    expect(result.ok && result.readings.map(({ words, notes }) => [words, notes.map(plain)])).toEqual([['100\u202FnF', ['On old parts mF, MF and mfd are microfarads, never millifarads.', 'Marked 400 V.']]])
  })
  it.each([
    ['', 'Type what stands on the part, like 4K7, 104K or yellow violet red gold.'], ['hello', '“hello” is in none of the codes that can be read here. Check the letters and figures on the part.'],
    ['gold gold gold gold', 'Band 1 can’t be gold: it is a figure of the value, and gold stands for none.'], ['yellow violet', 'A resistor has three to six bands. Give all of them, not 2.'], ['4K7X', '“4K7X” can’t be read: X stands for no tolerance.'],
    ['190-2730', '“190-2730” would be week 30 of 2027, which is still to come. Read it again: it is another number, or another date.'],
  ])('refuses “%s”: %s', (text, sentence) => expect(read(text, { today: TODAY })).toBe(sentence))
  it('reads what the letter codes write, and never throws', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 999 }), fc.integer({ min: -3, max: 6 }), (figures, power) => {
      const ohms = writeResistanceCode(Number(`${figures}e${power}`))
      const farads = writeCapacitanceCode(Number(`${figures}e${power - 12}`))
      if (!ohms.ok || !farads.ok) return false
      const [resistor, capacitor] = [readMarking(ohms.text), readMarking(farads.text)]
      return resistor.ok && resistor.readings.some(({ kind }) => kind === 'resistor') && capacitor.ok && capacitor.readings.some(({ kind }) => kind === 'capacitor')
    }))
    fc.assert(fc.property(fc.oneof(fc.string(), fc.stringMatching(/^[0-9RKMpnµFV. %-]{1,12}$/)), fc.constantFrom('resistor', 'capacitor', 'date', undefined), (text, kind) => {
      const result = readMarking(text, { kind, today: TODAY })
      return result.ok ? result.readings.length > 0 : result.sentence.length > 0
    }))
  })
})
