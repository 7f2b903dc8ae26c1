import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { formatMinutes, readMinutes } from '../../../../shared/domain/minutes'

describe('minutes', () => {
  it.each([['45', 45], ['45 min', 45], ['1 h 30', 90], ['1:30', 90], ['4 h', 240], ['240', 240], ['2 hours', 120], ['1h05', 65]])('reads %s', (typed, minutes) => {
    expect(readMinutes(typed)).toBe(minutes)
  })

  it.each(['', 'soon', '-5', '1.5', '1 h 300', 'h'])('does not read %j', (typed) => {
    expect(readMinutes(typed)).toBeNull()
  })

  it('shows hours and minutes as they are said', () => {
    expect([0, 40, 65, 100, 240].map(formatMinutes)).toEqual(['0\u202Fmin', '40\u202Fmin', '1\u202Fh\u202F05', '1\u202Fh\u202F40', '4\u202Fh'])
  })

  it('reads again what it shows', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 100_000 }), (minutes) => {
      expect(readMinutes(formatMinutes(minutes))).toBe(minutes)
    }))
  })
})
