import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { answersQuery, asksForFrequencies, parseCoverageParameter, parseFrequencyQuery } from '../../../../shared/domain/frequency-query'

const plain = (text: string): string => text.replaceAll('\u202F', ' ')
const chips = (line: string): string[] => parseFrequencyQuery(line).chips.map(chip => plain(chip.text) + (chip.unitAssumed ? ' (assumed)' : ''))

describe('parseFrequencyQuery', () => {
  it.each<[string, string[], string]>([
    ['covers 455 kc', ['covers 455 kHz'], ''],
    ['88-108 Mc', ['covers 88–108 MHz'], ''],
    ['88-108', ['covers 88–108 MHz (assumed)'], ''],
    ['20-20k', ['covers 20 Hz – 20 kHz'], ''],
    ['30-15k amplifier', ['covers 30 Hz – 15 kHz'], 'amplifier'],
    ['20-20000', ['covers 20 Hz – 20 kHz (assumed)'], ''],
    ['540-1600', ['covers 540–1 600 kHz (assumed)'], ''],
    ['up to 30 MHz', ['goes up to 30 MHz'], ''],
    ['goes to 30 Mc', ['goes up to 30 MHz'], ''],
    ['past 100 MHz', ['goes past 100 MHz'], ''],
    ['down to 20 c/s', ['goes down to 20 Hz'], ''],
    ['below 100 kc', ['goes below 100 kHz'], ''],
    ['overlaps 2-4 Mc', ['overlaps 2–4 MHz'], ''],
    ['200-550 metres', ['covers 545.077–1 498.962 kHz'], ''],
    ['from 100 kc to 30 Mc', ['covers 100 kHz – 30 MHz'], ''],
    ['100k-30M', ['covers 100 kHz – 30 MHz'], ''],
    ['DC-10 MHz scope', ['covers DC – 10 MHz'], 'scope'],
    ['88 to 108 megacycles', ['covers 88–108 MHz'], ''],
    ['1 000-2 000 kc', ['covers 1 000–2 000 kHz'], ''],
    ['60 ~ hum', ['covers 60 Hz'], 'hum'],
    ['generates 455 kc clean', ['covers 455 kHz', 'generates'], 'clean'],
    ['signal generator, 465kc', ['covers 465 kHz'], 'signal generator'],
    ['covers 455 kc, 10.7 Mc', ['covers 455 kHz', 'covers 10.7 MHz'], ''],
    ['VHF receiver', ['overlaps VHF'], 'receiver'],
    ['covers audio', ['covers audio'], ''],
  ])('understands %j', (line, understood, words) => {
    expect(chips(line)).toEqual(understood)
    expect(parseFrequencyQuery(line).words).toBe(words)
    expect(parseFrequencyQuery(line).notes).toEqual([])
  })

  it.each(['audio oscillator CR-70', 'serial 12345', '455', 'dust covers', '1950-1960 generator', '6-12 V', 'signal generator', '3 of 4', ''])(
    'leaves %j as words', (line) => {
      expect(parseFrequencyQuery(line)).toMatchObject({ words: line, chips: [], notes: [] })
    })

  it.each(['0', '-1', '1e30', 'covers 0', 'covers -1 kc', 'covers 1e30 Hz', 'covers banana', '108-88 Mc', 'covers 455', '40 m', '-5 kc', 'covers 4000 GHz', '1.5 c/s'])(
    'notes that %j makes no sense, and keeps it as words', (line) => {
      const query = parseFrequencyQuery(line)
      expect(query.notes).toHaveLength(1)
      expect(query.notes[0]).toMatch(/\.$/)
      expect(query).toMatchObject({ words: line, chips: [], wholly: [], overlapping: [], reachesUpToHz: null, reachesDownToHz: null })
    })

  it('gives whole hertz to search by', () => {
    expect(parseFrequencyQuery('covers 455 kc')).toMatchObject({ wholly: [{ lowerHz: 455_000, upperHz: 455_000 }] })
    expect(parseFrequencyQuery('overlaps 2-4 Mc')).toMatchObject({ overlapping: [{ lowerHz: 2_000_000, upperHz: 4_000_000 }] })
    expect(parseFrequencyQuery('past 100 MHz').reachesUpToHz).toBe(100_000_001)
    expect(parseFrequencyQuery('up to 30 MHz').reachesUpToHz).toBe(30_000_000)
    expect(parseFrequencyQuery('down to 20 c/s').reachesDownToHz).toBe(20)
  })

  it('tells which part of the line each chip came from', () => {
    expect(parseFrequencyQuery('old covers 455 kc green').chips[0]?.typed).toBe('covers 455 kc')
  })

  it('never throws and never drops a word', () => {
    const token = fc.oneof(
      fc.string({ maxLength: 12 }),
      fc.constantFrom('covers', 'up', 'to', 'kc', 'Mc', '-', '88-108', '455', '20k', 'VHF', 'metres', 'm', '0', '1e30', ',', 'generates', 'DC'),
    )
    fc.assert(fc.property(fc.array(token, { maxLength: 12 }), (tokens) => {
      const line = tokens.join(' ')
      const query = parseFrequencyQuery(line)
      const kept = `${query.words} ${query.chips.map(chip => chip.typed).join(' ')}`
      for (const word of line.split(/[\s,;]+/).filter(Boolean)) expect(kept).toContain(word)
    }), { numRuns: 2000 })
  })

  it('stays quick on long nonsense', () => {
    const from = performance.now()
    for (const piece of ['1', '1,', '1 ', '1.1', '- ', '88-', 'covers ', '1 000 ', 'to 1 ']) parseFrequencyQuery(piece.repeat(5000))
    expect(performance.now() - from).toBeLessThan(1500)
  })
})

