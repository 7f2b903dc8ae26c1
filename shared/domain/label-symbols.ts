/**
 * The two codes on a label and the room they need. Lengths in millimetres. The symbols themselves are encoded elsewhere
 * and come in as modules; this says how large they are drawn.
 */

/** Left, top, width, height. */
export type Rect = readonly [x: number, y: number, width: number, height: number]

export const QR_LEVELS = ['L', 'M', 'Q', 'H'] as const
export type QrLevel = (typeof QR_LEVELS)[number]

/** A QR symbol at one level of error correction: dark modules merged to rectangles, counted in modules. */
export interface QrSymbol {
  level: QrLevel
  /** Modules along one side, without the quiet zone. */
  side: number
  dark: readonly Rect[]
}

/** A Code 128 symbol: where each bar begins and how wide it is, counted in modules. */
export interface BarSymbol {
  /** Modules from the first bar to the last, without the quiet zones. */
  length: number
  bars: readonly (readonly [at: number, width: number])[]
}

/** What is encoded for one label. */
export interface LabelCodes {
  /** The same content at several levels of error correction. */
  qr: readonly QrSymbol[]
  bars: BarSymbol
}

/** Blank modules on each side of a QR Code (ISO/IEC 18004, 6.3.8). */
export const QR_QUIET = 4
/** Narrowest QR module that is printed. */
export const QR_MODULE_LEAST = 0.4
/** A QR module that phones read at arm's length; what the layout tries for first. */
export const QR_MODULE_GOOD = 0.5
/** Blank modules before and after a Code 128 (ISO/IEC 15417). */
export const BAR_QUIET = 10
/** Narrowest Code 128 module (X) that is printed. */
export const BAR_MODULE_LEAST = 0.19
/** A module that any hand scanner reads; what the layout tries for first. */
export const BAR_MODULE_GOOD = 0.25
/** Least height of bars: 5 mm or this share of the symbol's length, whichever is more (common guidance). */
export const BAR_HEIGHT_LEAST = 5
export const BAR_HEIGHT_SHARE = 0.15

/** A dot of a 600 dpi printer. Modules are whole dots, and whole 300 dpi dots where there is room, so that all print alike. */
const DOT = 25.4 / 600

/** The widest module of whole printer dots that is not wider than `widest` nor narrower than `least`; null if there is none. */
export function moduleWithin(widest: number, least: number): number | null {
  const dots = Math.floor(widest / DOT + 1e-9)
  const even = dots - dots % 2
  const chosen = even * DOT >= least - 1e-9 ? even : dots
  return chosen * DOT >= least - 1e-9 ? chosen * DOT : null
}

/** A QR symbol as large as fits a square of `space` mm, quiet zone included, by the strongest correction that keeps modules good. */
export function fitQr(symbols: readonly QrSymbol[], space: number, least: number): { symbol: QrSymbol, module: number } | null {
  const strongestFirst = [...symbols].sort((a, b) => QR_LEVELS.indexOf(b.level) - QR_LEVELS.indexOf(a.level))
  for (const wanted of [Math.max(QR_MODULE_GOOD, least), least]) {
    for (const symbol of strongestFirst) {
      const module = moduleWithin(space / (symbol.side + 2 * QR_QUIET), wanted)
      if (module !== null) return { symbol, module }
    }
  }
  return null
}

/** The least square, in mm, that any of the symbols fits with its quiet zone. */
export function leastQrSpace(symbols: readonly QrSymbol[]): number {
  const side = Math.min(...symbols.map(symbol => symbol.side))
  return (side + 2 * QR_QUIET) * Math.ceil(QR_MODULE_LEAST / DOT - 1e-9) * DOT
}

/** The height that bars of a symbol need at a module. */
export function leastBarHeight(symbol: BarSymbol, module: number): number {
  return Math.max(BAR_HEIGHT_LEAST, symbol.length * module * BAR_HEIGHT_SHARE)
}
