import { describe, expect, it } from 'vitest'
import { readResistorDigits } from '../../../../../shared/domain/markings/resistor-digits'

// Common practice, no source.
describe('resistances in figures only', () => {
  it.each([['103', 10_000], ['1002', 10_000], ['470', 47], ['475', 4_700_000], ['2231', 2230]])('%s is %f Ω', (text, ohms) => expect(readResistorDigits(text)).toBe(ohms))
  it.each(['', '47', '047', '478', '10022', '4K7', '-103'])('“%s” is none', text => expect(readResistorDigits(text)).toBeNull())
})
