import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { SheetDraft } from '../../../../shared/domain/sheet-draft'
import { changedKeys, draftOf, mergeDrafts, patchOf, readKeptDraft, withFields } from '../../../../shared/domain/sheet-draft'

const base = draftOf({
  testedOn: '2026-11-09', warmUpMinutes: null, supply: '', ambientCelsius: 19.5, note: '', instrumentList: [{ id: 'a' }, { id: 'b' }],
  readings: [{ position: 1, readingText: null }, { position: 2, readingText: '180 kc' }],
  checks: [{ name: 'Pilot lamp lights', result: 'not_done', note: '' }],
})

const word = fc.constantFrom('', '98.2 kc', '1.7 Mc', 'x')
const drafts: fc.Arbitrary<SheetDraft> = fc.record({
  testedOn: word, warmUpMinutes: word, supply: word, ambientCelsius: word, note: word,
  instrumentIds: fc.uniqueArray(fc.constantFrom('a', 'b', 'c')),
  readings: fc.record({ 1: word, 2: word }),
  checks: fc.array(fc.record({ name: word, result: fc.constantFrom('pass', 'fail', 'not_done', 'not_applicable'), note: word }), { maxLength: 2 }),
})

describe('a sheet’s draft', () => {
  it('opens a saved sheet as text', () => {
    expect(base).toMatchObject({ warmUpMinutes: '', ambientCelsius: '19.5', instrumentIds: ['a', 'b'], readings: { 1: '', 2: '180 kc' } })
  })

  it('sends only what has changed', () => {
    const mine = withFields({ ...base, supply: '240 V', instrumentIds: ['b', 'a'] }, { ...base, readings: { 1: '98.2', 2: '180 kc' } }, ['readings.1'])
    const keys = changedKeys(base, mine)
    expect(keys).toEqual(['supply', 'readings.1'])
    expect(patchOf(mine, keys)).toEqual({ supply: '240 V', readings: [{ position: 1, readingText: '98.2' }] })
  })

  it('joins two people’s readings, and asks where both wrote the same field', () => {
    const mine = { ...base, supply: '240 V', readings: { 1: '98.2 kc', 2: '180 kc' } }
    const theirs = { ...base, supply: '230 V', note: 'Warm', readings: { 1: '', 2: '181 kc' } }
    const { merged, conflicts } = mergeDrafts(base, mine, theirs)
    expect(conflicts).toEqual(['supply'])
    expect(merged).toMatchObject({ supply: '240 V', note: 'Warm', readings: { 1: '98.2 kc', 2: '181 kc' } })
  })

  it('loses no word of mine in a merge, and takes theirs wherever I wrote nothing', () => {
    fc.assert(fc.property(drafts, drafts, drafts, (first, mine, theirs) => {
      const { merged } = mergeDrafts(first, mine, theirs)
      const changedByMe = changedKeys(first, mine)
      const differs = changedKeys(mine, merged)
      const fromThem = changedKeys(theirs, merged)
      return differs.every(key => !changedByMe.includes(key)) && fromThem.every(key => changedByMe.includes(key))
    }))
  })

  it('survives being kept as JSON, and refuses what is not one of its own', () => {
    fc.assert(fc.property(drafts, draft => changedKeys(draft, readKeptDraft(JSON.parse(JSON.stringify(draft)), draft) ?? base).length === 0))
    fc.assert(fc.property(fc.jsonValue(), kept => readKeptDraft(kept, base) === null))
  })
})
