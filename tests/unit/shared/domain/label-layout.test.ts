import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { encodeBars, encodeLabel, labelUrl } from '../../../../server/utils/label-codes'
import type { LabelContent, LabelDrawing, LabelMark, MeasureText } from '../../../../shared/domain/label-layout'
import { layOutLabel } from '../../../../shared/domain/label-layout'
import { LABEL_SHEETS } from '../../../../shared/domain/label-stock'
import type { Rect } from '../../../../shared/domain/label-symbols'
import { BAR_MODULE_LEAST, moduleWithin, QR_MODULE_LEAST } from '../../../../shared/domain/label-symbols'
import { cutToFit } from '../../../../shared/domain/label-words'
import { formatTag, makeTag, TAG_KINDS } from '../../../../shared/domain/tag'

/** Wide letters: no face of the product's is wider on average. */
const measure: MeasureText = (text, weight, size) => Array.from(text).length * size * (weight === 700 ? 0.72 : 0.66)

const band = fc.tuple(fc.integer({ min: 0, max: 3e9 }), fc.integer({ min: 1, max: 3e9 }), fc.constantFrom('generates' as const, 'tunes' as const, 'measures' as const))
  .map(([a, b, does]) => ({ label: 'A', function: does, lowerHz: Math.min(a, b), upperHz: Math.max(a, b) }))

const anyContent: fc.Arbitrary<LabelContent> = fc.record({
  kind: fc.constantFrom(...TAG_KINDS),
  number: fc.integer({ min: 1, max: 99_999_999 }),
  host: fc.constantFrom('http://127.0.0.1:3000', 'https://knurl.example.org', 'https://stock.a-rather-long-name-for-a-shop.example.org:8443/knurl'),
  title: fc.string({ maxLength: 120, unit: 'grapheme' }),
  subtitle: fc.string({ maxLength: 120, unit: 'grapheme' }),
  bands: fc.option(fc.array(band, { maxLength: 9 })),
  hazardHold: fc.boolean(),
}).map(({ kind, number, host, ...rest }) => {
  const tag = makeTag(kind, number)
  return { ...rest, tag: formatTag(tag), codes: encodeLabel(labelUrl(host, tag), tag) }
})

const anySize = fc.oneof(
  fc.constantFrom(...LABEL_SHEETS).map(({ width, height }) => ({ width, height })),
  fc.record({ width: fc.double({ min: 10, max: 200, noNaN: true }), height: fc.double({ min: 8, max: 150, noNaN: true }) }),
)

function boundsOf(mark: LabelMark): Rect {
  if (mark.kind === 'text') return [mark.x, mark.y - mark.size * 0.76, mark.width, mark.size * 0.98]
  const corners = mark.kind === 'rects' ? mark.rects.flatMap(([x, y, w, h]) => [[x, y] as const, [x + w, y + h] as const]) : mark.points
  const xs = corners.map(([x]) => x)
  const ys = corners.map(([, y]) => y)
  return [Math.min(...xs), Math.min(...ys), Math.max(...xs) - Math.min(...xs), Math.max(...ys) - Math.min(...ys)]
}

const overlap = (a: Rect, b: Rect) =>
  a[0] < b[0] + b[2] - 0.001 && b[0] < a[0] + a[2] - 0.001 && a[1] < b[1] + b[3] - 0.001 && b[1] < a[1] + a[3] - 0.001
const inside = (inner: Rect, [width, height]: [number, number]) =>
  inner[0] >= -0.001 && inner[1] >= -0.001 && inner[0] + inner[2] <= width + 0.001 && inner[1] + inner[3] <= height + 0.001

/** The QR code comes first, then the bars if there are any, then everything else. */
function partsOf(drawing: LabelDrawing): { qr: LabelMark | undefined, bars: LabelMark | undefined, words: LabelMark[] } {
  const [qr, second, ...rest] = drawing.marks
  return drawing.bars ? { qr, bars: second, words: rest } : { qr, bars: undefined, words: second ? [second, ...rest] : [] }
}

