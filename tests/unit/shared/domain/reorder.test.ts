import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { COUNTED_IN } from '../../../../shared/domain/part-quantity'
import { costOfOneInWords, reorderCsv } from '../../../../shared/domain/reorder'

const type = { description: 'Suppression capacitor X2', value: '0.1 µF', tolerance: '±10 %', rating: '275 V AC', package: '', countedIn: 'piece' as const }
const line = { type, inStock: 3, minimum: 10, short: 7, lastSupplier: 'Distributor A', lastBought: { quantity: 10, costMinor: 1250, currency: 'GBP' } }
const everything = { names: true, costs: true }

describe('what one cost', () => {
  it.each([
    [{ quantity: 10, costMinor: 1250, currency: 'GBP' }, 'piece', '£1.25 each'],
    [{ quantity: 1000, costMinor: 1250, currency: 'GBP' }, 'piece', '£0.0125 each'],
    [{ quantity: 3, costMinor: 1000, currency: 'GBP' }, 'pair', '£3.3333 a pair'],
    [{ quantity: 25_000, costMinor: 3000, currency: 'EUR' }, 'millimetre', '€1.20 a metre'],
    [{ quantity: 4, costMinor: 500, currency: 'JPY' }, 'set', 'JP¥125 a set'],
  ] as const)('%o in %ss is %s', (bought, countedIn, words) => {
    expect(costOfOneInWords(bought, countedIn)).toBe(words)
  })
})

describe('the list as CSV', () => {
  it('has a line of headings and one for each part, ended as RFC 4180 has it', () => {
    expect(reorderCsv([line, { ...line, type: { ...type, description: 'Wire, tinned', countedIn: 'millimetre' }, inStock: 1500, minimum: 10_000, short: 8500, lastSupplier: null, lastBought: null }], everything)).toBe(
      'Part,Value,Tolerance,Rating,Package,In stock,Minimum,Short,Counted in,Last supplier,Last cost of one,Currency\r\n'
      + 'Suppression capacitor X2,0.1 µF,±10 %,275 V AC,,3,10,7,Pieces,Distributor A,1.2500,GBP\r\n'
      + '"Wire, tinned",0.1 µF,±10 %,275 V AC,,1.5,10,8.5,Metres,,,\r\n',
    )
  })

  it('leaves out whole columns that the reader may not see', () => {
    const csv = reorderCsv([line], { names: false, costs: false })
    expect(csv).not.toContain('Distributor')
    expect(csv).not.toContain('1.25')
    expect(csv).toMatch(/^Part,.*,Counted in\r\n/u)
  })

  it('keeps a word a word where a spreadsheet would take it for a formula', () => {
    expect(reorderCsv([{ ...line, type: { ...type, value: '=1+1' } }], everything)).toContain(`,'=1+1,`)
  })

  /** A reader after RFC 4180, section 2, and nothing else. */
  function readCsv(text: string): string[][] {
    const cells = [...text.matchAll(/(?:"((?:[^"]|"")*)"|([^",\r\n]*))(,|\r\n)/gu)]
    const rows: string[][] = [[]]
    for (const [, inQuotes, bare = '', end] of cells) {
      rows.at(-1)?.push(inQuotes === undefined ? bare : inQuotes.replaceAll('""', '"'))
      if (end === '\r\n') rows.push([])
    }
    return rows.slice(0, -1)
  }

  it('can be read back, whatever the words are', () => {
    const words = fc.string({ unit: fc.constantFrom('a', '"', ',', '\n', '\r', ' ', 'µ', ';') })
    fc.assert(fc.property(fc.array(fc.record({ description: words, value: words, lastSupplier: words, countedIn: fc.constantFrom(...COUNTED_IN) }), { maxLength: 5 }), (said) => {
      const rows = readCsv(reorderCsv(said.map(({ lastSupplier, ...of }) => ({ ...line, lastSupplier, type: { ...type, ...of } })), everything))
      expect(rows.slice(1).map(row => [row[0], row[1], row[9]])).toEqual(said.map(each => [each.description, each.value, each.lastSupplier]))
    }))
  })
})
