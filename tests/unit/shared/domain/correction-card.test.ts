import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { CardPoint } from '../../../../shared/domain/correction-card'
import { correctionCard, settingFor, trueFrequency } from '../../../../shared/domain/correction-card'
import type { Typed } from '../../../support/signed-sheet'
import { COUNTER, makeReadings, makeSignedSheet } from '../../../support/signed-sheet'

const points: CardPoint[] = [{ dialHz: 100_000, trueHz: 98_200 }, { dialHz: 180_000, trueHz: 180_900 }, { dialHz: 320_000, trueHz: 317_000 }]

describe('the dial correction card', () => {
  it('goes through every point that was read', () => {
    for (const { dialHz, trueHz } of points) {
      expect(trueFrequency(points, dialHz)).toBeCloseTo(trueHz, 6)
      expect(settingFor(points, trueHz)).toBeCloseTo(dialHz, 2)
    }
  })
  it('takes the relative error as straight in the logarithm of frequency', () => {
    const middle = Math.sqrt(100_000 * 180_000)
    expect(trueFrequency(points, middle)).toBeCloseTo(middle * (0.982 + 1.005) / 2, 4)
  })
  it('says nothing beyond what was read', () => {
    expect([trueFrequency(points, 99_999), trueFrequency(points, 320_001), settingFor(points, 98_000), settingFor(points, 318_000), settingFor([], 1), settingFor(points.slice(0, 1), 98_200)]).toEqual([null, null, null, null, null, expect.anything()])
  })
  it('finds a setting that gives what was wanted', () => {
    fc.assert(fc.property(fc.integer({ min: 98_200, max: 317_000 }), (wanted) => {
      const set = settingFor(points, wanted)
      expect(set === null ? Number.NaN : trueFrequency(points, set)).toBeCloseTo(wanted, 1)
    }))
  })
  // A dial within 5 % at points a fifth or more apart, as any band is read at.
  it('rises between the points, and stays between what was read at them', () => {
    const band = fc.array(fc.record({ step: fc.double({ min: 1.2, max: 3, noNaN: true }), error: fc.double({ min: -0.05, max: 0.05, noNaN: true }) }), { minLength: 2, maxLength: 6 }).map((steps) => {
      let dialHz = 100_000
      return steps.map(({ step, error }): CardPoint => {
        dialHz *= step
        return { dialHz, trueHz: dialHz * (1 + error) }
      })
    })
    fc.assert(fc.property(band, fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 2, maxLength: 2 }), (read, shares) => {
      const [first, last] = [read[0]?.dialHz ?? Number.NaN, read.at(-1)?.dialHz ?? Number.NaN]
      const [lower, upper] = shares.map(share => first + (last - first) * share * 0.999_999).sort((a, b) => a - b)
      const [below, above] = [trueFrequency(read, lower ?? 0) ?? Number.NaN, trueFrequency(read, upper ?? 0) ?? Number.NaN]
      expect(above).toBeGreaterThanOrEqual(below * (1 - 1e-12))
      expect(below).toBeGreaterThanOrEqual((read[0]?.trueHz ?? Number.NaN) * (1 - 1e-12))
      expect(above).toBeLessThanOrEqual((read.at(-1)?.trueHz ?? Number.NaN) * (1 + 1e-12))
    }))
  })
  it('names no setting where a dial goes back on itself', () => {
    const back = [{ dialHz: 100_000, trueHz: 100_000 }, { dialHz: 110_000, trueHz: 130_000 }, { dialHz: 120_000, trueHz: 125_000 }, { dialHz: 200_000, trueHz: 200_000 }]
    expect(settingFor(back, 127_000)).toBeNull()
  })
})

describe('the bands of a card', () => {
  const dialAt = (nominal: number, found: string, left?: string): Typed => ({ section: 'dial', quantity: 'frequency', bandLabel: 'A', atHz: nominal, nominal, found, left })
  const cardOf = (...typed: Typed[]) => correctionCard(makeReadings(typed, [COUNTER], { rule: 'guard_band', factor: 1 }))

  it('rest on what was left, in the order of frequency', () => {
    expect(cardOf(dialAt(320_000, '311 kc', '320.4 kc'), dialAt(100_000, '99.9 kc'))[0]?.points).toEqual([{ dialHz: 100_000, trueHz: 99_900 }, { dialHz: 320_000, trueHz: 320_400 }])
  })
  it('take the mean of a setting that was read twice', () => {
    expect(cardOf(dialAt(100_000, '99 kc'), dialAt(100_000, '101 kc'), dialAt(200_000, '202 kc'))[0]?.points).toEqual([{ dialHz: 100_000, trueHz: 100_000 }, { dialHz: 200_000, trueHz: 202_000 }])
  })
  it('have a setting for the usual intermediate frequency within them, that gives it', () => {
    const band = correctionCard(makeSignedSheet().readings).find(({ label }) => label === 'B')
    const setting = band?.settings.find(({ wantedHz }) => wantedHz === 455_000)
    expect(trueFrequency(band?.points ?? [], setting?.setHz ?? 0)).toBeCloseTo(455_000, 1)
  })
  it('have no setting beyond what was read, and none from a single point', () => {
    for (const { points: read, settings } of correctionCard(makeSignedSheet().readings)) {
      expect(settings.length).toBeGreaterThan(2)
      for (const { wantedHz, setHz } of settings) {
        expect(wantedHz >= (read[0]?.trueHz ?? Number.NaN) && wantedHz <= (read.at(-1)?.trueHz ?? Number.NaN)).toBe(true)
        expect(setHz >= (read[0]?.dialHz ?? Number.NaN) && setHz <= (read.at(-1)?.dialHz ?? Number.NaN)).toBe(true)
      }
    }
    expect(cardOf(dialAt(100_000, '99.9 kc'))).toEqual([{ label: 'A', points: [{ dialHz: 100_000, trueHz: 99_900 }], settings: [] }])
  })
})
