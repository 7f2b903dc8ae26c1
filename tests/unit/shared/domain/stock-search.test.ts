import fc from 'fast-check'
import Fuse from 'fuse.js'
import { describe, expect, it } from 'vitest'
import type { CoverageBand } from '../../../../shared/domain/coverage'
import { coverageOf } from '../../../../shared/domain/coverage'
import type { EquipmentKind } from '../../../../shared/domain/equipment-kinds'
import { answersQuery, parseFrequencyQuery } from '../../../../shared/domain/frequency-query'
import { FUNCTIONS } from '../../../../shared/domain/functions'
import {
  answerCoverage, countInWords, rankByWords, searchRecord, searchStock, searchWords, STOCK_INDEX_OPTIONS,
} from '../../../../shared/domain/stock-search'
import type { SearchRecord } from '../../../../shared/domain/stock-search'
import { makeTag } from '../../../../shared/domain/tag'
import type { UnitSummary } from '../../../../shared/types/unit'

const plain = (text: string | null | undefined) => text?.replaceAll('\u202F', ' ') ?? null
const generates = (...edges: [number, number][]): CoverageBand[] => edges.map(([lowerHz, upperHz]) => ({ function: 'generates', lowerHz, upperHz }))

function piece(number: number, maker: string, designation: string, kind: EquipmentKind, bands: CoverageBand[], serial = ''): UnitSummary {
  return {
    tag: makeTag('U', number),
    model: { id: String(number), maker, designation, kind, yearsFrom: null, yearsTo: null },
    serial: { answer: serial ? 'known' : 'not_looked', text: serial || null },
    state: 'ready', hazardHold: null, place: null, ownership: 'bought', askingMinor: null, askingCurrency: null, thumbnailUrl: null,
    bands: bands.map((band, index) => ({ ...band, label: String(index + 1), dialTolerancePercent: null })),
    createdAt: '2026-03-02T10:00:00.000000Z',
  }
}

const STOCK = [
  piece(41, 'Oxmarden', '307-G', 'rf_generator', generates([100e3, 32e6]), '4417'),
  piece(112, 'Haldraven', '6120-B', 'rf_generator', generates([50e3, 65e6])),
  piece(139, 'Lindvassa', 'V 44', 'rf_generator', generates([10e6, 240e6])),
  piece(64, 'Dornquell', 'MS 5', 'rf_generator', generates([100e3, 300e3], [400e3, 22e6])),
  piece(7, 'Oxmarden', 'CR 88', 'communications_receiver', [{ function: 'tunes', lowerHz: 540e3, upperHz: 30e6 }]),
]

function find(line: string, stock = STOCK) {
  const query = parseFrequencyQuery(line)
  const records = stock.map(searchRecord)
  const fuse = new Fuse<SearchRecord>(records, STOCK_INDEX_OPTIONS)
  const ranks = rankByWords(searchWords(query.words), records, word => fuse.search(word).map(({ item, score }) => ({ tag: item.tag, score: score ?? 1 })))
  return searchStock(stock, query, ranks).map(hit => [`${hit.unit.model.maker} ${hit.unit.model.designation}`, hit.answer, plain(hit.note)])
}

