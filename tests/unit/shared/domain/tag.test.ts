import { mod37_36 } from 'cdigit'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  checkCharacter, endsInItsCheck, formatTag, looksLikeTag, makeTag, parseTag, readScannedText, scanProblemSentence, TAG_KINDS,
  tagProblemSentence,
} from '../../../../shared/domain/tag'

const ALPHABET = [...'0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZ']
const kinds = fc.constantFrom(...TAG_KINDS)
const numbers = fc.integer({ min: 1, max: 9_999_999 })

describe('checkCharacter, ISO/IEC 7064 MOD 37,36', () => {
  it.each([
    // Global Release Identifier example (A1-2425G-ABC1234002-M), in the test data of soundways/Iso7064-php.
    ['A12425GABC1234002', 'M'],
    ['A12425GXYZ9876008', '6'],
    ['A12425G1234567890', 'L'],
    // Public unit tests of the Global Release Identifier.
    ['A12589KCCC2586482', 'V'],
    ['A1134344343434434', '4'],
    // LiosK/cdigit, test/mod37_36.test.js.
    ['9', 'J'], ['OW', 'N'], ['1M', 'Q'], ['TBR', '1'], ['X0H', 'X'], ['RABD', 'A'], ['WP8Z0', '9'], ['H0FCZ8I', 'K'],
    ['597OF', 'S'], ['B3739U6CR', 'K'],
    // Computed with two implementations that agree.
    ['TG240001', 'L'], ['UNIT0001', 'F'],
    // Leading noughts count in this system (computed, confirmed with cdigit).
    ['0', '2'], ['00000000', 'Y'],
  ])('gives %s the check character %s', (body, check) => {
    expect(checkCharacter(body)).toBe(check)
    expect(endsInItsCheck(body + check)).toBe(true)
  })

  it('agrees with the cdigit package on random strings', () => {
    fc.assert(fc.property(fc.string({ unit: fc.constantFrom(...ALPHABET), minLength: 1, maxLength: 24 }), (body) => {
      expect(body + checkCharacter(body)).toBe(mod37_36.generate(body))
    }), { numRuns: 1000 })
  })

  it('refuses the published negative vector A12425GABC1234002N', () => {
    expect(endsInItsCheck('A12425GABC1234002N')).toBe(false)
  })

  it('has the known gap: IJ0 and JI0 both check (computed; one adjacent swap in 630 slips through)', () => {
    expect([endsInItsCheck('IJ0'), endsInItsCheck('JI0')]).toEqual([true, true])
  })

  it('refuses what has no value in the standard', () => {
    expect(() => checkCharacter('')).toThrow(RangeError)
    expect(() => checkCharacter('u1')).toThrow(RangeError)
    expect(() => checkCharacter('U-1')).toThrow(RangeError)
  })
})

describe('makeTag and formatTag', () => {
  it('makes the tags of the design', () => {
    expect(makeTag('U', 1)).toBe('U0000016')
    expect(formatTag('U0000016')).toBe('U 000001 6')
  })

  it('grows past six digits', () => {
    expect(makeTag('P', 12_345_678)).toMatch(/^P12345678[0-9A-Z]$/)
  })

  it.each([0, -1, 1.5, Number.NaN, 1e12, Infinity])('refuses the running number %s', (number) => {
    expect(() => makeTag('U', number)).toThrow(RangeError)
  })

  it('leaves other text alone when formatting', () => {
    expect(formatTag('CR-70')).toBe('CR-70')
  })
})

