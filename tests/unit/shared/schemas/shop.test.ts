import { describe, expect, it } from 'vitest'
import { toFieldErrors } from '../../../../shared/schemas/field-errors'
import { shopChange } from '../../../../shared/schemas/shop'

const settings = {
  name: 'Fenwold Instruments', address: '', currency: 'GBP', timeZone: 'Europe/London', ituRegion: '1', defaultTerms: '', earthBondLimitMilliohm: '100',
  insulationLimitKilohm: '1000', leakageLimitMicroamp: '3500', safetyLimitsOrigin: 'our own code', decisionRule: 'guard_band', guardFactor: '1', version: 1,
}
const messages = (said: object) => {
  const { error } = shopChange.safeParse({ ...settings, ...said })
  return error ? toFieldErrors(error) : []
}

describe('what an hour on the bench costs', () => {
  it.each([['28', '28'], ['£28.00 an hour', '£28.00'], ['28/h', '28'], ['28 per hour', '28'], ['', ''], [28, '28'], [undefined, undefined]])('takes %s as it was typed', (benchRate, typed) => {
    expect(shopChange.parse({ ...settings, benchRate }).benchRate).toBe(typed)
  })
})

describe('the rule a shop judges by', () => {
  it.each([['1', 1], ['0', 0], ['0,83', 0.83], ['3', 3], [0.5, 0.5]])('takes %s as the factor of the guard band', (guardFactor, factor) => {
    expect(shopChange.parse({ ...settings, guardFactor }).guardFactor).toBe(factor)
  })

  it.each([
    ['', 'usually 1'], ['-1', 'zero or more'], ['3.01', '3 at most'], ['one', 'as a number'], ['0.123', 'two decimals'], [null, 'usually 1'],
  ])('does not take %s, and says why: %s', (guardFactor, why) => {
    expect(messages({ guardFactor })).toMatchObject([{ path: 'guardFactor', message: expect.stringContaining(why) }])
  })

  it('asks for a rule it knows', () => {
    expect(messages({ decisionRule: 'by eye' })).toEqual([{ path: 'decisionRule', message: 'Choose how a reading is judged' }])
  })
})
