import JsBarcode from 'jsbarcode'
import { create } from 'qrcode'
import type { BarSymbol, LabelCodes, QrLevel, QrSymbol, Rect } from '../../shared/domain/label-symbols'
import { QR_LEVELS } from '../../shared/domain/label-symbols'

/**
 * What a label's QR code holds: the fixed address `/s/TAG`, in capitals, because host and scheme carry no case and the
 * code is then alphanumeric and smaller. A path before it (behind some proxies) keeps its case.
 */
export function labelUrl(base: string, tag: string): string {
  const { origin, pathname } = new URL(base)
  return `${origin.toUpperCase()}${pathname.replace(/\/+$/, '')}/S/${tag}`
}

/** The address labels point to: what the shop has set, else where the request came to. */
export function labelBase(configured: string, requestOrigin: string): string {
  return URL.canParse(configured) ? configured : requestOrigin
}

/** Encodes one label's two codes: the address at every level of error correction, and the compact tag as Code 128. */
export function encodeLabel(url: string, tag: string): LabelCodes {
  return { qr: QR_LEVELS.map(level => encodeQr(url, level)), bars: encodeBars(tag) }
}

function encodeQr(text: string, level: QrLevel): QrSymbol {
  const { modules } = create(text, { errorCorrectionLevel: level })
  return { level, side: modules.size, dark: mergeDark(modules.size, (row, column) => modules.get(row, column) !== 0) }
}

/** Dark modules as few rectangles: runs along each row, joined with equal runs of the rows beneath. */
function mergeDark(side: number, isDark: (row: number, column: number) => boolean): Rect[] {
  const done: Rect[] = []
  let open = new Map<string, Rect>()
  for (let row = 0; row < side; row++) {
    const here = new Map<string, Rect>()
    for (let column = 0; column < side; column++) {
      if (!isDark(row, column)) continue
      let end = column
      while (end < side && isDark(row, end)) end++
      const key = `${column} ${end}`
      const above = open.get(key)
      here.set(key, above ? [above[0], above[1], above[2], above[3] + 1] : [column, row, end - column, 1])
      open.delete(key)
      column = end
    }
    done.push(...open.values())
    open = here
  }
  return [...done, ...open.values()]
}

/** ISO/IEC 15417 symbol of a compact tag. Throws an Error for text that Code 128 cannot hold. */
export function encodeBars(text: string): BarSymbol {
  const out: { encodings?: { data: string }[] } = {}
  try {
    JsBarcode(out, text, { format: 'CODE128' })
  } catch (problem) {
    throw new Error(String(problem), { cause: problem })
  }
  const pattern = (out.encodings ?? []).map(part => part.data).join('')
  return { length: pattern.length, bars: Array.from(pattern.matchAll(/1+/g), run => [run.index, run[0].length] as const) }
}
