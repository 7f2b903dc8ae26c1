import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readMicaDots } from '../../../../../shared/domain/markings/mica-dots'
import type { Colour } from '../../../../../shared/domain/markings/resistor-colours'
import { COLOURS } from '../../../../../shared/domain/markings/resistor-colours'

const read = (...dots: Colour[]) => {
  const result = readMicaDots(dots)
  return result.ok ? result.readings.map(({ code, dielectric, farads, tolerancePercent, volts }) => [code, dielectric, farads, tolerancePercent, volts]) : result.sentence
}

describe('the dots of old capacitors', () => {
  // US Army ordnance subcourse OD1647: type white, brown, red, multiplier red is 1200 pF of mica. Its tolerance dot is doubtful and not read.
  it('reads a white type dot, and the other code it may be', () => {
    expect(read('white', 'brown', 'red', 'red', 'blue', 'black')).toEqual([['type-dot', 'mica', 1200e-12, null, null], ['three-figures', null, 91_200e-12, null, null]])
  })
  // A reading of 2013 citing a 1940s handbook: 51 pF. A first figure is never black, so that there is no other code.
  it('reads a black type dot in one way only', () => {
    expect(read('black', 'green', 'brown', 'black', 'yellow', 'red')).toEqual([['type-dot', 'mica', 51e-12, null, null]])
  })
  it('tells paper by a silver dot', () => expect(read('silver', 'brown', 'black', 'orange', 'silver', 'red')).toEqual([['type-dot', 'paper', 10_000e-12, null, null]]))
  // A published chart of moulded-mica codes: red, green, black is 25 µµF; without further dots 500 V and ±20 %.
  it('reads three dots', () => expect(read('red', 'green', 'black')).toEqual([['three-dots', null, 25e-12, 20, 500]]))
  it('leaves the voltage and tolerance of five dots unread', () => expect(read('red', 'green', 'brown', 'green', 'silver')).toEqual([['five-dots', null, 250e-12, null, null]]))
  it('refuses what gives no value', () => {
    expect(read('black', 'green', 'brown')).toContain('a first figure is never black')
    expect(read('gold', 'green', 'brown', 'red', 'red', 'red')).toContain('These dots give no value')
    expect(read('red', 'green')).toBe('Three, five and six dots can be read, not 2.')
    expect(read('red', 'red', 'red', 'red')).toBe('Three, five and six dots can be read, not 4.')
  })
  it('never gives nought, and never more than two readings', () => {
    fc.assert(fc.property(fc.array(fc.constantFrom(...COLOURS), { maxLength: 7 }), (dots) => {
      const result = readMicaDots(dots)
      return !result.ok || (result.readings.length <= 2 && result.readings.every(({ farads }) => farads > 0))
    }))
  })
})