describe('answersQuery', () => {
  const coverage = { generates: [{ lowerHz: 100_000, upperHz: 300_000 }, { lowerHz: 400_000, upperHz: 30_000_000 }], measures: [{ lowerHz: 20, upperHz: 20_000 }] }
  it.each<[string, boolean]>([
    ['covers 455 kc', true], ['covers 350 kc', false], ['covers 200-500 kc', false], ['overlaps 200-500 kc', true], ['up to 30 Mc', true],
    ['past 30 Mc', false], ['down to 20 c/s', true], ['generates down to 20 c/s', false], ['measures 1 kc', true], ['measures 455 kc', false],
    ['down to 20 c/s up to 30 Mc', false], ['tunes 455 kc', false], ['generator', true],
  ])('%s: %s', (line, answers) => {
    expect(answersQuery(coverage, parseFrequencyQuery(line))).toBe(answers)
  })

  it('knows when nothing but words was asked', () => {
    expect(asksForFrequencies(parseFrequencyQuery('green generator'))).toBe(false)
    expect(asksForFrequencies(parseFrequencyQuery('455 kc'))).toBe(true)
  })
})

describe('parseCoverageParameter', () => {
  it.each<[string, number, number]>([
    ['455 kc', 455_000, 455_000], ['455000', 455_000, 455_000], ['88-108 MHz', 88e6, 108e6], ['88MHz-108MHz', 88e6, 108e6],
    ['88000000-108000000', 88e6, 108e6], ['88000000..108000000', 88e6, 108e6], ['88 MHz to 108 MHz', 88e6, 108e6], ['88–108MHz', 88e6, 108e6],
    ['DC-10 MHz', 0, 10e6], ['0-10 MHz', 0, 10e6], ['1e6', 1e6, 1e6], ['20-20k', 20, 20_000],
  ])('reads %s', (text, lowerHz, upperHz) => {
    expect(parseCoverageParameter(text)).toEqual({ ok: true, range: { lowerHz, upperHz } })
  })

  it.each(['', '0', '-1', '1e30', 'banana', '108-88', '108-88 MHz', '1-', '-', '1-2-3', 'covers 455 kc', '455 kc extra', 'DC', '0-0', '1.5', '7 m', '9'.repeat(5000), '1 OR 1=1', '455 kc\'; --'])(
    'refuses %j with a sentence', (text) => {
      const read = parseCoverageParameter(text)
      expect(read.ok).toBe(false)
      if (!read.ok) expect(read.sentence).toMatch(/\.$/)
    })

  it('never throws', () => {
    fc.assert(fc.property(fc.string(), (text) => {
      const read = parseCoverageParameter(text)
      if (read.ok) expect(read.range.lowerHz).toBeLessThanOrEqual(read.range.upperHz)
    }), { numRuns: 1000 })
  })
})
