import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { decadeLabel, logScale, logScaleFor, nearestMark, nextMark } from '../../../../shared/domain/log-scale'

const plain = (text: string | null): string => (text ?? '').replaceAll('\u202F', ' ')
const hertz = fc.integer({ min: 1, max: 3e12 })

describe('logScale', () => {
  const scale = logScale(20, 500_000_000)

  it('widens to whole decades and labels them', () => {
    expect([scale.lowerHz, scale.upperHz]).toEqual([10, 1e9])
    expect(scale.decades.map(tick => plain(tick.label))).toEqual(['10', '100', '1 k', '10 k', '100 k', '1 M', '10 M', '100 M', '1 G'])
    expect(scale.decades.map(tick => tick.at)).toEqual([0, 0.125, 0.25, 0.375, 0.5, 0.625, 0.75, 0.875, 1])
    expect(scale.minorTicks).toHaveLength(64)
    expect(scale.minorTicks.every(tick => tick.label === null && tick.at > 0 && tick.at < 1)).toBe(true)
  })

  it('keeps an exact decade as its edge, and has at least one decade', () => {
    expect(logScale(100_000, 10_000_000)).toMatchObject({ lowerHz: 100_000, upperHz: 10_000_000 })
    expect(logScale(455_000, 455_000)).toMatchObject({ lowerHz: 100_000, upperHz: 1_000_000 })
    expect(logScale(1_000_000, 1_000_000)).toMatchObject({ lowerHz: 1_000_000, upperHz: 10_000_000 })
  })

  it('pins DC to the left edge and what lies outside to the nearer one', () => {
    expect(scale.position(0)).toBe(0)
    expect(scale.position(1)).toBe(0)
    expect(scale.position(3e12)).toBe(1)
    expect(logScale(0, 10_000_000)).toMatchObject({ lowerHz: 10, upperHz: 10_000_000 })
  })

  it('clips the band names to the ruler', () => {
    const spans = logScale(100_000, 100_000_000).bands
    expect(spans.map(span => span.name)).toEqual(['LF', 'MF', 'HF', 'VHF'])
    expect(spans[0]).toMatchObject({ from: 0, lowerHz: 100_000 })
    expect(spans.at(-1)).toMatchObject({ to: 1, upperHz: 100_000_000 })
  })

  it('never turns back: a higher frequency stands no further left', () => {
    fc.assert(fc.property(hertz, hertz, hertz, hertz, (low, high, a, b) => {
      const ruler = logScale(Math.min(low, high), Math.max(low, high))
      const [left, right] = [ruler.position(Math.min(a, b)), ruler.position(Math.max(a, b))]
      expect(left >= 0 && left <= right && right <= 1).toBe(true)
      expect(ruler.lowerHz <= Math.min(low, high) && ruler.upperHz >= Math.max(low, high)).toBe(true)
    }))
  })

  it('finds the mark under a place, within half a step', () => {
    fc.assert(fc.property(hertz, (hz) => {
      const found = scale.frequencyAt(scale.position(hz))
      const inside = Math.min(Math.max(hz, 10), 1e9)
      expect(Math.abs(found - inside) / inside).toBeLessThanOrEqual(0.0501)
      expect(nearestMark(found)).toBe(found)
    }))
    expect(scale.frequencyAt(-1)).toBe(10)
    expect(scale.frequencyAt(2)).toBe(1e9)
  })

  it('fits a list, and has a ruler for an empty one', () => {
    expect(logScaleFor([{ lowerHz: 0, upperHz: 20_000 }, { lowerHz: 150_000, upperHz: 30_000_000 }])).toMatchObject({ lowerHz: 100_000, upperHz: 100_000_000 })
    expect(logScaleFor([{ lowerHz: 0, upperHz: 5_000_000 }])).toMatchObject({ lowerHz: 10, upperHz: 10_000_000 })
    expect(logScaleFor([{ lowerHz: 0, upperHz: 0 }])).toMatchObject({ lowerHz: 10, upperHz: 1e9 })
    expect(logScaleFor([])).toMatchObject({ lowerHz: 10, upperHz: 1e9 })
  })
})

describe('marks', () => {
  it('rounds to two significant figures', () => {
    expect(nearestMark(178_885)).toBe(180_000)
    expect(nearestMark(9_960)).toBe(10_000)
    expect(nearestMark(103_441, 3)).toBe(103_000)
    expect(nearestMark(0)).toBe(0)
  })

  it('steps by keyboard through every mark, up and down alike', () => {
    expect(nextMark(1_000_000, 'up')).toBe(1_100_000)
    expect(nextMark(1_000_000, 'down')).toBe(990_000)
    expect(nextMark(9_900_000, 'up')).toBe(10_000_000)
    expect(nextMark(455_123, 'up')).toBe(460_000)
    expect(nextMark(455_123, 'down')).toBe(450_000)
    expect(nextMark(1, 'down')).toBe(1)
    expect(nextMark(10, 'down')).toBe(9)
    expect(nextMark(5, 'up')).toBe(6)
    fc.assert(fc.property(fc.integer({ min: 10, max: 1e12 }), (hz) => {
      const mark = nearestMark(hz)
      expect(nextMark(nextMark(mark, 'up'), 'down')).toBe(mark)
      expect(nextMark(hz, 'up')).toBeGreaterThan(hz)
      expect(nextMark(hz, 'down')).toBeLessThan(hz)
    }))
  })

  it('labels decades', () => {
    expect([1, 1000, 1e5, 1e6, 1e9, 1e12].map(hz => plain(decadeLabel(hz)))).toEqual(['1', '1 k', '100 k', '1 M', '1 G', '1 T'])
  })
})
