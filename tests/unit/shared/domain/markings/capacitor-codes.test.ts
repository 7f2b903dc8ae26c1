import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readBareCapacitance, readThreeDigits, writeThreeDigits } from '../../../../../shared/domain/markings/capacitor-codes'
import { toleranceWords } from '../../../../../shared/domain/markings/tolerance-letters'

const plain = (text: string) => text.replaceAll('\u202F', ' ')
const words = (text: string) => {
  const read = readThreeDigits(text)
  return read.ok ? [read.reading.farads, read.reading.tolerance && plain(toleranceWords(read.reading.tolerance))] : plain(read.sentence)
}

describe('the three-digit code', () => {
  it.each([
    // Secondary sources of the EIA code.
    ['104', 100e-9, null], ['102', 1e-9, null], ['224', 0.22e-6, null], ['104J', 0.1e-6, '±5 %'], ['4R7', 4.7e-12, null],
    // Third digit 8 is ×0.01, 9 is ×0.1.
    ['478', 0.47e-12, null], ['479', 4.7e-12, null],
    ['104K', 100e-9, '±10 %'], ['104k', 100e-9, '±10 %'], ['479C', 4.7e-12, '±0.25 pF'], ['106', 10e-6, null], ['100', 10e-12, null], ['103Z', 10e-9, '−20/+80 %'],
  ])('%s is %f F %s', (text, farads, tolerance) => {
    expect(words(text)).toEqual([farads, tolerance])
  })
  it('says that it was taken in picofarads', () => {
    const read = readThreeDigits('104')
    expect(read.ok && [read.reading.takenIn, ...read.reading.notes.map(plain)]).toEqual(['pF', 'Taken in picofarads: 10 × 10 000 pF.'])
    const small = readThreeDigits('478')
    expect(small.ok && small.reading.notes.map(plain)).toEqual(['Taken in picofarads: 47 × 0.01 pF.'])
  })
  it.each([['047', 'never begins with 0'], ['10', 'is not a three-digit code'], ['104X', 'X stands for no tolerance'], ['1045', 'is not a three-digit code'], ['R0', 'is not a three-digit code'], ['', 'is not a three-digit code']])('refuses %s: %s', (text, sentence) => {
    expect(words(text)).toContain(sentence)
  })
  it('is read again as it was written', () => {
    fc.assert(fc.property(fc.integer({ min: 10, max: 99 }), fc.integer({ min: -2, max: 7 }), fc.constantFrom(null, 1, 2, 5, 10, 20), (figures, power, tolerance) => {
      const farads = Number(`${figures}e${power - 12}`)
      const written = writeThreeDigits(farads, tolerance)
      if (tolerance !== null && farads < 10e-12) return !written.ok
      const read = written.ok && readThreeDigits(written.text)
      return read && read.ok && Math.abs(read.reading.farads / farads - 1) < 1e-9 && (read.reading.tolerance?.plus ?? null) === tolerance
    }))
  })
  it.each([[0, null, 'A capacitance must be above 0.'], [1.23e-9, null, 'The code has two figures, and this value has more.'], [1, null, 'The code goes from 0.1 pF to 990 µF.'], [1e-9, 7, 'No letter stands for ±7 %.']])('refuses to write %f F ±%f: %s', (farads, tolerance, sentence) => {
    const written = writeThreeDigits(farads, tolerance)
    expect(!written.ok && plain(written.sentence)).toBe(sentence)
  })
})

describe('numbers on old capacitors', () => {
  // Common practice, no source.
  it.each([
    ['.01 MFD', [[0.01e-6, 'µF']]], ['0.1mfd', [[0.1e-6, 'µF']]], ['8 MF', [[8e-6, 'µF']]], ['250 MMF', [[250e-12, 'pF']]], ['250 mmfd', [[250e-12, 'pF']]], ['100µµF', [[100e-12, 'pF']]], ['100 uuF', [[100e-12, 'pF']]],
    ['0,047 µF', [[0.047e-6, 'µF']]], ['4.7 nF', [[4.7e-9, 'nF']]], ['470 pF', [[470e-12, 'pF']]], ['.05', [[0.05e-6, 'µF']]], ['4700', [[4700e-12, 'pF']]], ['470', [[470e-12, 'pF'], [470e-6, 'µF']]],
    ['8', [[8e-6, 'µF'], [8e-12, 'pF']]], ['M.F.D.', []], ['5 kg', []], ['0', []], ['', []],
  ] as const)('%s', (text, expected) => {
    expect(readBareCapacitance(text).map(({ farads, takenIn }) => [farads, takenIn])).toEqual(expected)
  })
  it('takes a tolerance in per cent', () => {
    expect(readBareCapacitance('0.1 MFD ±10 %').map(({ tolerance }) => tolerance)).toEqual([{ unit: '%', minus: 10, plus: 10 }])
    expect(readBareCapacitance('.002 mfd 20%').map(({ farads, tolerance }) => [farads, tolerance?.plus])).toEqual([[0.002e-6, 20]])
  })
  it('says so where no unit is marked', () => {
    expect(readBareCapacitance('.05')[0]?.notes).toEqual(['No unit is marked: taken in microfarads, as on paper and electrolytic capacitors.'])
  })
})
