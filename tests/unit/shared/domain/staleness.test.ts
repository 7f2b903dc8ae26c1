import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { SECTIONS } from '../../../../shared/domain/checkpoint'
import { HANDS } from '../../../../shared/domain/modifications'
import { PATHS, SECTION_PATHS } from '../../../../shared/domain/paths'
import type { Measured, WorkFact } from '../../../../shared/domain/staleness'
import { staleReason } from '../../../../shared/domain/staleness'

const work = (values: Partial<WorkFact>): WorkFact => ({
  id: 'w1', hand: 'done_by_us', loggedAt: '2026-11-10T10:00:00.000Z', withdrawn: false, place: 'C14', before: '0.1 µF paper', after: '0.1 µF film',
  touches: null, affectsNothingBecause: null, ...values,
})
const signedAt = '2026-11-09T16:00:00.000Z'
const why = (entry: Partial<WorkFact>, measured: readonly Measured[] | 'everything' = ['dial', 'output_level']) => staleReason(signedAt, [work(entry)], measured)?.sentence ?? null

describe('staleReason', () => {
  it('names the work that was logged after the sheet was signed, and what no longer holds', () => {
    expect(staleReason(signedAt, [work({})], ['dial', 'output_level'])).toEqual({
      workId: 'w1',
      sentence: 'Work was logged after it was signed (C14: 0.1 µF paper, now 0.1 µF film): what was measured then may have changed. Dial and output level no longer hold.',
    })
  })

  it('names the earliest of several, and what is lost to any of them', () => {
    const later = work({ id: 'w2', loggedAt: '2026-11-12T10:00:00.000Z', touches: ['output'] })
    const reason = staleReason(signedAt, [later, work({ touches: ['modulator'] })], ['dial', 'output_level', 'modulation'])
    expect(reason?.workId).toBe('w1')
    expect(reason?.sentence).toContain('Output level and modulation no longer hold.')
  })

  it('counts work at the very time of the signature as later', () => {
    expect(why({ loggedAt: signedAt })).not.toBeNull()
  })

  it.each([
    ['work logged before', { loggedAt: '2026-11-09T15:59:59.999Z' }],
    ['what an earlier hand did', { hand: 'found_like_this' }],
    ['what was left alone', { hand: 'left_alone' }],
    ['an entry withdrawn since', { withdrawn: true }],
    ['work judged to affect nothing', { affectsNothingBecause: 'A knob' }],
    ['work on nothing that is measured', { touches: ['nothing_measured'] }],
    ['work on another part', { touches: ['modulator', 'sweep'] }],
  ] as const)('lets the sheet stand after %s', (_name, entry) => {
    expect(why(entry)).toBeNull()
  })

  it('never calls an open sheet stale', () => {
    expect(staleReason(null, [work({})], 'everything')).toBeNull()
  })

  // SECTION_PATHS: an attenuator's steps do not depend on the supply; everything else does (common practice, no source).
  it('holds work against the parts that what was measured depends on', () => {
    expect(why({ touches: ['supply'] }, ['attenuator'])).toBeNull()
    expect(why({ touches: ['supply'] }, ['attenuator', 'dial'])).toContain('Dial no longer holds.')
    expect(why({ touches: ['output'] }, ['attenuator', 'dial'])).toContain('Attenuator no longer holds.')
  })

  it.each(['checks', 'warm_up'] as const)('takes %s to depend on everything', (measured) => {
    expect(why({ touches: ['sweep'] }, ['dial', measured])).toContain(measured === 'checks' ? 'Checks no longer hold.' : 'Warm-up no longer holds.')
  })

  it.each([['everything' as const], [[]]])('takes a sheet without readings to depend on everything', (measured) => {
    expect(why({ touches: ['modulator'] }, measured)).toContain('The whole sheet no longer holds.')
    expect(why({ touches: ['nothing_measured'] }, measured)).toBeNull()
  })

  it('takes nothing said as anything', () => {
    expect(why({ touches: [] }, ['attenuator'])).not.toBeNull()
    expect(why({ affectsNothingBecause: '' }, ['attenuator'])).not.toBeNull()
  })

  // An oscillator handbook of 1961: the dial holds only for the very rectifier valve it was calibrated with.
  it('says that another rectifier shifts the HT, and with it the dial', () => {
    expect(why({ place: 'SR2', before: 'Selenium stack', after: 'Silicon bridge' }))
      .toBe('A rectifier was changed after it was signed (SR2: Selenium stack, now Silicon bridge): the HT may have shifted, and with it the dial. Dial and output level no longer hold.')
    expect(why({ place: 'SR2' }, ['rail'])).toContain('the HT may have shifted, and every reading with it. Supply rails no longer hold.')
  })

  // Common practice, no source: which work moves what.
  it.each([
    ['V3', 'Original, low', 'Quernby, 96 %', 'A valve was changed'],
    ['V6 rectifier valve', 'worn', 'another', 'A rectifier was changed'],
    ['T1', 'Core cracked', 'Core from a donor', 'Its alignment was touched'],
    ['Trimmers, all bands', 'Dial low', 'Realigned', 'Its alignment was touched'],
    ['C30/C31 smoothing', '16 + 16 µF', '2 × 22 µF', 'A part of its supply was changed'],
    ['Attenuator', 'R4 high', '50 Ω 1 %', 'Its output was worked on'],
    ['Meter', 'stuck', 'movement cleaned', 'Its meter was worked on'],
    ['Meter', 'copper-oxide rectifier drifting', 'germanium', 'The rectifier of its meter was changed'],
    ['Range knob', 'Pointer missing', 'Replica', 'Work was logged'],
    ['Mains lead', 'Perished two-core cloth', 'Three-core, 3 core flex', 'Work was logged'],
    ['V4, C22', '0.01 µF waxed', '0.01 µF film in the waxed tube', 'Work was logged'],
    ['V2 valve holder', 'cracked', 'new', 'Work was logged'],
  ])('says of work on %s what it is (%s → %s): %s', (place, before, after, opening) => {
    expect(why({ place, before, after })).toMatch(new RegExp(`^${opening} after it was signed`))
  })

  it('does not say of work on one part what another could have done', () => {
    expect(why({ place: 'SR2 bracket', touches: ['output'] })).toMatch(/^Work was logged after/)
  })
})

