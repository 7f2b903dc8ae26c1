import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DECISION_RULES } from '../../../../shared/domain/decision'
import { QUANTITIES } from '../../../../shared/domain/reading'
import type { DraftReading, SheetDraft } from '../../../../shared/domain/sheet-draft'
import { changedKeys, draftOf, EMPTY_READING, mergeDrafts, patchOf, withFields } from '../../../../shared/domain/sheet-draft'
import { readKeptDraft } from '../../../../shared/schemas/sheet-draft'

const base = draftOf({
  testedOn: '2026-11-09', warmUpMinutes: null, supply: '', ambientCelsius: 19.5, note: '', deviations: '', decisionRule: { rule: 'guard_band', factor: 1 },
  instrumentList: [{ id: 'a' }, { id: 'b' }], drift: { label: '', quantity: 'frequency', readings: [{ minutes: 5, text: '180.2 kc' }] },
  readings: [{ position: 1, found: null, left: null, instrumentId: null, note: '' }, { position: 2, found: { text: '180 kc' }, left: null, instrumentId: 'a', note: '' }],
  checks: [{ name: 'Pilot lamp lights', result: 'not_done', note: '' }],
})
const found = (text: string): DraftReading => ({ ...EMPTY_READING, found: text })

const word = fc.constantFrom('', '98.2 kc', '1.7 Mc', 'x')
const reading: fc.Arbitrary<DraftReading> = fc.record({ found: word, left: word, instrumentId: word, note: word })
const drafts: fc.Arbitrary<SheetDraft> = fc.record({
  testedOn: word, warmUpMinutes: word, supply: word, ambientCelsius: word, note: word, deviations: word, guardFactor: word, decisionRule: fc.constantFrom(...DECISION_RULES),
  instrumentIds: fc.uniqueArray(fc.constantFrom('a', 'b', 'c')),
  readings: fc.record({ 1: reading, 2: reading }),
  checks: fc.array(fc.record({ name: word, result: fc.constantFrom('pass', 'fail', 'not_done', 'not_applicable'), note: word }), { maxLength: 2 }),
  drift: fc.record({ label: word, quantity: fc.constantFrom(...QUANTITIES), readings: fc.array(fc.record({ minutes: word, text: word }), { maxLength: 2 }) }),
})

describe('a sheet’s draft', () => {
  it('opens a saved sheet as text', () => {
    expect(base).toMatchObject({ warmUpMinutes: '', ambientCelsius: '19.5', instrumentIds: ['a', 'b'], readings: { 1: EMPTY_READING, 2: { found: '180 kc', instrumentId: 'a' } }, drift: { readings: [{ minutes: '5', text: '180.2 kc' }] } })
  })

  it('sends only what has changed', () => {
    const mine = withFields({ ...base, supply: '240 V', instrumentIds: ['b', 'a'] }, { ...base, readings: { ...base.readings, 1: { ...found('98.2'), left: '99.9' } } }, ['readings.1.found', 'readings.1.left'])
    const keys = changedKeys(base, mine)
    expect(keys).toEqual(['supply', 'readings.1.found', 'readings.1.left'])
    expect(patchOf(mine, keys)).toEqual({ supply: '240 V', readings: [{ position: 1, found: '98.2', left: '99.9' }] })
  })

  it('joins two people’s readings, and asks where both wrote the same field', () => {
    const second = base.readings[2] ?? EMPTY_READING
    const mine = { ...base, supply: '240 V', readings: { 1: found('98.2 kc'), 2: second } }
    const theirs = { ...base, supply: '230 V', note: 'Warm', readings: { 1: EMPTY_READING, 2: { ...second, found: '181 kc' } } }
    const { merged, conflicts } = mergeDrafts(base, mine, theirs)
    expect(conflicts).toEqual(['supply'])
    expect(merged).toMatchObject({ supply: '240 V', note: 'Warm', readings: { 1: { found: '98.2 kc' }, 2: { found: '181 kc', instrumentId: 'a' } } })
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

  it('takes of a kept draft only the points that the sheet still has, and new points as they are', () => {
    const kept = { ...base, readings: { 2: found('181 kc'), 9: found('9 Mc') } }
    expect(readKeptDraft(kept, base)?.readings).toEqual({ 1: EMPTY_READING, 2: found('181 kc') })
  })
})
