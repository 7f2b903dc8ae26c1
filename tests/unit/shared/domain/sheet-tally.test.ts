import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { dialCheckpoint } from '../../../../shared/domain/dial-check'
import { evaluateReading } from '../../../../shared/domain/evaluation'
import type { Result } from '../../../../shared/domain/evaluation'
import { outsideCount, standing, tallyInWords, tallyOf, withinCount } from '../../../../shared/domain/sheet-tally'
import { makeCapability } from '../../../support/bench'

/** A wavemeter good to ±1 %: at 100 kHz U is 0.95 kHz, against limits of ±2 kHz. */
const wavemeter = { id: 'wavemeter', name: 'Wavemeter', yearsSinceCalibration: 0, capabilities: [makeCapability({ quantity: 'frequency', lower: 10, upper: 100e6, percentOfReading: 1 })] }
const dial = dialCheckpoint('A', 100_000, 2)

function taken(typed: string, limited = true): { result: Result } {
  const evaluated = evaluateReading(typed, limited ? dial : { ...dial, limit: null }, [wavemeter], null, { rule: 'guard_band', factor: 1 })
  if (!evaluated.ok) throw new Error(evaluated.sentence)
  return evaluated
}
const READ = { pass: taken('100.3 kc'), conditional: taken('101.9 kc'), doubtful: taken('102.1 kc'), fail: taken('105 kc'), unjudged: taken('100 kc', false) }
const found = (result: { result: Result } | null) => ({ found: result, left: null })
const tallied = (...results: ({ result: Result } | null)[]) => tallyOf(results.map(found))

describe('the tally of a sheet', () => {
  it('counts each verdict, what has no limit, and what was not read', () => {
    expect(tallied(READ.pass, READ.pass, READ.conditional, READ.doubtful, READ.fail, READ.unjudged, null))
      .toEqual({ points: 7, read: 6, pass: 2, conditionalPass: 1, conditionalFail: 1, fail: 1, unjudged: 1 })
  })
  it('counts what was left, not what was found, where it was adjusted', () => {
    expect(standing({ found: READ.fail, left: READ.pass })).toBe(READ.pass)
    expect(tallyOf([{ found: READ.fail, left: READ.pass }, { found: null, left: READ.conditional }])).toMatchObject({ read: 2, pass: 1, conditionalPass: 1, fail: 0 })
  })
  it('loses and invents no reading, and takes no account of their order', () => {
    const readings = fc.array(fc.record({ found: fc.constantFrom(null, ...Object.values(READ)), left: fc.constantFrom(null, ...Object.values(READ)) }))
    fc.assert(fc.property(readings, (list) => {
      const tally = tallyOf(list)
      expect(tally.points).toBe(list.length)
      expect(tally.read).toBe(list.filter(({ found, left }) => found !== null || left !== null).length)
      expect(withinCount(tally) + outsideCount(tally) + tally.unjudged).toBe(tally.read)
      expect(tallyOf([...list].reverse())).toEqual(tally)
    }))
  })
})

describe('the tally in words', () => {
  it.each([
    [tallied(), ''],
    [tallied(READ.pass), '1 reading, none out'],
    [tallied(READ.pass, READ.pass), '2 readings, none out'],
    [tallied(READ.pass, READ.conditional), '2 readings, none out, 1 in but too near the limit to be certain'],
    [tallied(READ.fail, READ.doubtful, READ.pass), '2 of 3 readings out'],
    [tallied(READ.unjudged), '1 without a limit'],
    [tallied(null, null), '2 of 2 not read'],
    [tallied(READ.fail, READ.conditional, READ.unjudged, null), '1 of 2 readings out, 1 in but too near the limit to be certain, 1 without a limit, 1 of 4 not read'],
  ])('%j', (tally, words) => {
    expect(tallyInWords(tally)).toBe(words)
  })
})
