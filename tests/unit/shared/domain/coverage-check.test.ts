import { describe, expect, it } from 'vitest'
import { checkCoverage } from '../../../../shared/domain/coverage-check'

const band = (label: string, lowerHz: number, upperHz: number, measuredLowHz: number | null, measuredHighHz: number | null) => ({ label, lowerHz, upperHz, tolerancePercent: 2, measuredLowHz, measuredHighHz })
const said = (...bands: Parameters<typeof band>[]) => checkCoverage(bands.map(each => band(...each))).map(({ kind, sentence }) => `${kind}: ${sentence.replaceAll('\u202F', ' ')}`)

describe('coverage as measured', () => {
  it('reaches what the plate claims, within the dial’s tolerance', () => {
    expect(said(['A', 100_000, 320_000, 101_900, 315_000])).toEqual(['reaches: Band A covers what its plate claims, within its dial tolerance.'])
  })
  it('says where a band falls short', () => {
    expect(said(['A', 100_000, 320_000, 103_000, 311_000])).toEqual(['short: Band A begins at 103 kHz, the plate says 100 kHz and stops at 311 kHz, the plate says 320 kHz.'])
  })
  it('tells gaps that the plate does not have from those it has, and from those within the tolerance', () => {
    expect(said(['A', 100_000, 320_000, 100_000, 311_000], ['B', 320_000, 1_000_000, 325_000, 1_000_000])[2]).toMatch(/^gap: Between 311 kHz and 325 kHz nothing is covered/)
    expect(said(['A', 100_000, 320_000, 100_000, 319_000], ['B', 320_000, 1_000_000, 322_000, 1_000_000])[2]).toMatch(/^small_gap: The end marks of bands A and B leave 319 kHz to 322 kHz/)
    expect(said(['A', 100_000, 320_000, 100_000, 320_000], ['B', 400_000, 1_000_000, 400_000, 1_000_000])[2]).toMatch(/^published_gap: Between 320 kHz and 400 kHz/)
    expect(said(['A', 100_000, 320_000, 100_000, 324_000], ['B', 320_000, 1_000_000, 318_000, 1_000_000])[2]).toBe('overlap: Bands A and B overlap from 318 kHz to 324 kHz.')
  })
  it('claims nothing of a band whose ends were not read', () => {
    expect(said(['A', 100_000, 320_000, 100_000, null])).toEqual(['not_read: Band A: both ends of the dial have to be read to say what it covers.'])
  })
})