describe('the laws of staleness', () => {
  const at = (minute: number) => new Date(Date.UTC(2026, 10, 1, 0, minute)).toISOString()
  const minute = fc.integer({ min: 0, max: 2000 })
  const entry: fc.Arbitrary<WorkFact> = fc.record({
    id: fc.uuid(), hand: fc.constantFrom(...HANDS), loggedAt: minute.map(at), withdrawn: fc.boolean(),
    place: fc.constantFrom('', 'SR2', 'V3', 'C14'), before: fc.string(), after: fc.constantFrom('', 'rectifier', 'trimmer', 'knob'),
    touches: fc.option(fc.subarray([...PATHS])), affectsNothingBecause: fc.option(fc.constantFrom('', 'A lamp')),
  })
  const log = fc.array(entry, { maxLength: 8 })
  const measured = fc.oneof(fc.constant('everything' as const), fc.subarray<Measured>([...SECTIONS, 'checks', 'warm_up']))
  const check = (law: (signed: string, entries: WorkFact[], what: readonly Measured[] | 'everything', extra: WorkFact) => void) =>
    fc.assert(fc.property(minute.map(at), log, measured, entry, law))

  it('never goes stale by work before the signature, withdrawn, judged to affect nothing, or not ours', () => {
    check((signed, entries, what) => {
      const harmless = entries.filter(each => each.loggedAt < signed || each.withdrawn || each.affectsNothingBecause || each.hand !== 'done_by_us')
      expect(staleReason(signed, harmless, what)).toBeNull()
    })
  })

  it('goes stale by any later work of ours of which nothing was said, whatever its words', () => {
    check((signed, entries, what, extra) => {
      const blunt = { ...extra, hand: 'done_by_us' as const, loggedAt: signed, withdrawn: false, touches: null, affectsNothingBecause: null }
      expect(staleReason(signed, [...entries, blunt], what)).not.toBeNull()
    })
  })

  it('never becomes fresh by more work, by measuring more or by saying less of what was touched', () => {
    check((signed, entries, what, extra) => {
      if (staleReason(signed, entries, what) === null) return
      expect(staleReason(signed, [extra, ...entries], what)).not.toBeNull()
      if (what !== 'everything' && what.length > 0) expect(staleReason(signed, entries, [...what, 'vertical'])).not.toBeNull()
      expect(staleReason(signed, entries, 'everything')).not.toBeNull()
      expect(staleReason(signed, entries.map(each => ({ ...each, touches: null })), what)).not.toBeNull()
    })
  })

  it('does not depend on the order of the log, nor its staleness on the words', () => {
    check((signed, entries, what) => {
      const reason = staleReason(signed, entries, what)
      expect(staleReason(signed, [...entries].reverse(), what) === null).toBe(reason === null)
      expect(staleReason(signed, entries.map(each => ({ ...each, place: '', before: '', after: 'x' })), what)?.workId).toBe(reason?.workId)
    })
  })

  it('names work of ours, logged later, that meets what was measured', () => {
    check((signed, entries, what) => {
      const named = entries.find(({ id }) => id === staleReason(signed, entries, what)?.workId)
      if (!named || what === 'everything' || what.length === 0 || !named.touches?.length) return
      const parts = what.flatMap(each => each === 'checks' || each === 'warm_up' ? [...PATHS] : [...SECTION_PATHS[each]])
      expect(named.touches.some(path => path !== 'nothing_measured' && parts.includes(path))).toBe(true)
    })
  })
})
