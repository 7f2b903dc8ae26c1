import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { writeBands } from '../../../../../shared/domain/markings/resistor-bands'
import { BAND_PLACES, readBands } from '../../../../../shared/domain/markings/resistor-colours'

const plain = (text: string) => text.replaceAll('\u202F', ' ')

// The examples are those of reading, turned round: worked out from the table of IEC 60062.
describe('the bands of a value', () => {
  it.each([
    [4700, 5, null, 'yellow violet red gold'], [10, 20, null, 'brown black black'], [4700, 1, null, 'yellow violet black brown brown'], [33, 1, null, 'orange orange black gold brown'],
    [10_000, 1, 50, 'brown black black red brown red'], [0.47, 5, null, 'yellow violet silver gold'], [0.47, 1, null, 'yellow violet silver brown'], [47_300, 5, null, 'yellow violet orange red gold'],
  ])('%f Ω ±%f %% at %s ppm/K', (ohms, tolerance, ppm, words) => {
    expect(writeBands(ohms, tolerance, ppm)).toEqual({ ok: true, bands: words.split(' ') })
  })
  it.each([
    [0, 5, null, 'A bridge of 0 Ω has one black band and no tolerance.'], [-1, 5, null, 'A resistance must be above 0.'], [Number.NaN, 5, null, 'A resistance must be above 0.'],
    [4700, 7, null, 'No colour that all charts agree on stands for ±7 %.'], [4700, 0.05, null, 'No colour that all charts agree on stands for ±0.05 %.'], [4700, 1, 33, 'No colour stands for 33 ppm/K.'],
    [4731, 1, null, '4.731 kΩ can’t be written in three figures and a multiplier between 0.01 and 1 000 000 000.'], [473, 20, null, '473 Ω can’t be written in two figures and a multiplier between 0.01 and 1 000 000 000.'],
    [0.01, 5, null, '10 mΩ can’t be written in three figures and a multiplier between 0.01 and 1 000 000 000.'], [4700, 20, 50, '±20 % has no band of its own, so that a band for the temperature coefficient can’t follow it.'],
  ])('refuses %f Ω ±%f %%, %s: %s', (ohms, tolerance, ppm, sentence) => {
    const written = writeBands(ohms, tolerance, ppm)
    expect(!written.ok && plain(written.sentence)).toBe(sentence)
  })
  it('are read again as the value', () => {
    fc.assert(fc.property(fc.integer({ min: 10, max: 999 }), fc.integer({ min: -1, max: 8 }), fc.constantFrom(0.1, 0.25, 0.5, 1, 2, 5, 10), fc.constantFrom(null, 1, 5, 10, 15, 20, 25, 50, 100, 250), (figures, power, tolerance, ppm) => {
      const ohms = Number(`${figures}e${power}`)
      const written = writeBands(ohms, tolerance, ppm)
      if (!written.ok) return false
      const read = readBands(written.bands)
      return read.ok && read.reading.ohms === ohms && read.reading.tolerancePercent === tolerance && read.reading.ppmPerKelvin === ppm && written.bands.length in BAND_PLACES
    }))
  })
})
