import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { checkCoverage, reportCoverage } from '../../../../shared/domain/coverage-check'
import type { CoverageFunction } from '../../../../shared/domain/functions'

const band = (label: string, lowerHz: number, upperHz: number, measuredLowHz: number | null, measuredHighHz: number | null, tolerancePercent = 2) => ({ label, lowerHz, upperHz, tolerancePercent, measuredLowHz, measuredHighHz })
type Given = Parameters<typeof band>
const plain = (text: string | undefined) => text?.replaceAll('\u202F', ' ')
const said = (...bands: Given[]) => checkCoverage(bands.map(each => band(...each))).map(({ kind, sentence }) => `${kind}: ${plain(sentence)}`)
const seams = (...bands: Given[]) => said(...bands).slice(bands.length)
const plate = (...bands: Given[]) => reportCoverage(bands.map(each => band(...each))).plate.map(({ kind, sentence }) => `${kind}: ${plain(sentence)}`)

describe('a band as measured', () => {
  it('reaches what the plate claims, wholly or within the dial’s tolerance', () => {
    expect(said(['A', 100_000, 320_000, 99_000, 320_000])).toEqual(['reaches: Band A covers what its plate claims.'])
    expect(said(['A', 100_000, 320_000, 101_900, 315_000])).toEqual(['reaches: Band A covers what its plate claims, within its dial tolerance.'])
  })
  it('may be short by just its tolerance, and not by a hertz more', () => {
    expect(said(['A', 100_000, 320_000, 102_000, 313_600])[0]).toMatch(/^reaches/)
    expect(said(['A', 100_000, 320_000, 102_001, 320_000])[0]).toMatch(/^short/)
    expect(said(['A', 100_000, 320_000, 100_000, 313_599])[0]).toMatch(/^short/)
  })
  it('says where it falls short', () => {
    expect(said(['A', 100_000, 320_000, 103_000, 311_000])).toEqual(['short: Band A begins at 103 kHz, the plate says 100 kHz and stops at 311 kHz, the plate says 320 kHz.'])
    expect(said(['A', 100_000, 320_000, 100_000, 319_200, 0])).toEqual(['short: Band A stops at 319.2 kHz, the plate says 320 kHz.'])
  })
  it('claims nothing of ends that were not read, and still tells of the one that was', () => {
    const unread = 'not_read: Band A: both ends of the dial have to be read to say what it covers.'
    expect(said(['A', 100_000, 320_000, 100_000, null])).toEqual([unread])
    expect(said(['A', 100_000, 320_000, null, null])).toEqual([unread])
    expect(said(['A', 100_000, 320_000, Number.NaN, -1])).toEqual([unread])
    expect(said(['A', 100_000, 320_000, null, 300_000])).toEqual(['short: Band A stops at 300 kHz, the plate says 320 kHz; its low end was not read.'])
  })
  it('asks about ends that are the wrong way round', () => {
    expect(said(['A', 100_000, 320_000, 320_000, 100_000])).toEqual(['wrong_way: Band A: the reading at the low end is above the one at the high end. Check which is which.'])
  })
  it('gives span and shortfalls as figures, from DC on', () => {
    expect(reportCoverage([band('A', 100_000, 320_000, 101_000, 300_000)]).bands[0]).toMatchObject({
      measured: { lowerHz: 101_000, upperHz: 300_000 }, low: { kind: 'within_tolerance', shortHz: 1000 }, high: { kind: 'short', shortHz: 20_000 },
    })
    expect(reportCoverage([band('', 0, 10_000_000, 0, null)]).bands[0]).toMatchObject({ measured: null, low: { kind: 'reaches', shortHz: 0 }, high: { kind: 'not_read', shortHz: null } })
    expect(said(['', 0, 10_000_000, 0, 10_500_000])).toEqual(['reaches: The dial covers what its plate claims.'])
  })
})

