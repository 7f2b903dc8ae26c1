import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { isPreferred, nearestPreferred, preferredNote, SERIES, SERIES_VALUES, seriesOfTolerance } from '../../../../../shared/domain/markings/preferred-values'

const plain = (text: string) => text.replaceAll('\u202F', ' ')
const numbers = (text: string) => text.trim().split(/\s+/).map(Number)

describe('the series of preferred values', () => {
  // An amateur-radio component page listing the IEC 60063 series.
  it('has E24 as published, and E12, E6 and E3 out of it', () => {
    expect(SERIES_VALUES.E24.map(value => value / 10)).toEqual(numbers('1.0 1.1 1.2 1.3 1.5 1.6 1.8 2.0 2.2 2.4 2.7 3.0 3.3 3.6 3.9 4.3 4.7 5.1 5.6 6.2 6.8 7.5 8.2 9.1'))
    expect(SERIES_VALUES.E12).toEqual([10, 12, 15, 18, 22, 27, 33, 39, 47, 56, 68, 82])
    expect(SERIES_VALUES.E6).toEqual([10, 15, 22, 33, 47, 68])
    expect(SERIES_VALUES.E3).toEqual([10, 22, 47])
  })
  it('has the eight values of E24 that rounding does not give', () => {
    const rounded = Array.from({ length: 24 }, (_, n) => Math.round(10 * 10 ** (n / 24)))
    const differing = SERIES_VALUES.E24.flatMap((value, n) => value === rounded[n] ? [] : [[value, rounded[n]]])
    expect(differing).toEqual([[27, 26], [30, 29], [33, 32], [36, 35], [39, 38], [43, 42], [47, 46], [82, 83]])
  })
  // The list as printed in data for IEC 60063 (E96) and in full in the public package "eseries" (E48, E192, with 920).
  it('has E96 in full', () => {
    expect(SERIES_VALUES.E96).toEqual(numbers(`100 102 105 107 110 113 115 118 121 124 127 130 133 137 140 143 147 150 154 158 162 165 169 174 178 182 187 191 196 200 205 210 215 221 226
      232 237 243 249 255 261 267 274 280 287 294 301 309 316 324 332 340 348 357 365 374 383 392 402 412 422 432 442 453 464 475 487 499 511 523 536 549 562 576 590 604 619 634 649 665
      681 698 715 732 750 768 787 806 825 845 866 887 909 931 953 976`))
  })
  it('has E192 in full, with 920', () => {
    expect(SERIES_VALUES.E192).toEqual(numbers(`100 101 102 104 105 106 107 109 110 111 113 114 115 117 118 120 121 123 124 126 127 129 130 132 133 135 137 138 140 142 143 145 147 149 150 152
      154 156 158 160 162 164 165 167 169 172 174 176 178 180 182 184 187 189 191 193 196 198 200 203 205 208 210 213 215 218 221 223 226 229 232 234 237 240 243 246 249 252 255 258 261 264
      267 271 274 277 280 284 287 291 294 298 301 305 309 312 316 320 324 328 332 336 340 344 348 352 357 361 365 370 374 379 383 388 392 397 402 407 412 417 422 427 432 437 442 448 453 459
      464 470 475 481 487 493 499 505 511 517 523 530 536 542 549 556 562 569 576 583 590 597 604 612 619 626 634 642 649 657 665 673 681 690 698 706 715 723 732 741 750 759 768 777 787 796
      806 816 825 835 845 856 866 876 887 898 909 920 931 942 953 965 976 988`))
    expect(SERIES_VALUES.E48).toEqual(SERIES_VALUES.E96.filter((_, index) => index % 2 === 0))
    expect(SERIES_VALUES.E96).toEqual(SERIES_VALUES.E192.filter((_, index) => index % 2 === 0))
  })
})

describe('the nearest preferred value', () => {
  it('is 3.3 to the square root of ten in E12', () => {
    const nearest = nearestPreferred(10 ** (6 / 12), 'E12')
    expect(nearest?.value).toBe(3.3)
    expect(nearest?.errorPercent).toBeCloseTo(4.355, 3)
  })
  it('crosses a decade', () => {
    expect(nearestPreferred(9.9, 'E12')?.value).toBe(10)
    expect(nearestPreferred(0.99e-9, 'E3')?.value).toBe(1e-9)
  })
  it.each([0, -1, Number.NaN, Number.POSITIVE_INFINITY, 1e300])('is none for %f', value => expect(nearestPreferred(value, 'E24')).toBeNull())
  it('is a value of the series, and no neighbour is nearer', () => {
    fc.assert(fc.property(fc.double({ min: 1e-12, max: 1e12, noNaN: true }), fc.constantFrom(...SERIES), (value, series) => {
      const nearest = nearestPreferred(value, series)
      if (!nearest) return false
      const all = Array.from({ length: 31 }, (_, index) => index - 16).flatMap(power => SERIES_VALUES[series].map(figure => Number(`${figure}e${power}`)))
      return isPreferred(nearest.value, series) && all.every(other => Math.abs(other - value) >= Math.abs(nearest.value - value))
    }), { numRuns: 300 })
  })
  it('leaves a preferred value of any decade where it is', () => {
    fc.assert(fc.property(fc.constantFrom(...SERIES), fc.nat(), fc.integer({ min: -12, max: 9 }), (series, at, power) => {
      const values = SERIES_VALUES[series]
      const value = (values[at % values.length] ?? 0) * 10 ** power
      expect(nearestPreferred(value, series)?.errorPercent).toBe(0)
    }))
  })
})

describe('whether a value is preferred', () => {
  it('is not in E96 for 4.7, which lies between 4.64 and 4.75', () => {
    expect(isPreferred(4.7, 'E96')).toBe(false)
    expect(isPreferred(4.7, 'E3')).toBe(true)
  })
  // Normal before about 1950: in no series. (16 µF, as normal, is in E24 and no coarser one.)
  it.each([5e3, 50e3, 8e-6, 25e-6])('is no for %f in any series', value => expect(SERIES.filter(series => isPreferred(value, series))).toEqual([]))
  it('is E24 at the coarsest for 16 µF', () => expect(SERIES.find(series => isPreferred(16e-6, series))).toBe('E24'))
  it.each([[20, 'E6'], [10, 'E12'], [5, 'E24'], [2, 'E48'], [1, 'E96'], [0.5, 'E192'], [0.1, 'E192'], [40, 'E3'], [80, 'E3']] as const)('parts of ±%f come in %s', (tolerance, series) => expect(seriesOfTolerance(tolerance)).toBe(series))
  it.each([
    [4700, 5, true, '4.7 kΩ is a preferred value of E24, the series of ±5 %.'],
    [5800, 20, false, '5.8 kΩ is not a preferred value of E6, the series of ±20 %: the nearest is 6.8 kΩ (+17 %). Parts made before about 1950 often have other values.'],
    [5100, 10, false, '5.1 kΩ is not in E12, the series of ±10 %, but in E24.'],
    [4700, 1, false, '4.7 kΩ is in E24, not in E96, the series of ±1 %. Close parts are often made in E24 values too.'],
    [1e3, 1, true, '1 kΩ is a preferred value of E96, the series of ±1 %.'],
    [5050, 1, false, '5.05 kΩ is not in E96, the series of ±1 %, but in E192.'],
  ] as const)('says of %f ±%f %%', (value, tolerance, preferred, sentence) => {
    const note = preferredNote(value, tolerance, 'resistance')
    expect([note.isPreferred, plain(note.sentence)]).toEqual([preferred, sentence])
  })
})