describe('the layout of a label', () => {
  it('puts nothing into a quiet zone and nothing off the label, whatever it says and however large it is', () => {
    fc.assert(fc.property(anySize, anyContent, (size, content) => {
      const layout = layOutLabel(size, content, measure)
      if (!layout.ok) return
      const { drawing } = layout
      const { qr, bars, words } = partsOf(drawing)
      const zones = [drawing.qr.zone, ...drawing.bars ? [drawing.bars.zone] : []]
      for (const zone of zones) expect(inside(zone, [size.width, size.height])).toBe(true)
      for (const word of words) {
        const bounds = boundsOf(word)
        expect(inside(bounds, [size.width, size.height]), JSON.stringify([word, size])).toBe(true)
        for (const zone of zones) expect(overlap(bounds, zone), JSON.stringify([word, zone])).toBe(false)
      }
      // The two blank zones may share paper; neither symbol's ink may stand in the other's.
      if (qr && bars && drawing.bars) {
        expect(overlap(boundsOf(bars), drawing.qr.zone)).toBe(false)
        expect(overlap(boundsOf(qr), drawing.bars.zone)).toBe(false)
      }
    }), { numRuns: 300 })
  })

  it('never prints a module narrower than scanners read, and keeps the whole quiet zone', () => {
    fc.assert(fc.property(anySize, anyContent, (size, content) => {
      const layout = layOutLabel(size, content, measure)
      if (!layout.ok) return
      const { qr, bars } = layout.drawing
      expect(qr.module).toBeGreaterThanOrEqual(QR_MODULE_LEAST - 1e-9)
      const side = content.codes.qr.find(symbol => symbol.level === qr.level)?.side ?? 0
      expect(qr.zone[2]).toBeCloseTo((side + 8) * qr.module, 6)
      if (!bars) return
      expect(bars.module).toBeGreaterThanOrEqual(BAR_MODULE_LEAST - 1e-9)
      expect(bars.zone[2]).toBeCloseTo((content.codes.bars.length + 20) * bars.module, 6)
      expect(bars.zone[3]).toBeGreaterThanOrEqual(5 - 1e-9)
    }))
  })

  it('says the size that a label too small would need, and that size does', () => {
    fc.assert(fc.property(fc.record({ width: fc.double({ min: 5, max: 40, noNaN: true }), height: fc.double({ min: 5, max: 20, noNaN: true }) }), anyContent, (size, content) => {
      const layout = layOutLabel(size, content, measure)
      if (layout.ok) return
      expect(size.width < layout.needs.width || size.height < layout.needs.height).toBe(true)
      expect(layOutLabel(layout.needs, content, measure).ok).toBe(true)
    }))
  })

  it('always shows the tag whole, and the hold where there is one', () => {
    fc.assert(fc.property(anySize, anyContent, (size, content) => {
      const layout = layOutLabel(size, content, measure)
      if (!layout.ok) return
      const texts = layout.drawing.marks.flatMap(mark => mark.kind === 'text' ? [mark.text] : [])
      expect(texts).toContain(content.tag)
      expect(texts.some(text => text.includes('HOLD'))).toBe(content.hazardHold || content.title.includes('HOLD') || content.subtitle.includes('HOLD'))
    }))
  })

  it('fits both codes on every sheet but the one of 35.6 × 16.9 mm, for an ordinary address', () => {
    const tag = makeTag('U', 16)
    const content: LabelContent = {
      tag: formatTag(tag), title: 'Oxmarden 307-G', subtitle: '', bands: null, hazardHold: false, codes: encodeLabel(labelUrl('https://knurl.example.org', tag), tag),
    }
    const without = LABEL_SHEETS.filter((sheet) => {
      const layout = layOutLabel(sheet, content, measure)
      return !layout.ok || layout.drawing.bars === null
    })
    expect(without.map(({ key }) => key)).toEqual(['a4-5x16-35.6x16.9'])
  })

  it('cuts what does not fit between letters as people see them', () => {
    expect(cutToFit('Oxmarden 307-G', 100, text => text.length)).toBe('Oxmarden 307-G')
    expect(cutToFit('Oxmarden 307-G', 9, text => text.length)).toBe('Oxmarden…')
    expect(cutToFit('e\u0301e\u0301e\u0301', 4, text => text.length)).toBe('e\u0301…')
  })
})

describe('modules', () => {
  it('are whole dots of a 600 dpi printer, and of a 300 dpi one where there is room', () => {
    expect(moduleWithin(0.26, 0.19)).toBeCloseTo(25.4 / 600 * 6, 9)
    expect(moduleWithin(0.22, 0.19)).toBeCloseTo(25.4 / 600 * 5, 9)
    expect(moduleWithin(0.2, 0.19)).toBeNull()
    expect(moduleWithin(0.4, 0.4)).toBeNull()
  })
})

describe('what the codes hold', () => {
  it('is the fixed address in capitals, all of QR’s alphanumeric set, with a proxy’s path left as it is', () => {
    expect(labelUrl('https://knurl.example.org', 'U0000016')).toBe('HTTPS://KNURL.EXAMPLE.ORG/S/U0000016')
    expect(labelUrl('http://192.168.1.20:3000/', 'L0000015')).toMatch(/^[0-9A-Z $%*+\-./:]+$/)
    expect(labelUrl('https://example.org/shop/', 'U0000016')).toBe('HTTPS://EXAMPLE.ORG/shop/S/U0000016')
  })

  it('needs a smaller code in capitals (31 characters at level M: version 2, else 3)', () => {
    const sideOf = (text: string) => encodeLabel(text, 'U0000016').qr.find(({ level }) => level === 'M')?.side
    expect(sideOf('HTTPS://EXAMPLE.COM/U/TG240001Q')).toBe(25)
    expect(sideOf('https://example.com/u/TG240001Q')).toBe(29)
  })

  // Width in modules = 11·(n + 2) + 13 with n characters after the start (ISO/IEC 15417): here set A, HI, code C, three pairs.
  it('encodes Code 128 at the published length, and refuses what it cannot hold', () => {
    expect(encodeBars('HI345678').length).toBe(11 * (1 + 2 + 1 + 3 + 1) + 13)
    expect(() => encodeBars('Ω')).toThrow('not a valid input')
  })
})
