import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DISPOSITIONS, HANDS, NATURES, REVERSIBILITIES } from '../../../../shared/domain/modifications'
import type { Grade, OriginalityEntry } from '../../../../shared/domain/originality'
import { originalityOf } from '../../../../shared/domain/originality'

/** Common practice in the trade, no source: the effect wording that can be defended. */
let last = 0
const entry = (said: Partial<OriginalityEntry> = {}): OriginalityEntry => ({
  id: String(++last), heading: `Entry ${last}`, hand: 'done_by_us', nature: null, reversibility: 're_solder', disposition: 'discarded', place: `C${last}`, ...said,
})
const grade = (entries: OriginalityEntry[], examinedInsideOn: string | null = '2026-01-01', bodyParts: string[] = []): Grade => originalityOf({ entries, bodyParts, examinedInsideOn }).grade
/** From the best a seller can say to the worst. */
const ORDER: Grade[] = ['unaltered', 'serviced', 'reversible_supplied', 'reversible_not_supplied', 'altered', 'composite']

const anyEntry = fc.record({
  hand: fc.constantFrom(...HANDS), nature: fc.option(fc.constantFrom(...NATURES)), reversibility: fc.option(fc.constantFrom(...REVERSIBILITIES)),
  disposition: fc.constantFrom(...DISPOSITIONS), place: fc.constantFrom('C1', 'Rear apron', ''),
}).map(said => entry(said.hand === 'left_alone' ? { ...said, nature: null, reversibility: null } : said))

describe('how original a piece is', () => {
  it.each<[string, OriginalityEntry[], Grade]>([
    ['nothing logged', [], 'unaltered'],
    ['left alone on purpose', [entry({ hand: 'left_alone', reversibility: null, disposition: 'nothing_removed' })], 'unaltered'],
    ['aligned', [entry({ nature: 'nothing_replaced', reversibility: 'no_trace', disposition: 'nothing_removed' })], 'serviced'],
    ['lamps renewed like for like, the old ones scrapped', [entry({ nature: 'like_for_like' })], 'serviced'],
    ['a wax capacitor replaced by film, the old one in a bag', [entry({ nature: 'substitute', disposition: 'kept_with_unit' })], 'reversible_supplied'],
    ['selenium bypassed, the stack left in place', [entry({ nature: 'substitute', disposition: 'left_in_place' })], 'reversible_supplied'],
    ['an electrolytic replaced, the old one scrapped', [entry({ nature: 'substitute' })], 'reversible_not_supplied'],
    ['an earlier hand, nobody knows what became of the parts', [entry({ hand: 'found_like_this', disposition: 'not_known' })], 'reversible_not_supplied'],
    ['an inlet that took a file, whatever it was called', [entry({ nature: 'like_for_like', reversibility: 'not_reversible' })], 'altered'],
    ['an earlier hand’s hole', [entry({ hand: 'found_like_this', reversibility: 'hole_to_fill', disposition: 'not_known' })], 'altered'],
  ])('%s', (_what, entries, expected) => {
    expect(grade(entries)).toBe(expected)
  })
  it('is a composite when its panel or case came from another piece', () => {
    const told = originalityOf({ entries: [], bodyParts: ['Front panel'], examinedInsideOn: null })
    expect(told).toMatchObject({ grade: 'composite', cautions: ['Not examined inside: there may be more.', 'From another piece: Front panel.'] })
  })
  it('says that nobody looked inside, as the grade where there is nothing else, and beside it where there is', () => {
    expect(grade([], null)).toBe('not_examined')
    expect(originalityOf({ entries: [entry({ hand: 'found_like_this', reversibility: 'hole_to_fill' })], bodyParts: [], examinedInsideOn: null }).cautions[0]).toBe('Not examined inside: there may be more.')
    expect(originalityOf({ entries: [entry()], bodyParts: [], examinedInsideOn: null }).cautions.join()).not.toContain('Not examined')
  })
  it('lets what was put back lift what was altered at the same place, and nothing else', () => {
    const hole = entry({ hand: 'found_like_this', reversibility: 'hole_to_fill', place: 'Rear apron' })
    const back = entry({ nature: 'put_back', reversibility: 'no_trace', place: 'rear apron ' })
    expect(grade([hole, back])).toBe('serviced')
    expect(grade([hole, entry({ nature: 'put_back', place: 'Front panel' })])).toBe('altered')
    const told = originalityOf({ entries: [hole, entry({ nature: 'put_back', place: '' })], bodyParts: [], examinedInsideOn: null })
    expect(told.grade).toBe('altered')
    expect(told.cautions.join()).toContain('not said where')
  })
  it('groups the entries behind it, and what can be put back', () => {
    const kept = entry({ nature: 'substitute', disposition: 'kept_with_unit' })
    const groups = Object.fromEntries(originalityOf({ entries: [kept, entry({ hand: 'left_alone', reversibility: null })], bodyParts: [], examinedInsideOn: null }).groups.map(({ key, entries }) => [key, entries.length]))
    expect(groups).toEqual({ substituted: 1, left_alone: 1, can_be_put_back: 1 })
  })
  it('does not depend on the order of the entries', () => {
    fc.assert(fc.property(fc.array(anyEntry, { maxLength: 8 }), (entries) => {
      expect(grade(entries)).toBe(grade([...entries].reverse()))
    }))
  })
  it('is never raised by an alteration more', () => {
    fc.assert(fc.property(fc.array(anyEntry, { maxLength: 8 }), (entries) => {
      const before = ORDER.indexOf(grade(entries))
      expect(ORDER.indexOf(grade([...entries, entry({ nature: 'altered', place: 'A place of its own' })]))).toBeGreaterThanOrEqual(Math.max(before, ORDER.indexOf('altered')))
    }))
  })
  it('never claims that parts are supplied when one of them was thrown away', () => {
    fc.assert(fc.property(fc.array(anyEntry, { maxLength: 8 }), (entries) => {
      expect(grade([...entries, entry({ nature: 'substitute', disposition: 'discarded', place: 'A place of its own' })])).not.toBe('reversible_supplied')
    }))
  })
})
