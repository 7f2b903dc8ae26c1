import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { Colour } from '../../../../../shared/domain/markings/resistor-colours'
import { COLOURS, readBands, readBodyEndDot, resistorWords } from '../../../../../shared/domain/markings/resistor-colours'

const plain = (text: string) => text.replaceAll('\u202F', ' ')
const isColour = (word: string): word is Colour => COLOURS.some(colour => colour === word)
const colours = (words: string): Colour[] => words.split(' ').filter(isColour)
const readWords = (words: string): string => {
  const read = readBands(colours(words))
  return plain(read.ok ? resistorWords(read.reading) : read.sentence)
}

describe('reading the bands of a resistor', () => {
  it.each([
    // A magazine's RETMA chart of 1956.
    ['green grey red', '5.8 kΩ ±20 %'], ['green grey red silver', '5.8 kΩ ±10 %'],
    // Worked out from the table of IEC 60062.
    ['yellow violet red gold', '4.7 kΩ ±5 %'], ['brown black black', '10 Ω ±20 %'], ['yellow violet black brown brown', '4.7 kΩ ±1 %'],
    ['orange orange black gold brown', '33 Ω ±1 %'], ['brown black black red brown red', '10 kΩ ±1 %, 50 ppm/K'], ['yellow violet silver gold', '470 mΩ ±5 %'],
    ['white white white gold', '99 GΩ ±5 %'],
  ])('%s is %s', (words, expected) => expect(readWords(words)).toBe(expected))

  it.each([
    ['gold violet red yellow gold', 'Band 1 can’t be gold: it is a figure of the value, and gold stands for none.'],
    ['black violet red gold', 'Band 1 can’t be black: no value begins with 0.'],
    ['yellow violet red white', 'Band 4 can’t be white: it gives the tolerance, and white stands for none. Read from the other end it is 920 MΩ ±0.02 %.'],
    ['brown black black red brown gold', 'Band 6 can’t be gold: it gives the temperature coefficient, and gold stands for none.'],
    ['gold red violet yellow', 'Band 1 can’t be gold: it is a figure of the value, and gold stands for none. Read from the other end it is 4.7 kΩ ±5 %.'],
    ['brown red', 'A resistor has three to six bands. Give all of them, not 2.'],
    ['black', 'One black band marks a bridge of 0 Ω, not a value.'],
  ])('refuses %s: %s', (words, sentence) => expect(readWords(words)).toBe(sentence))

  it('gives the reading from the other end where there is one', () => {
    const read = readBands(colours('brown black black red brown'))
    expect(read.ok && read.otherEnd && plain(resistorWords(read.otherEnd))).toBe('120 Ω ±1 %')
    const gold = readBands(colours('yellow violet red gold'))
    expect(gold.otherEnd).toBeNull()
    expect(readBands(colours('brown red brown')).otherEnd).toBeNull()
  })

  it('notes whether the value is one of its series', () => {
    const read = (words: string) => {
      const bands = readBands(colours(words))
      return bands.ok && bands.reading.preferred
    }
    expect(read('yellow violet red gold')).toMatchObject({ isPreferred: true, series: 'E24' })
    expect(read('green grey red')).toMatchObject({ isPreferred: false, series: 'E6' })
  })

  it('notes the tolerance colours the editions differ on, and no others', () => {
    const noted = COLOURS.filter((colour) => {
      const read = readBands(['red', 'red', 'red', colour])
      return read.ok && read.reading.notes.length > 0
    })
    expect(noted).toEqual(['orange', 'yellow', 'grey'])
  })

  it('reads the other end of the bands as the bands turned round', () => {
    fc.assert(fc.property(fc.array(fc.constantFrom(...COLOURS), { minLength: 3, maxLength: 6 }), (bands) => {
      const read = readBands(bands)
      const turned = readBands([...bands].reverse())
      const isSame = bands.join() === [...bands].reverse().join()
      expect(turned.ok ? turned.reading : null).toEqual(isSame && read.ok ? read.reading : read.otherEnd)
    }))
  })
})

describe('the old body–end–dot marking', () => {
  // RETMA, 1956: body green, end grey, dot red.
  it('is read in that order', () => {
    const read = readBodyEndDot('green', 'grey', 'red', null)
    expect(read.ok && plain(resistorWords(read.reading))).toBe('5.8 kΩ ±20 %')
    const close = readBodyEndDot('green', 'grey', 'red', 'gold')
    expect(close.ok && close.reading.tolerancePercent).toBe(5)
  })
  it('names the place that is wrong', () => {
    const read = readBodyEndDot('gold', 'grey', 'red', null)
    expect(!read.ok && read.sentence).toBe('The body can’t be gold: it is a figure of the value, and gold stands for none.')
    const last = readBodyEndDot('green', 'grey', 'red', 'black')
    expect(!last.ok && last.sentence).toMatch(/^The other end can’t be black/)
  })
})
