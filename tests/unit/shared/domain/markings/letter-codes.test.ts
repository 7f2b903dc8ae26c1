import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { LetterResult } from '../../../../../shared/domain/markings/letter-codes'
import { readCapacitanceCode, readResistanceCode, writeCapacitanceCode, writeResistanceCode } from '../../../../../shared/domain/markings/letter-codes'
import { toleranceWords } from '../../../../../shared/domain/markings/tolerance-letters'

const plain = (text: string) => text.replaceAll('\u202F', ' ')
const words = (result: LetterResult) => result.ok
  ? [result.reading.value, result.reading.tolerance && plain(toleranceWords(result.reading.tolerance)), result.reading.ppmPerKelvin]
  : plain(result.sentence)

describe('the letter code of resistance', () => {
  // An encyclopaedia's article on the RKM code.
  it.each([['R47', 0.47], ['4R7', 4.7], ['470R', 470], ['4K7', 4700], ['47K', 47_000], ['47K3', 47_300], ['470K', 470_000], ['4M7', 4_700_000]])('%s is %f Ω', (text, ohms) => {
    expect(words(readResistanceCode(text))).toEqual([ohms, null, null])
    expect(writeResistanceCode(ohms)).toEqual({ ok: true, text })
  })
  // From memory, as the other codes.
  it.each([['0R47', 0.47, null], ['4K7J', 4700, '±5 %'], ['47KK', 47_000, '±10 %'], ['1R0F', 1, '±1 %'], ['47L', 0.047, null], ['10G', 1e10, null], ['100RM', 100, '±20 %'], ['4k7j', 4700, '±5 %']])('%s is %f Ω %s', (text, ohms, tolerance) => {
    expect(words(readResistanceCode(text))).toEqual([ohms, tolerance, null])
  })
  it('reads a temperature coefficient after the tolerance', () => expect(words(readResistanceCode('4K7FS'))).toEqual([4700, '±1 %', 100]))
  it('notes a small m', () => {
    const read = readResistanceCode('4m7')
    expect(read.ok && [read.reading.value, read.reading.notes.length]).toEqual([4.7e6, 1])
  })
  it.each([
    ['K', '“K” is not a letter code of resistance. It looks like 4K7, R47 or 470R.'], ['47', '“47” is not a letter code of resistance. It looks like 4K7, R47 or 470R.'], ['', '“” is not a letter code of resistance. It looks like 4K7, R47 or 470R.'],
    ['4K7X', '“4K7X” can’t be read: X stands for no tolerance.'], ['4K7FX', '“4K7FX” can’t be read: X stands for no temperature coefficient.'], ['0R0', '“0R0” marks a bridge of 0 Ω, not a value.'], ['4n7', '“4n7” is not a letter code of resistance. It looks like 4K7, R47 or 470R.'],
  ])('refuses %s: %s', (text, sentence) => expect(words(readResistanceCode(text))).toBe(sentence))
  it('is read again as it was written', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 9999 }), fc.integer({ min: -4, max: 9 }), fc.constantFrom(null, 0.1, 0.5, 1, 2, 5, 10, 20), (figures, power, tolerance) => {
      const ohms = Number(`${figures}e${power}`)
      const written = writeResistanceCode(ohms, tolerance)
      if (!written.ok) return false
      const read = readResistanceCode(written.text)
      expect(read.ok && read.reading.value).toBeCloseTo(ohms, 12)
      expect(read.ok && (read.reading.tolerance?.plus ?? null)).toBe(tolerance)
    }))
  })
})

describe('the letter code of capacitance', () => {
  it.each([
    ['p33', 0.33e-12, null], ['3p3', 3.3e-12, null], ['33p', 33e-12, null], ['n33', 330e-12, null], ['4n7', 4.7e-9, null], ['2µ2', 2.2e-6, null], ['2u2', 2.2e-6, null], ['2μ2', 2.2e-6, null],
    ['4N7', 4.7e-9, null], ['10m', 0.01, null], ['1F5', 1.5, null], ['47pF', 47e-12, null], ['47nFK', 47e-9, '±10 %'], ['4n7K', 4.7e-9, '±10 %'], ['100nZ', 100e-9, '−20/+80 %'],
    // Below 10 pF the letters are picofarads (secondary sources of the code).
    ['4p7C', 4.7e-12, '±0.25 pF'], ['1p5D', 1.5e-12, '±0.5 pF'], ['10pD', 10e-12, '±0.5 %'], ['47pB', 47e-12, '±0.1 %'], ['8p2B', 8.2e-12, '±0.1 pF'],
  ])('%s is %f F %s', (text, farads, tolerance) => {
    expect(words(readCapacitanceCode(text))).toEqual([farads, tolerance, null])
  })
  it('notes that the F of 47pF may be a tolerance, and a letter from memory', () => {
    const unit = readCapacitanceCode('47pF')
    expect(unit.ok && unit.reading.notes.map(plain)).toEqual(['The F is read as farads. Where it stands apart it is the tolerance, ±1 %.'])
    const memory = readCapacitanceCode('4n7Z')
    expect(memory.ok && memory.reading.notes).toHaveLength(1)
    const sure = readCapacitanceCode('4n7K')
    expect(sure.ok && sure.reading.notes).toHaveLength(0)
  })
  it.each([['p', 'not a letter code'], ['4M7', 'not a letter code'], ['000p', 'not a letter code'], ['4n7X', 'X stands for no tolerance'], ['4n7KK', 'K stands for no temperature coefficient']])('refuses %s: %s', (text, sentence) => {
    const read = readCapacitanceCode(text)
    expect(!read.ok && read.sentence).toContain(sentence)
  })
  it('is read again as it was written', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 9999 }), fc.integer({ min: -15, max: -3 }), fc.constantFrom(null, 1, 5, 10, 20), (figures, power, tolerance) => {
      const farads = Number(`${figures}e${power}`)
      const written = writeCapacitanceCode(farads, tolerance)
      if (farads < 10e-12 && tolerance !== null) return !written.ok
      if (!written.ok) return false
      const read = readCapacitanceCode(written.text)
      return read.ok && Math.abs(read.reading.value / farads - 1) < 1e-9 && (read.reading.tolerance?.plus ?? null) === tolerance
    }))
  })
})

describe('what can’t be written', () => {
  it('puts a 0 before a tolerance F, which would read as the unit', () => expect(writeCapacitanceCode(47e-12, 1)).toEqual({ ok: true, text: '47p0F' }))
  it('has no tolerance letters in per cent below 10 pF', () => expect(writeCapacitanceCode(4.7e-12, 5).ok).toBe(false))
  it.each([[0, null, 'A value must be above 0.'], [Number.NaN, null, 'A value must be above 0.'], [12_345, null, 'The code has room for four figures, and this value does not fit into them.'], [1e14, null, 'The code has room for four figures, and this value does not fit into them.'], [1e-9, null, 'The code has room for four figures, and this value does not fit into them.'], [4700, 7, 'No letter stands for ±7 %.']])('%f Ω ±%f: %s', (ohms, tolerance, sentence) => {
    const written = writeResistanceCode(ohms, tolerance)
    expect(!written.ok && plain(written.sentence)).toBe(sentence)
  })
})