describe('the seams between bands', () => {
  it('tells gaps that the plate does not have from those it has, and from those within the tolerance', () => {
    expect(seams(['A', 100_000, 320_000, 100_000, 311_000], ['B', 320_000, 1_000_000, 325_000, 1_000_000])).toEqual(['gap: Between 311 kHz and 325 kHz nothing is covered (bands A and B); by the publication they meet.'])
    expect(seams(['A', 100_000, 320_000, 100_000, 319_000], ['B', 320_000, 1_000_000, 322_000, 1_000_000])).toEqual(['small_gap: The end marks of bands A and B leave 319 kHz to 322 kHz between them, within the dial’s tolerance.'])
    expect(seams(['A', 100_000, 320_000, 100_000, 320_000], ['B', 400_000, 1_000_000, 400_000, 1_000_000])).toEqual(['published_gap: Between 320 kHz and 400 kHz nothing is covered (bands A and B); the publication has a gap there too.'])
    expect(seams(['A', 100_000, 320_000, 100_000, 324_000], ['B', 320_000, 1_000_000, 318_000, 1_000_000])).toEqual(['overlap: Bands A and B overlap from 318 kHz to 324 kHz.'])
    expect(seams(['A', 100_000, 320_000, 100_000, 320_000], ['B', 320_000, 1_000_000, 320_000, 1_000_000])).toEqual([])
  })
  it('says nothing of a gap where a band that was not read may lie', () => {
    expect(seams(['A', 100_000, 320_000, 100_000, 320_000], ['B', 320_000, 1_000_000, null, 1_000_000], ['C', 1_000_000, 3_200_000, 1_000_000, 3_200_000])).toEqual([])
    expect(seams(['A', 100_000, 320_000, 100_000, 300_000], ['B', 320_000, 1_000_000, 320_000, 1_000_000], ['C', 1_000_000, 3_200_000, null, null])).toHaveLength(1)
  })
  it('finds no gap beside a narrow band that lies within a broad one', () => {
    expect(seams(['A', 1_000_000, 30_000_000, 1_000_000, 30_000_000], ['20 m', 14_000_000, 14_350_000, 14_000_000, 14_350_000], ['B', 30_000_000, 50_000_000, 30_000_000, 50_000_000]))
      .toEqual(['overlap: Bands A and 20 m overlap from 14 MHz to 14.35 MHz.'])
  })
  it('takes the bands in the order of frequency, however they come', () => {
    const rising: Given[] = [['A', 100_000, 320_000, 100_000, 300_000], ['B', 320_000, 1_000_000, 320_000, 900_000], ['C', 1_000_000, 3_200_000, 1_000_000, 3_200_000]]
    expect(seams(...rising).map(words => words.slice(0, 20))).toEqual(['gap: Between 300 kHz', 'gap: Between 900 kHz'])
    expect(seams(...rising.toReversed())).toEqual(seams(...rising))
  })
  it('never holds bands of different functions against each other', () => {
    const of = (name: CoverageFunction, ...given: Given) => ({ ...band(...given), function: name })
    const report = reportCoverage([of('generates', 'A', 100_000, 320_000, 100_000, 320_000), of('measures', 'M', 200_000, 1_000_000, 200_000, 800_000)])
    expect(report.seams).toEqual([])
    expect(report.plate.map(({ sentence }) => plain(sentence))).toEqual([
      'Generates: it reaches what its plate claims, 100 kHz to 320 kHz.',
      'Measures: it does not reach all that its plate claims: 800 kHz to 1 000 kHz is missing.',
    ])
  })
})

describe('the plate as a whole', () => {
  it('is reached, wholly or within the dial’s tolerance', () => {
    expect(plate(['A', 100_000, 320_000, 99_000, 330_000], ['B', 320_000, 1_000_000, 310_000, 1_000_000])).toEqual(['reaches: Overall it reaches what its plate claims, 100 kHz to 1 000 kHz.'])
    expect(plate(['A', 100_000, 320_000, 99_000, 319_000], ['B', 320_000, 1_000_000, 322_000, 1_000_000])).toEqual(['within_tolerance: Overall it reaches what its plate claims, 100 kHz to 1 000 kHz, within its dial tolerance.'])
  })
  it('is reached where a neighbour makes up for a band that falls short', () => {
    expect(plate(['A', 100_000, 320_000, 100_000, 300_000], ['B', 320_000, 1_000_000, 290_000, 1_000_000])[0]).toMatch(/^reaches/)
  })
  it('names what is missing', () => {
    expect(plate(['A', 100_000, 320_000, 110_000, 311_000], ['B', 320_000, 1_000_000, 320_000, 900_000])).toEqual(['short: Overall it does not reach all that its plate claims: 100 kHz to 110 kHz, 311 kHz to 320 kHz, 900 kHz to 1 000 kHz are missing.'])
  })
  it('does not ask for what the plate does not claim', () => {
    expect(plate(['A', 100_000, 320_000, 100_000, 320_000], ['B', 400_000, 1_000_000, 400_000, 1_000_000])).toEqual(['reaches: Overall it reaches what its plate claims, 100 kHz to 320 kHz and 400 kHz to 1 000 kHz.'])
  })
  it('is not known where a band that matters was not read', () => {
    expect(plate(['A', 100_000, 320_000, 100_000, 320_000], ['B', 320_000, 1_000_000, null, 1_000_000])).toEqual(['not_known: Overall it can’t be said whether it reaches what its plate claims: read both ends of band B.'])
    expect(plate(['A', 1_000_000, 30_000_000, 1_000_000, 30_000_000], ['20 m', 14_000_000, 14_350_000, null, null])[0]).toMatch(/^reaches/)
    expect(plate()).toEqual([])
  })
  it('says it is reached only if every hertz claimed lies in a band or within its tolerance', () => {
    const range = fc.tuple(fc.integer({ min: 10, max: 60 }), fc.integer({ min: 1, max: 40 }))
    const any = fc.record({ plate: range, low: fc.integer({ min: -5, max: 5 }), high: fc.integer({ min: -5, max: 5 }), tolerance: fc.constantFrom(0, 5, 10) })
    fc.assert(fc.property(fc.array(any, { minLength: 1, maxLength: 5 }), (list) => {
      const bands = list.map(({ plate: [lower, width], low, high, tolerance }, index) => band(String(index), lower, lower + width, lower + low, Math.max(lower + low, lower + width + high), tolerance))
      const isHeld = (hz: number) => bands.some(({ lowerHz, upperHz, measuredLowHz, measuredHighHz, tolerancePercent }) => {
        const from = (measuredLowHz ?? 0) - lowerHz <= lowerHz * tolerancePercent / 100 ? Math.min(lowerHz, measuredLowHz ?? 0) : measuredLowHz ?? 0
        const to = upperHz - (measuredHighHz ?? 0) <= upperHz * tolerancePercent / 100 ? Math.max(upperHz, measuredHighHz ?? 0) : measuredHighHz ?? 0
        return hz >= from && hz <= to
      })
      const isWhole = bands.every(({ lowerHz, upperHz }) => Array.from({ length: upperHz - lowerHz + 1 }, (_, index) => lowerHz + index).every(isHeld))
      expect(reportCoverage(bands).plate[0]?.kind !== 'short').toBe(isWhole)
    }), { numRuns: 500 })
  })
})
