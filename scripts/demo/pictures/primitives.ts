import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { create } from 'fontkit'

/** A repeatable stream of numbers in [0, 1) from a text, so that a piece always looks the same. */
export function seeded(text: string): () => number {
  let state = [...text].reduce((hash, character) => Math.imul(hash ^ character.charCodeAt(0), 16777619), 2166136261) >>> 0
  return () => {
    state = (state + 0x6D2B79F5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state)
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296
  }
}

const fontFile = createRequire(import.meta.url).resolve('@fontsource/work-sans/files/work-sans-latin-600-normal.woff')
const opened = create(readFileSync(fontFile))
if (!('layout' in opened)) throw new Error('The lettering face is a collection, not one font')
const font = opened

/** Lettering as outlines: the machine that draws may have no fonts. `anchor` 0 starts at x, 0.5 centres, 1 ends there. */
export function lettering(text: string, x: number, y: number, size: number, fill: string, anchor = 0): string {
  const scale = size / font.unitsPerEm
  const run = font.layout(text)
  let pen = x - run.advanceWidth * scale * anchor
  const outlines = run.glyphs.map((glyph, index) => {
    const outline = `<path transform="translate(${pen.toFixed(1)} ${y}) scale(${scale} ${-scale})" d="${glyph.path.toSVG()}"/>`
    pen += (run.positions[index]?.xAdvance ?? 0) * scale
    return outline
  })
  return `<g fill="${fill}">${outlines.join('')}</g>`
}

export const rect = (x: number, y: number, width: number, height: number, fill: string, radius = 0, extra = '') =>
  `<rect x="${x}" y="${y}" width="${width}" height="${height}" rx="${radius}" fill="${fill}" ${extra}/>`
export const disc = (x: number, y: number, radius: number, fill: string, extra = '') =>
  `<circle cx="${x}" cy="${y}" r="${radius}" fill="${fill}" ${extra}/>`
export const stroke = (x1: number, y1: number, x2: number, y2: number, colour: string, width = 2) =>
  `<line x1="${x1}" y1="${y1}" x2="${x2}" y2="${y2}" stroke="${colour}" stroke-width="${width}" stroke-linecap="round"/>`

const radians = (degrees: number) => (degrees - 90) * Math.PI / 180
export const around = (x: number, y: number, radius: number, degrees: number): [number, number] =>
  [x + radius * Math.cos(radians(degrees)), y + radius * Math.sin(radians(degrees))]

/** Engraved ticks on an arc, degrees clockwise from the top. */
export function ticks(x: number, y: number, inner: number, outer: number, from: number, to: number, count: number, colour: string): string {
  return Array.from({ length: count + 1 }, (_, index) => {
    const angle = from + (to - from) * index / count
    const [x1, y1] = around(x, y, index % 5 === 0 ? inner - (outer - inner) * 0.6 : inner, angle)
    const [x2, y2] = around(x, y, outer, angle)
    return stroke(x1, y1, x2, y2, colour, index % 5 === 0 ? 3 : 1.6)
  }).join('')
}

/** A black fluted knob with a white pointer. */
export function knob(x: number, y: number, radius: number, angle: number, colour = '#1c1d1c'): string {
  const [px, py] = around(x, y, radius * 0.85, angle)
  const [qx, qy] = around(x, y, radius * 0.3, angle)
  return disc(x + 3, y + 5, radius * 1.04, 'rgb(0 0 0 / .28)')
    + disc(x, y, radius, colour, `stroke="rgb(255 255 255 / .12)" stroke-width="${radius * 0.16}" stroke-dasharray="${radius * 0.13} ${radius * 0.11}"`)
    + disc(x, y, radius * 0.68, colour, 'stroke="rgb(255 255 255 / .18)" stroke-width="2"') + stroke(qx, qy, px, py, '#f3efe2', Math.max(3, radius * 0.1))
}

/** A knob with ticks and a word beneath it. */
export function labelledKnob(x: number, y: number, radius: number, angle: number, word: string, ink: string): string {
  return ticks(x, y, radius * 1.22, radius * 1.38, -140, 140, 10, ink) + knob(x, y, radius, angle) + lettering(word, x, y + radius * 1.9, Math.max(13, radius * 0.36), ink, 0.5)
}

/** A moving-coil meter with a cream scale. `reading` 0 to 1. */
export function meter(x: number, y: number, width: number, height: number, reading: number, word: string): string {
  const cx = x + width / 2
  const cy = y + height * 0.92
  const radius = height * 0.7
  const [nx, ny] = around(cx, cy, radius * 0.98, -48 + 96 * reading)
  return rect(x + 4, y + 6, width, height, 'rgb(0 0 0 / .25)', 12) + rect(x, y, width, height, '#191a19', 12) + rect(x + 9, y + 9, width - 18, height - 18, '#efe6cc', 6)
    + ticks(cx, cy, radius * 0.86, radius * 0.95, -48, 48, 20, '#2a2a26')
    + lettering(word, cx, cy - radius * 0.42, height * 0.13, '#2a2a26', 0.5) + stroke(cx, cy, nx, ny, '#9c2a20', 2.6)
    + rect(x + 9, y + height * 0.78, width - 18, height * 0.22 - 9, '#191a19', 4) + disc(cx, cy, 7, '#55554f')
}

/** A coaxial socket or, with a colour, a terminal. */
export function socket(x: number, y: number, radius: number, colour = '#c9c6bb'): string {
  return disc(x + 2, y + 4, radius, 'rgb(0 0 0 / .3)') + disc(x, y, radius, colour) + disc(x, y, radius * 0.62, '#2c2c2a') + disc(x, y, radius * 0.24, '#d9cfa8')
}

export const screw = (x: number, y: number, angle: number) => {
  const [x1, y1] = around(x, y, 8, angle)
  const [x2, y2] = around(x, y, 8, angle + 180)
  return disc(x, y, 10, '#b9b5a6') + stroke(x1, y1, x2, y2, '#6f6c61', 3)
}

export const lamp = (x: number, y: number, colour: string) => disc(x, y, 17, '#2b2b29') + disc(x, y, 12, colour) + disc(x - 4, y - 4, 4, 'rgb(255 255 255 / .6)')

/** The bench behind every picture: paper roll, soft light, a shadow under the piece. */
export function scene(content: string, width = 1280, height = 960, tone = '#d8d2c3'): string {
  return `<svg xmlns="http://www.w3.org/2000/svg" viewBox="80 60 ${width - 160} ${height - 120}" width="${width}" height="${height}"><defs>
<linearGradient id="paper" x1="0" y1="0" x2="0" y2="1"><stop offset="0" stop-color="${tone}"/><stop offset=".66" stop-color="#efebe0"/><stop offset=".67" stop-color="#c9c2b1"/><stop offset="1" stop-color="#a9a190"/></linearGradient>
<radialGradient id="light" cx=".3" cy=".1" r="1"><stop offset="0" stop-color="rgb(255 255 255 / .32)"/><stop offset="1" stop-color="rgb(0 0 0 / .16)"/></radialGradient>
<linearGradient id="sheen" x1="0" y1="0" x2="1" y2="1"><stop offset="0" stop-color="rgb(255 255 255 / .22)"/><stop offset=".5" stop-color="rgb(255 255 255 / 0)"/><stop offset="1" stop-color="rgb(0 0 0 / .18)"/></linearGradient></defs>
${rect(0, 0, width, height, 'url(#paper)')}${content}${rect(0, 0, width, height, 'url(#light)')}</svg>`
}