describe('one typed line', () => {
  it('finds what covers it, then what nearly does, with the shortfall in words', () => {
    expect(find('sig gen covers 455 kc and past 30 megs')).toEqual([
      ['Oxmarden 307-G', 'full', 'covers both'],
      ['Haldraven 6120-B', 'full', 'covers both'],
      ['Dornquell MS 5', 'nearly', expect.stringContaining('stops at 22 MHz')],
      ['Lindvassa V 44', 'nearly', expect.stringContaining('starts at 10 MHz')],
    ])
  })

  it('forgives a typing error', () => {
    expect(find('signal generater').map(([name]) => name)).toHaveLength(4)
    expect(find('Oxmardon').map(([name]) => name)).toEqual(['Oxmarden 307-G', 'Oxmarden CR 88'])
    expect(find('haldravn generator').map(([name]) => name)).toEqual(['Haldraven 6120-B'])
  })

  it('takes figures as they stand: one figure off is another piece', () => {
    expect(find('4417').map(([name]) => name)).toEqual(['Oxmarden 307-G'])
    expect(find('4418')).toEqual([])
    expect(find('oxmarden 88').map(([name]) => name)).toEqual(['Oxmarden CR 88'])
    expect(find(makeTag('U', 139)).map(([name]) => name)).toEqual(['Lindvassa V 44'])
  })

  it('never counts a gap as covered', () => {
    expect(find('covers 350 kc dornquell')).toEqual([['Dornquell MS 5', 'nearly', 'stops at 300 kHz · starts again at 400 kHz']])
  })

  it('keeps the functions apart', () => {
    expect(find('tunes 1-20 Mc').map(([name]) => name)).toEqual(['Oxmarden CR 88'])
  })

  it('finds nothing for what nobody has, and says no piece', () => {
    expect(find('wibble')).toEqual([])
    expect(countInWords([], 60, true, 'in stock')).toBe('No piece covers it · of 60 in stock')
  })
})

describe('the count', () => {
  const hit = (answer: 'full' | 'nearly') => ({ unit: STOCK[0] ?? piece(1, 'A', 'B', 'other', []), answer, note: null, rank: 0 })

  it('is a sentence', () => {
    expect(countInWords([hit('full'), hit('full'), hit('full'), hit('nearly'), hit('nearly')], 60, true, 'in stock')).toBe('3 pieces cover it, 2 nearly · of 60 in stock')
    expect(countInWords([hit('full')], 60, true, 'in stock')).toBe('1 piece covers it · of 60 in stock')
    expect(countInWords([hit('full'), hit('full')], 2, false, 'in stock')).toBe('2 pieces in stock')
    expect(countInWords([hit('full')], 2, false, 'in stock')).toBe('1 piece · of 2 in stock')
  })
})

describe('the answer of a coverage', () => {
  const hertz = fc.integer({ min: 1, max: 200 })
  const ends = fc.tuple(hertz, hertz).map(([a, b]) => ({ lowerHz: Math.min(a, b), upperHz: Math.max(a, b) }))
  const bands = fc.array(fc.record({ function: fc.constantFrom(...FUNCTIONS), of: ends }).map(({ function: name, of }) => ({ function: name, ...of })), { maxLength: 6 })
  const asked = fc.record({
    wholly: fc.array(ends, { maxLength: 2 }), overlapping: fc.array(ends, { maxLength: 2 }),
    reachesUpToHz: fc.option(hertz), reachesDownToHz: fc.option(hertz), functions: fc.subarray([...FUNCTIONS], { maxLength: 2 }),
  })

  it('is full exactly where the query is answered', () => {
    fc.assert(fc.property(bands, asked, (of, query) => {
      const answered = answersQuery(coverageOf(of), { ...query, chips: [], notes: [], words: '' })
      expect(answerCoverage(of, query)?.answer === 'full').toBe(answered)
    }), { numRuns: 500 })
  })

  it('says what is missing wherever it is only near', () => {
    fc.assert(fc.property(bands, asked, (of, query) => {
      const found = answerCoverage(of, query)
      if (found?.answer !== 'nearly') return
      expect(found.note).toMatch(/short|gap|stops|starts/)
      expect(found.missingOctaves).toBeGreaterThanOrEqual(0)
    }), { numRuns: 500 })
  })

  it('calls half an octave short near, and an octave not', () => {
    const upTo = (hz: number) => answerCoverage(generates([1e6, hz]), { wholly: [], overlapping: [], reachesUpToHz: 30e6, reachesDownToHz: null, functions: [] })
    expect(plain(upTo(22e6)?.note)).toBe('stops at 22 MHz, 8 MHz short')
    expect(upTo(15e6)).toBeNull()
  })
})