describe('parseTag', () => {
  it('reads every tag it makes, however it is spaced, dashed and capitalised', () => {
    const dressing = fc.array(fc.constantFrom('', ' ', '-', '  ', '\u2011', '\u2013'), { minLength: 20, maxLength: 20 })
    fc.assert(fc.property(kinds, numbers, dressing, fc.boolean(), (kind, number, between, lower) => {
      const tag = makeTag(kind, number)
      const typed = [...tag].map((character, index) => character + (between[index] ?? '')).join('')
      expect(parseTag(lower ? typed.toLowerCase() : typed)).toEqual({ ok: true, tag, kind, number })
      expect(parseTag(formatTag(tag))).toEqual({ ok: true, tag, kind, number })
    }))
  })

  const swaps: Record<string, string> = { 0: 'O', 1: 'I' }
  const back: Record<string, string> = { O: '0', I: '1' }

  it('forgives O for 0 and I for 1 in the number', () => {
    fc.assert(fc.property(kinds, numbers, (kind, number) => {
      const tag = makeTag(kind, number)
      const typed = [...tag.slice(0, -1)].map(character => swaps[character] ?? character).join('') + tag.slice(-1)
      expect(parseTag(typed)).toEqual({ ok: true, tag, kind, number })
    }), { numRuns: 500 })
  })

  it('forgives them, and the reverse, as check character of one who types letters for digits', () => {
    fc.assert(fc.property(kinds, fc.integer({ min: 1, max: 9999 }), (kind, number) => {
      const tag = makeTag(kind, number)
      const check = tag.slice(-1)
      const typed = [...tag.slice(0, -1)].map(character => swaps[character] ?? character).join('')
      expect(parseTag(typed + (swaps[check] ?? back[check] ?? check))).toEqual({ ok: true, tag, kind, number })
    }), { numRuns: 500 })
  })

  it('suggests rather than guesses when the check character alone would have to be forgiven', () => {
    // Computed: U000069 takes the check character 0, U000099 the letter O.
    expect([makeTag('U', 69), makeTag('U', 99)]).toEqual(['U0000690', 'U000099O'])
    expect(parseTag('U000069O')).toEqual({ ok: false, reason: 'ambiguous', suggestion: 'U0000690' })
    expect(parseTag('U0000990')).toEqual({ ok: false, reason: 'ambiguous', suggestion: 'U000099O' })
    expect(parseTag('UOOOO69O')).toMatchObject({ ok: true, tag: 'U0000690' })
  })

  it('never takes a tag with one wrong character for another thing: every place, every character', () => {
    const someNumbers = [1, 7, 10, 69, 99, 101, 512, 4096, 100_000, 234_569, 999_999, 1_234_567, ...Array.from({ length: 72 }, (_, index) => 2000 + index)]
    const tags = TAG_KINDS.flatMap(kind => someNumbers.map(number => makeTag(kind, number)))
    const wrong: string[] = []
    for (const tag of tags) {
      for (let at = 0; at < tag.length; at += 1) {
        for (const character of ALPHABET) {
          if (character === tag[at]) continue
          const read = parseTag(tag.slice(0, at) + character + tag.slice(at + 1))
          // O typed for 0 and I for 1 in the number are forgiven, and then give the tag itself.
          const caught = read.ok ? read.tag === tag && at < tag.length - 1 : read.reason !== 'not-a-tag'
          if (!caught) wrong.push(`${tag} with ${character} at ${at}`)
        }
      }
    }
    expect(tags.filter(tag => /[O0I1]$/.test(tag)).length).toBeGreaterThan(20)
    expect(wrong).toEqual([])
  })

  it('accepts five digits and gives the padded tag under which it is stored', () => {
    expect(parseTag(`U00042${checkCharacter('U00042')}`)).toEqual({ ok: true, tag: makeTag('U', 42), kind: 'U', number: 42 })
  })

  it.each(['', ' ', 'U', 'U1', 'U00016', 'banana', 'CR-70', 'X123456Z9', 'U000001_6', 'U0000016🙂', '0000016', 'U'.repeat(5000), `U000000${checkCharacter('U000000')}`])(
    'says that %j is not a tag', (typed) => {
      expect(parseTag(typed)).toEqual({ ok: false, reason: 'not-a-tag' })
    })

  it('names a wrong character as such', () => {
    const read = parseTag('U 000001 7')
    expect(read).toEqual({ ok: false, reason: 'one-character-off' })
    expect(tagProblemSentence('one-character-off')).toContain('One character is off')
  })

  it('has a sentence for every problem', () => {
    for (const reason of ['not-a-tag', 'one-character-off', 'ambiguous'] as const) expect(tagProblemSentence(reason)).toMatch(/\.$/)
  })
})

describe('looksLikeTag', () => {
  it.each(['U0000016', 'u 000001 7', 'K-00012-X', 'UOOOOO16'])('takes %s for a tag', (text) => {
    expect(looksLikeTag(text)).toBe(true)
  })
  it.each(['455 kc', 'CR-70', 'generator', '1234567', 'U12'])('does not take %s for a tag', (text) => {
    expect(looksLikeTag(text)).toBe(false)
  })
})

describe('readScannedText', () => {
  const found = { ok: true, tag: 'U0000016', kind: 'U', number: 1 }

  it.each([
    'U0000016', 'u0000016', ' U 000001 6\r\n',
    'https://shop.example/s/U0000016', 'HTTPS://SHOP.EXAMPLE/S/U0000016', 'https://shop.example/s/u0000016/',
    'https://shop.example/s/U0000016?from=label', 'https://shop.example/s/U%20000001%206', 'http://shop.example/stock/s/U0000016',
  ])('reads %j', (text) => {
    expect(readScannedText(text)).toEqual(found)
    expect(readScannedText(text, 'shop.example')).toEqual(found)
  })

  it('knows several hosts, with their ports', () => {
    expect(readScannedText('http://127.0.0.1:3000/s/U0000016', ['shop.example', '127.0.0.1:3000'])).toEqual(found)
  })

  it('refuses a label of another address, where the same number is another thing', () => {
    const read = readScannedText('https://elsewhere.example/s/U0000016', 'shop.example')
    expect(read).toEqual({ ok: false, reason: 'another-address', host: 'elsewhere.example' })
    if (!read.ok) expect(scanProblemSentence(read)).toContain('elsewhere.example')
  })

  it('names a wrong character in an address', () => {
    expect(readScannedText('https://shop.example/s/U0000017')).toEqual({ ok: false, reason: 'one-character-off' })
  })

  it.each(['https://shop.example/', 'https://shop.example/p/abc', 'https://', 'javascript:alert(1)', 'https://shop.example/s/%E0%A4%A', ''])(
    'finds no tag in %j', (text) => {
      expect(readScannedText(text)).toEqual({ ok: false, reason: 'not-a-tag' })
    })

  it('never throws', () => {
    fc.assert(fc.property(fc.string(), (text) => {
      readScannedText(text)
      readScannedText(`https://shop.example/s/${text}`, 'shop.example')
    }))
  })
})
