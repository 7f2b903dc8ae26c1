import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { YearsMade } from '../../../../../shared/domain/markings/date-codes'
import { isNewerThanSet, readDateCode } from '../../../../../shared/domain/markings/date-codes'

const TODAY = '2026-06-15'
const read = (text: string, made?: YearsMade) => {
  const result = readDateCode(text, { today: TODAY, made })
  return result.ok ? result.readings.map(({ form, words }) => `${form}: ${words}`) : result.sentence
}

describe('source-date codes', () => {
  it('reads the association’s own example: week 10 of 1999 is 7 to 13 March', () => {
    const result = readDateCode('113-9910', { today: TODAY })
    expect(result.ok && result.readings[0]).toMatchObject({ form: 'source', year: 1999, from: '1999-03-07', to: '1999-03-13' })
  })
  it.each([
    // Secondary readings of such codes.
    ['190-7215', ['source: week 15 of 1972']], ['285642', ['1946', '1956', '1966', '1976', '1986', '1996', '2006', '2016'].map(year => `source: week 42 of ${year}`)],
    // Worked out from the form.
    ['606-8531', ['source: week 31 of 1985']], ['6068531', ['source: week 31 of 1985', ...['1945', '1955', '1965', '1975', '1985', '1995', '2005', '2015', '2025'].map(year => `source: week 31 of ${year}`)]], ['1234-7215', ['source: week 15 of 1972']],
  ])('%s', (text, expected) => expect(read(text)).toEqual(expected))
  it.each(['220-500', '220-560', '220-7200', '220-7254'])('refuses the week of %s', text => expect(read(text)).toBe(`“${text}” is not a date code: no year has such a week.`))
})

describe('other date codes (common practice)', () => {
  it.each([
    ['7215', ['year-week: week 15 of 1972']], ['1572', ['week-year: week 15 of 1972']], ['82-14', ['year-week: week 14 of 1982']], ['5233', ['year-week: week 33 of 1952']],
    ['2231', ['year-week: week 31 of 2022']], ['1965', ['year: 1965', 'week-year: week 19 of 1965']], ['57', ['two-figures: 1957']], ['03/74', ['week-year: week 3 of 1974', 'month: March 1974']],
    ['74-03', ['year-week: week 3 of 1974', 'month: March 1974']], ['1215', ['year-week: week 15 of 2012', 'week-year: week 12 of 2015']], ['K5', ['letter-month: May 1978', 'letter-month: May 1998', 'letter-month: May 2018']],
    ['A', ['letter: 1970', 'letter: 1990', 'letter: 2010']],
  ])('%s', (text, expected) => expect(read(text)).toEqual(expected))
  it.each(['', 'HELLO', '12345', '1234567890', 'I5', 'G'])('“%s” is none', text => expect(read(text)).toContain('is not a date code that can be read'))
  it('marks the letters of IEC 60062 as doubtful', () => {
    const result = readDateCode('K5', { today: TODAY })
    expect(result.ok && result.readings.every(({ isDoubtful, why }) => isDoubtful && why.includes('from memory'))).toBe(true)
  })
})

describe('the years the set was made', () => {
  it('decide the decade of a one-figure year, and the others are named', () => {
    const result = readDateCode('285642', { today: TODAY, made: { from: 1951, to: 1959 } })
    expect(result.ok && result.readings.map(({ year, why }) => [year, why])).toEqual([[1956, 'A source-date code: 285 is the maker, then one for the year and two for the week. The decade is that of the set (made 1951–59); the code alone could also mean 1946, 1966, 1976, 1986, 1996, 2006 or 2016.']])
  })
  it('put the reading that agrees first, though the other form is the commoner', () => {
    expect(read('5253')).toEqual(['year-week: week 53 of 1952', 'week-year: week 52 of 1953'])
    expect(read('5253', { from: 1956, to: 1957 })).toEqual(['week-year: week 52 of 1953', 'year-week: week 53 of 1952'])
  })
  it('leave every decade where none agrees', () => expect(read('642', { from: 1951, to: 1952 })).toHaveLength(8))
  it('say nothing where they are not known', () => {
    const result = readDateCode('7215', { today: TODAY, made: { from: null, to: null } })
    expect(result.ok && result.readings.map(({ agreesWithSet }) => agreesWithSet)).toEqual([null])
  })
})

describe('codes of days to come', () => {
  it('are refused, or left out where another date is possible', () => {
    expect(read('2650')).toEqual(['week-year: week 26 of 1950'])
    expect(read('3053')).toEqual(['week-year: week 30 of 1953'])
    expect(read('3145')).toEqual(['week-year: week 31 of 1945'])
    expect(read('190-2730')).toBe('“190-2730” would be week 30 of 2027, which is still to come. Read it again: it is another number, or another date.')
  })
  it('are not before the first day of the week', () => {
    const result = (today: string) => readDateCode('190-2625', { today }).ok
    expect([result('2026-06-20'), result('2026-06-21')]).toEqual([false, true])
  })
  it('never come out, whatever is typed', () => {
    fc.assert(fc.property(fc.oneof(fc.stringMatching(/^\d{1,8}$/), fc.stringMatching(/^\d{3}-\d{3,4}$/), fc.string({ maxLength: 8 })), fc.integer({ min: 1950, max: 2030 }), (text, year) => {
      const result = readDateCode(text, { today: TODAY, made: { from: year, to: year + 5 } })
      return result.ok ? result.readings.length > 0 && result.readings.every(({ from, to }) => from <= TODAY && from <= to) : result.sentence.length > 0
    }))
  })
  it('name the same week that was marked', () => {
    fc.assert(fc.property(fc.integer({ min: 1945, max: 2025 }), fc.integer({ min: 1, max: 52 }), (year, week) => {
      const code = `190-${String(year % 100).padStart(2, '0')}${String(week).padStart(2, '0')}`
      const result = readDateCode(code, { today: TODAY })
      return result.ok && result.readings.some(reading => reading.year === year && reading.words === `week ${week} of ${year}`)
    }))
  })
})

describe('a part newer than the set', () => {
  it('is a replacement', () => {
    expect(isNewerThanSet({ year: 1966 }, { from: 1951, to: 1959 })).toEqual({ years: 7, sentence: 'This part is newer than the set: it was made in 1966, 7 years after the last year the set was made (1959). It is a replacement.' })
    expect(isNewerThanSet({ year: 1960 }, { from: null, to: 1959 })?.sentence).toContain('one year after')
  })
  it('can’t be told without the last year, and is not from the last year', () => {
    expect(isNewerThanSet({ year: 1966 }, { from: 1951, to: null })).toBeNull()
    expect(isNewerThanSet({ year: 1959 }, { from: 1951, to: 1959 })).toBeNull()
  })
})
