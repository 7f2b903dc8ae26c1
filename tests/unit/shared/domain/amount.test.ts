import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { formatAmount, formatWithUncertainty, typedAmount } from '../../../../shared/domain/amount'
import { parseReading, QUANTITIES } from '../../../../shared/domain/reading'

const plain = (text: string) => text.replaceAll('\u202F', ' ')

describe('amounts in words', () => {
  it.each([
    [0.22, 'voltage', '220 mV'], [98_200, 'frequency', '98.2 kHz'], [0.96, 'frequency', '0.96 Hz'], [-3.2, 'level', '−3.2 dB'], [4700, 'resistance', '4.7 kΩ'], [1e-10, 'capacitance', '100 pF'],
    [0.0005, 'duration', '500 µs'], [0.999_999_99, 'voltage', '1 V'], [999_999.9999, 'frequency', '1 MHz'], [66.6667, 'percent', '66.6667 %'], [0, 'voltage', '0 V'], [50e-6, 'voltage', '50 µV'], [4.7e-9, 'capacitance', '4.7 nF'], [1e6, 'resistance', '1 MΩ'],
    // A whole frequency keeps all its figures; a fractional one has six.
    [12_345_678, 'frequency', '12.345678 MHz'], [12_345_678.5, 'frequency', '12.3457 MHz'], [-20, 'voltage', '−20 V'],
  ] as const)('%f of %s is %s', (value, quantity, words) => {
    expect(plain(formatAmount(value, quantity))).toBe(words)
  })
  // GUM 7.2.6: the value is given to the last place of its uncertainty.
  it.each([
    [98_213.456, 12, 0, 'frequency', '98.213 kHz ± 0.012 kHz'], [0.220_34, 0.0034, -4, 'voltage', '220.3 mV ± 3.4 mV'], [-20.03, 0.35, -2, 'level', '−20.03 dB ± 0.35 dB'],
    // The prefix is that of the value as it is shown, rounded.
    [0.999_99, 0.0021, -4, 'voltage', '1.0000 V ± 0.0021 V'], [999_999.7, 12, 0, 'frequency', '1.000000 MHz ± 0.000012 MHz'],
  ] as const)('%f ± %f is stated to the same place', (value, uncertainty, place, quantity, words) => {
    expect(plain(formatWithUncertainty(value, uncertainty, place, quantity))).toBe(words)
  })
  it('is read again as the same amount', () => {
    fc.assert(fc.property(fc.constantFrom(...QUANTITIES), fc.double({ min: 1e-9, max: 1e9, noNaN: true }), (quantity, value) => {
      const read = parseReading(typedAmount(value, quantity), quantity)
      expect(read.ok && read.value / value).toBeCloseTo(1, 10)
    }))
  })
})
