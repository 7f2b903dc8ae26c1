import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { attenuatorErrors, dbmFromDbuv, dbmOf, dbuvOf, EMF_TO_MATCHED_DB, IMPEDANCES, levelling, matchedVolts, modulationDepth, peakDepths, peakOf, peakToPeakOf, powerRatio, powerRatioDb, rmsFromPeak, rmsFromPeakToPeak, voltageRatio, voltageRatioDb, voltsOf } from '../../../../shared/domain/levels'

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
  it('tells voltage from power ratios, and goes back', () => {
    // Definitions: twice the voltage is 6.02 dB, twice the power 3.01 dB.
    expect(voltageRatioDb(2, 1)).toBeCloseTo(6.0206, 4)
    expect(powerRatioDb(2, 1)).toBeCloseTo(3.0103, 4)
    expect(EMF_TO_MATCHED_DB).toBeCloseTo(6.0206, 4)
    fc.assert(fc.property(fc.double({ min: -120, max: 120, noNaN: true }), (db) => {
      expect(voltageRatioDb(voltageRatio(db), 1)).toBeCloseTo(db, 9)
      expect(powerRatioDb(powerRatio(db), 1)).toBeCloseTo(db, 9)
      expect(powerRatio(db) / voltageRatio(db) ** 2).toBeCloseTo(1, 9)
    }))
  })
  it('goes from the peaks of a sine to its rms', () => {
    // 42.4 V peak is 29.98 V rms (the two figures of IEC 61010-1, 3rd ed., FROM MEMORY; arithmetic repeated).
    expect(rmsFromPeak(42.4)).toBeCloseTo(29.98, 2)
    expect(rmsFromPeakToPeak(84.8)).toBeCloseTo(29.98, 2)
    expect(peakOf(0.223_607)).toBeCloseTo(0.632_456 / 2, 5)
  })
  // 0.3 µV by a published chart (−117.5); 1 V open circuit behind 50 Ω by a function generator's service guide; the rest computed.
  it.each([[0.3e-6, -117.45], [1e-6, -106.99], [50e-6, -73.01], [matchedVolts(1), 6.99]])('%f V across 50 Ω is %f dBm', (volts, dbm) => {
    expect(Math.abs(dbmOf(volts, 50) - dbm)).toBeLessThanOrEqual(0.005 + 1e-9)
  })
  // 0 dBm in 75 Ω is 48.75 dBmV, published (one page prints 48.74, a slip in its logarithm).
  it('knows the cable people’s 75 Ω, and offers the three impedances', () => {
    expect(dbuvOf(0, 75) - 60).toBeCloseTo(48.7506, 4)
    expect(IMPEDANCES).toEqual([50, 75, 600])
    for (const [ohm, offset] of [[50, 106.9897], [75, 108.7506], [600, 117.7815]] as const) expect(Math.abs(dbuvOf(0, ohm) - offset)).toBeLessThanOrEqual(0.0001)
  })
  it('adds an attenuator’s steps up to what it is off in all', () => {
    const step = fc.record({ nominalDb: fc.double({ min: -120, max: 0, noNaN: true }), readDb: fc.double({ min: -120, max: 0, noNaN: true }) })
    fc.assert(fc.property(fc.array(step, { minLength: 1, maxLength: 12 }), (steps) => {
      let sum = 0
      for (const { stepErrorDb, accumulatedErrorDb } of attenuatorErrors(steps)) {
        sum += stepErrorDb ?? 0
        expect(accumulatedErrorDb).toBeCloseTo(sum, 8)
      }
    }))
    expect(attenuatorErrors([])).toEqual([])
  })
})

describe('modulation depth', () => {
  // An engineer's published examples, and a school's exemplar solution for 50 and 10 V (its input voltages FROM MEMORY); from 3 and 1 on computed.
  it.each([
    [50, 10, 0.6667], [19.2032, 14.7968, 0.1296], [19, 14.7968, 0.124_367], [15, 14.7968, 0.006_820], [15, 5, 0.5], [3, 1, 0.5], [8, 2, 0.6], [2, 0, 1], [4, 4, 0],
  ])('of an envelope of %f and %f is %f', (highest, lowest, depth) => {
    const read = modulationDepth(highest, lowest)
    expect(read.ok && Math.abs(read.depth - depth)).toBeLessThanOrEqual(0.000_05)
  })
  it('gives the carrier and the modulating peak', () => {
    expect(modulationDepth(50, 10)).toMatchObject({ carrier: 30, modulatingPeak: 20 })
    expect(modulationDepth(15, 5)).toMatchObject({ carrier: 10, modulatingPeak: 5, note: null })
  })
  it('says that over-modulation can’t be read from it', () => {
    expect(modulationDepth(2, 0)).toMatchObject({ ok: true, note: expect.stringContaining('100\u202F% or more') })
    expect(peakDepths(3, 0, 1)).toMatchObject({ ok: true, up: 2, down: 1, note: expect.stringContaining('over-modulation') })
  })
  it.each([
    [1, 2, 'Swap them'], [0, 0, 'no signal'], [2, -1, 'below nought'], [-2, -3, 'below nought'], [Number.NaN, 1, 'as numbers'], [Number.POSITIVE_INFINITY, 1, 'as numbers'],
  ])('refuses %f and %f with a sentence', (highest, lowest, says) => {
    expect(modulationDepth(highest, lowest)).toEqual({ ok: false, sentence: expect.stringContaining(says) })
    expect(peakDepths(highest, lowest, 1)).toEqual({ ok: false, sentence: expect.stringContaining(says) })
  })
  it('is told for peaks and troughs apart', () => {
    expect(peakDepths(16, 5, 10)).toMatchObject({ ok: true, up: 0.6, down: 0.5, note: null })
    for (const carrier of [17, 4, 0, -1, Number.NaN]) expect(peakDepths(16, 5, carrier)).toMatchObject({ ok: false, sentence: expect.stringContaining('modulation off') })
  })
  it('is the same for peaks and troughs where the wave is symmetrical', () => {
    fc.assert(fc.property(fc.double({ min: 0.01, max: 1000, noNaN: true }), fc.double({ min: 0, max: 0.999, noNaN: true }), (carrier, share) => {
      const whole = modulationDepth(carrier * (1 + share), carrier * (1 - share))
      const apart = peakDepths(carrier * (1 + share), carrier * (1 - share), carrier)
      expect(whole.ok && whole.depth).toBeCloseTo(share, 9)
      expect(apart.ok && [apart.up, apart.down]).toEqual([expect.closeTo(share, 9), expect.closeTo(share, 9)])
    }))
  })
})
