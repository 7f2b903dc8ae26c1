import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { adviseAlignment, fitAlignment } from '../../../../shared/domain/alignment-advisor'
import { seeded } from '../../../../scripts/demo/pictures/primitives'

/**
 * An oscillator as physics has it: f = 1/(2π√(LC)). At each mark of the dial the gang with its trimmer makes the capacitance
 * that gives the marked frequency with L0; then L is off by a share, and a capacitance is added to the trimmer.
 */
function oscillator(topHz: number, span: number, count: number, inductance: number, trimmerAtTop: number) {
  const L0 = 100e-6
  const capacitanceFor = (hz: number) => 1 / ((2 * Math.PI * hz) ** 2 * L0)
  const added = trimmerAtTop * capacitanceFor(topHz)
  return Array.from({ length: count }, (_, index) => {
    const settingHz = topHz / span * span ** (index / (count - 1))
    const readingHz = 1 / (2 * Math.PI * Math.sqrt(L0 * (1 + inductance) * (capacitanceFor(settingHz) + added)))
    return { settingHz, readingHz }
  })
}

describe('the alignment advisor', () => {
  it.each([
    [0.05, 0], [-0.05, 0], [0, 0.08], [0, -0.06], [0.04, 0.06], [0.06, -0.1], [-0.03, 0.12], [0.1, 0.2],
  ])('finds an inductance off by %f and a trimmer off by %f again, within a hundredth', (inductance, trimmer) => {
    const fit = fitAlignment(oscillator(3.2e6, 3.2, 7, inductance, trimmer))
    expect(fit?.inductance).toBeCloseTo(inductance, 10)
    expect(fit?.trimmer).toBeCloseTo(trimmer, 10)
    expect(Math.abs((fit?.inductance ?? 1) - inductance)).toBeLessThanOrEqual(Math.abs(inductance) * 0.01 + 1e-9)
    expect(Math.abs((fit?.trimmer ?? 1) - trimmer)).toBeLessThanOrEqual(Math.abs(trimmer) * 0.01 + 1e-9)
  })

  it('still finds them within 1 % through readings rounded to five figures, as a counter shows them', () => {
    const read = oscillator(3.2e6, 3.2, 9, 0.05, 0.08).map(point => ({ ...point, readingHz: Number(point.readingHz.toPrecision(6)) }))
    const fit = fitAlignment(read)
    expect(Math.abs((fit?.inductance ?? 1) - 0.05)).toBeLessThan(0.0005)
    expect(Math.abs((fit?.trimmer ?? 1) - 0.08)).toBeLessThan(0.0008)
  })

  it('agrees to first order with e = a + b·f², a = −λ/2 and b = −γ/2 at the top', () => {
    const fit = fitAlignment(oscillator(1e6, 3, 7, 0.002, 0.002))
    expect(fit?.inductancePercent).toBeCloseTo(-0.1, 3)
    expect(fit?.trimmerPercent).toBeCloseTo(-0.1, 3)
  })

  it('says what to turn first and which way', () => {
    const high = adviseAlignment(oscillator(3.2e6, 3.2, 7, -0.06, -0.08), 1)
    expect(high.kind === 'advice' && high.sentences[0]).toMatch(/^First, at the low end: the whole band reads 3\.14.% high: a little more inductance \(an iron core in/)
    expect(high.kind === 'advice' && high.sentences[1]).toMatch(/^Then, at the high end: the top reads a further .* high: more trimmer/)
    const low = adviseAlignment(oscillator(3.2e6, 3.2, 7, 0, 0.1), 1)
    expect(low.kind === 'advice' && low.sentences.slice(0, 2)).toEqual(['Leave the core alone: the low end is right.', expect.stringMatching(/^Only, at the high end: .* low: less trimmer/)])
  })

  it('keeps its hands off what is within the tolerance, and off too few points', () => {
    expect(adviseAlignment(oscillator(3.2e6, 3.2, 7, 0.02, 0.01), 2)).toMatchObject({ kind: 'no_advice', sentence: expect.stringContaining('leave it alone') })
    expect(adviseAlignment(oscillator(3.2e6, 3.2, 3, 0.2, 0.1), 2)).toMatchObject({ kind: 'no_advice', sentence: expect.stringContaining('at least 4 points') })
    expect(adviseAlignment(Array.from({ length: 5 }, () => ({ settingHz: 1e6, readingHz: 1.1e6 })), 2)).toMatchObject({ kind: 'no_advice' })
  })

  it('refuses to advise on errors that only scatter: fewer than one in a hundred of a thousand random bands', () => {
    let advised = 0
    for (let seed = 0; seed < 1000; seed += 1) {
      const random = seeded(`scatter ${seed}`)
      const normal = () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random())
      const count = 4 + seed % 6
      const points = Array.from({ length: count }, (_, index) => {
        const settingHz = 1e6 * 3 ** (index / (count - 1))
        return { settingHz, readingHz: settingHz * (1 + 0.02 * normal()) }
      })
      if (adviseAlignment(points, 1).kind === 'advice') advised += 1
    }
    expect(advised).toBeLessThan(10)
  })

  it('never throws and never promises to leave more than it found, whatever is read', () => {
    const points = fc.array(fc.record({ settingHz: fc.double({ min: 1e3, max: 1e8, noNaN: true }), readingHz: fc.double({ min: 1e3, max: 1e8, noNaN: true }) }), { maxLength: 12 })
    fc.assert(fc.property(points, (read) => {
      const advice = adviseAlignment(read, 2)
      if (advice.kind === 'advice') expect(advice.fit.remainingPercent).toBeLessThanOrEqual(advice.fit.worstPercent)
    }))
  })
})
