import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { addMoney, allocate, currencyDecimals, formatMoney, isCurrencyCode, moneyAsDecimal, MOST_MINOR, parseMoney } from '../../../../shared/domain/money'

describe('parseMoney', () => {
  it.each<[string, string, number]>([
    ['£1,250', 'GBP', 125_000], ['1250.00', 'GBP', 125_000], ['1 250,00', 'EUR', 125_000], ['1.250,00', 'EUR', 125_000], ['1,250.50', 'GBP', 125_050],
    ['£ 12.5', 'GBP', 1250], ['12,5 €', 'EUR', 1250], ['GBP 12', 'GBP', 1200], ['12 gbp', 'GBP', 1200], ['.99', 'GBP', 99], ['12.', 'GBP', 1200], ['0', 'GBP', 0],
    ['1250', 'JPY', 1250], ['¥1,250', 'JPY', 1250], ['12.345', 'KWD', 12_345], ['1,234,567.89', 'GBP', 123_456_789], ['12.500000', 'GBP', 1250], ['$5', 'USD', 500], ['1\u00A0250,00', 'EUR', 125_000],
  ])('reads %s in %s as %i minor units', (text, currency, minor) => {
    expect(parseMoney(text, currency)).toEqual({ ok: true, minor, currency })
  })

  it.each<[string, string, string]>([
    ['', 'GBP', 'empty'], ['banana', 'GBP', 'not-an-amount'], ['12.3.4', 'GBP', 'not-an-amount'], ['1,25,000', 'GBP', 'not-an-amount'], ['£', 'GBP', 'not-an-amount'], ['1e5', 'GBP', 'not-an-amount'],
    ['1.250', 'GBP', 'ambiguous'], ['1,250', 'KWD', 'ambiguous'], ['12.345.6', 'GBP', 'not-an-amount'], ['12.3456', 'GBP', 'too-fine'], ['12.50', 'JPY', 'too-fine'],
    ['-5', 'GBP', 'negative'], ['£-5', 'GBP', 'negative'], ['-£5', 'GBP', 'negative'], ['99999999999999', 'GBP', 'too-large'], ['€5', 'GBP', 'other-currency'], ['5 USD', 'GBP', 'other-currency'], ['9'.repeat(5000), 'GBP', 'not-an-amount'],
  ])('refuses %j in %s as %s, with a sentence', (text, currency, reason) => {
    const read = parseMoney(text, currency)
    expect(read).toMatchObject({ ok: false, reason })
    if (!read.ok) expect(read.sentence).toMatch(/\.$/)
  })

  it('allows money going back where told', () => {
    expect(parseMoney('-£5', 'GBP', { allowNegative: true })).toEqual({ ok: true, minor: -500, currency: 'GBP' })
  })

  it('reads back every amount it writes, in currencies of 0, 2 and 3 decimals', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: MOST_MINOR }), fc.constantFrom('JPY', 'GBP', 'EUR'), (minor, currency) => {
      expect(parseMoney(moneyAsDecimal({ minor, currency }), currency)).toEqual({ ok: true, minor, currency })
      expect(parseMoney(formatMoney({ minor, currency }), currency)).toEqual({ ok: true, minor, currency })
    }))
    fc.assert(fc.property(fc.integer({ min: 0, max: MOST_MINOR }), (minor) => {
      expect(parseMoney(moneyAsDecimal({ minor, currency: 'KWD' }), 'KWD')).toEqual({ ok: true, minor, currency: 'KWD' })
    }))
  })

  it('never throws', () => {
    fc.assert(fc.property(fc.string(), text => void parseMoney(text, 'GBP')))
  })
})

describe('formatMoney', () => {
  it.each<[number, string, string]>([
    [125_000, 'GBP', '£1,250.00'], [5, 'GBP', '£0.05'], [-1250, 'GBP', '-£12.50'], [1250, 'EUR', '€12.50'], [0, 'GBP', '£0.00'],
  ])('shows %i %s as %s', (minor, currency, shown) => {
    expect(formatMoney({ minor, currency })).toBe(shown)
  })

  it('knows the decimals of ISO 4217', () => {
    expect(['JPY', 'GBP', 'KWD'].map(currencyDecimals)).toEqual([0, 2, 3])
    expect(moneyAsDecimal({ minor: -5, currency: 'KWD' })).toBe('-0.005')
    expect(moneyAsDecimal({ minor: 1250, currency: 'JPY' })).toBe('1250')
    expect([isCurrencyCode('GBP'), isCurrencyCode('gbp'), isCurrencyCode('POUND')]).toEqual([true, false, false])
  })
})

describe('allocate', () => {
  it('gives what is left to the largest remainders, the earlier on a tie', () => {
    expect(allocate(100, [1, 1, 1])).toEqual([34, 33, 33])
    expect(allocate(100, [3, 3, 1])).toEqual([43, 43, 14])
    expect(allocate(-100, [1, 1, 1])).toEqual([-34, -33, -33])
    expect(allocate(5, [0, 0])).toEqual([3, 2])
    expect(allocate(0, [1, 2])).toEqual([0, 0])
  })

  it('adds up to the last penny, no share a whole unit from the exact one, no share for no weight', () => {
    const weights = fc.array(fc.integer({ min: 0, max: 1_000_000 }), { minLength: 1, maxLength: 12 })
    fc.assert(fc.property(fc.integer({ min: -MOST_MINOR, max: MOST_MINOR }), weights, (total, shares) => {
      const given = allocate(total, shares)
      expect(given.reduce((a, b) => a + b, 0)).toBe(total)
      const sum = shares.reduce((a, b) => a + b, 0)
      for (const [index, share] of shares.entries()) {
        if (sum > 0) expect(Math.abs((given[index] ?? 0) - total * share / sum)).toBeLessThan(1.001)
        if (sum > 0 && share === 0) expect(given[index]).toBe(0)
      }
    }), { numRuns: 500 })
  })

  it('refuses nothing to share among, fractions and negatives', () => {
    expect(() => allocate(10, [])).toThrow(RangeError)
    expect(() => allocate(10, [-1, 2])).toThrow(RangeError)
    expect(() => allocate(10.5, [1])).toThrow(RangeError)
    expect(() => allocate(10, [0.5])).toThrow(RangeError)
  })
})

describe('addMoney', () => {
  it('adds one currency and refuses two', () => {
    expect(addMoney({ minor: 1, currency: 'GBP' }, { minor: 2, currency: 'GBP' })).toEqual({ minor: 3, currency: 'GBP' })
    expect(() => addMoney({ minor: 1, currency: 'GBP' }, { minor: 2, currency: 'EUR' })).toThrow(RangeError)
  })
})
