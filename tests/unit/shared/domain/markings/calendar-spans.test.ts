import { describe, expect, it } from 'vitest'
import { monthSpan, weekSpan, yearSpan } from '../../../../../shared/domain/markings/calendar-spans'

describe('spans of days', () => {
  // The association's page on source-date codes.
  it('has 7 to 13 March as week 10 of 1999', () => expect(weekSpan(1999, 10)).toEqual({ from: '1999-03-07', to: '1999-03-13' }))
  it('has week 53 in the years that have one only', () => {
    expect(weekSpan(1997, 53)).toEqual({ from: '1997-12-28', to: '1998-01-03' })
    expect(weekSpan(1999, 53)).toBeNull()
  })
  it('has no week 0, and none after the last', () => expect([weekSpan(1972, 0), weekSpan(1972, 54)]).toEqual([null, null]))
  it('follows week by week through eighty years', () => {
    const weeks = Array.from({ length: 80 }, (_, index) => 1945 + index).flatMap(year => Array.from({ length: 53 }, (_, index) => weekSpan(year, index + 1) ?? []).flat())
    const gaps = weeks.slice(1).filter((week, index) => Date.parse(week.from) - Date.parse(weeks[index]?.to ?? '') !== 86_400_000)
    expect([weeks.length > 80 * 52, gaps]).toEqual([true, []])
  })
  it('knows the length of months, and no thirteenth', () => expect([monthSpan(2024, 2), monthSpan(2024, 13), monthSpan(2024, 0)]).toEqual([{ from: '2024-02-01', to: '2024-02-29' }, null, null]))
  it('has years', () => expect(yearSpan(1957)).toEqual({ from: '1957-01-01', to: '1957-12-31' }))
})
