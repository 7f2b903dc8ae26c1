import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { attenuatorErrors, dbmFromDbuv, dbmOf, dbuvOf, levelling, matchedVolts, modulationDepth, peakDepths, peakToPeakOf, voltageRatioDb, voltsOf } from '../../../../shared/domain/levels'

describe('levels', () => {
  // The −20 dBm row and the 50 Ω offset stand in a test-equipment maker's published answers; the others are computed from the definitions.
  it.each([
    [0, 50, 0.223_607, 106.99], [-20, 50, 0.022_361, 86.99], [10, 50, 0.707_107, 116.99], [13, 50, 0.998_815, 119.99], [30, 50, 7.071_07, 136.99],
    [-73, 50, 50.06e-6, 33.99], [-107, 50, 0.9988e-6, -0.01], [0, 75, 0.273_861, 108.75], [0, 600, 0.774_597, 117.78], [10, 600, 2.449_49, 127.78],
  ])('%f dBm in %f Ω is %f V and %f dBµV', (dbm, ohm, volts, dbuv) => {
    expect(voltsOf(dbm, ohm) / volts).toBeCloseTo(1, 4)
    expect(dbmOf(volts, ohm)).toBeCloseTo(dbm, 2)
    expect(Math.abs(dbuvOf(dbm, ohm) - dbuv)).toBeLessThanOrEqual(0.005)
  })
  it.each([[0, 50, 0.632_456], [13, 50, 2.825_08], [0, 75, 0.774_597], [10, 600, 6.9282]])('%f dBm in %f Ω is %f V peak to peak', (dbm, ohm, volts) => {
    expect(peakToPeakOf(voltsOf(dbm, ohm)) / volts).toBeCloseTo(1, 4)
  })
  it('goes there and back', () => {
    fc.assert(fc.property(fc.double({ min: -130, max: 40, noNaN: true }), fc.constantFrom(50, 75, 600), (dbm, ohm) => {
      expect(dbmOf(voltsOf(dbm, ohm), ohm)).toBeCloseTo(dbm, 9)
      expect(dbmFromDbuv(dbuvOf(dbm, ohm), ohm)).toBeCloseTo(dbm, 9)
    }))
  })
  it('halves an EMF across its match, 6.02 dB', () => {
    expect(voltageRatioDb(matchedVolts(1e-6), 1e-6)).toBeCloseTo(-6.0206, 4)
    expect(dbmOf(matchedVolts(1e-6), 50)).toBeCloseTo(-113.01, 2)
  })
  it('tells how level an output is, and what each pad is off', () => {
    expect(levelling([0.2, -0.3, 0.5])).toBeCloseTo(0.8, 12)
    expect(levelling([0.2])).toBeNull()
    expect(attenuatorErrors([{ nominalDb: 0, readDb: 0.1 }, { nominalDb: -20, readDb: -19.6 }, { nominalDb: -40, readDb: -39.9 }]).map(({ stepErrorDb, accumulatedErrorDb }) => [stepErrorDb, accumulatedErrorDb].map(each => each === null ? null : Number(each.toFixed(6)))))
      .toEqual([[null, 0], [0.3, 0.3], [-0.3, 0]])
  })
  // An engineer's published examples, and a school's exemplar solution for 50 and 10 V (its input voltages from memory).
  it.each([[50, 10, 0.6667], [19.2032, 14.7968, 0.1296], [19, 14.7968, 0.124_367], [15, 14.7968, 0.006_820], [15, 5, 0.5], [3, 1, 0.5], [8, 2, 0.6], [2, 0, 1]])('an envelope of %f and %f is %f deep', (highest, lowest, depth) => {
    expect(modulationDepth(highest, lowest)).toBeCloseTo(depth, 4)
  })
  it('has no depth for what can’t be', () => {
    expect([modulationDepth(1, 2), modulationDepth(0, 0), modulationDepth(2, -1)]).toEqual([null, null, null])
    expect(peakDepths(16, 5, 10)).toEqual({ up: 0.6, down: 0.5 })
    expect(peakDepths(9, 5, 10)).toBeNull()
  })
})
