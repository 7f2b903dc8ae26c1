import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { stepWedge, WEDGE_IDLE } from '../../../../shared/domain/wedge'
import type { WedgeKey } from '../../../../shared/domain/wedge'

/** Types `text` with a pause of `gaps` ms before each key, then Enter; gives every burst that was seen. */
function type(text: string, gapBefore: (index: number) => number, more: { shift?: boolean, enterAfter?: number } = {}): (string | null)[] {
  let state = WEDGE_IDLE
  let at = 1000
  const bursts: (string | null)[] = []
  const press = (key: WedgeKey) => {
    const step = stepWedge(state, key)
    state = step.state
    bursts.push(step.burst)
  }
  Array.from(text).forEach((character, index) => {
    at += gapBefore(index)
    if (more.shift) press({ kind: 'modifier', at })
    press({ kind: 'character', character, at })
  })
  at += more.enterAfter ?? gapBefore(text.length)
  press({ kind: 'enter', at })
  return bursts.filter(burst => burst !== null)
}

describe('a hand scanner that types', () => {
  it.each([1, 5, 15, 30])('is known by keys %d ms apart that end in Enter', (gap) => {
    expect(type('U0000016', () => gap)).toEqual(['U0000016'])
    expect(type('HTTP://SHOP.INVALID/S/U0000016', () => gap, { shift: true })).toEqual(['HTTP://SHOP.INVALID/S/U0000016'])
  })

  it('is never taken for a person, however fast: 60 ms is 200 words a minute', () => {
    fc.assert(fc.property(fc.array(fc.integer({ min: 60, max: 400 }), { minLength: 9, maxLength: 9 }), (gaps) => {
      expect(type('U0000016', index => gaps[index] ?? 60)).toEqual([])
    }))
  })

  it('allows a person two keys struck at once', () => {
    expect(type('U0000016', index => index % 2 === 0 ? 5 : 90)).toEqual([])
    expect(type('U0000016', () => 45)).toEqual([])
  })

  it('leaves out what was typed by hand before', () => {
    expect(type('xyU0000016', index => index === 2 ? 300 : index < 2 ? 120 : 4)).toEqual(['U0000016'])
  })

  it('needs Enter at once, and enough keys', () => {
    expect(type('U0000016', () => 5, { enterAfter: 400 })).toEqual([])
    expect(type('U00016', () => 5)).toEqual([])
    expect(type('', () => 5)).toEqual([])
  })

  it('forgets on any other key, and marks where a burst begins', () => {
    const first = stepWedge(WEDGE_IDLE, { kind: 'character', character: 'U', at: 10 })
    expect(first.begins).toBe(true)
    expect(stepWedge(first.state, { kind: 'character', character: '0', at: 15 }).begins).toBe(false)
    expect(stepWedge(first.state, { kind: 'character', character: '0', at: 99 }).begins).toBe(true)
    expect(stepWedge(first.state, { kind: 'other', at: 12 }).state).toEqual(WEDGE_IDLE)
  })

  it('keeps at most a few hundred characters of a held key', () => {
    let state = WEDGE_IDLE
    for (let at = 0; at < 20_000; at += 20) state = stepWedge(state, { kind: 'character', character: 'a', at }).state
    expect(state.text.length).toBeLessThanOrEqual(300)
  })
})
