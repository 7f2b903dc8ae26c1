/**
 * Cuts the second face down to what Work Sans lacks (Greek, Ω, √, ≥, →…), so that a page with one arrow fetches a few
 * kilobytes and not the whole face. Run after changing CHARACTERS: node scripts/fonts.mjs
 */
import { readFileSync, writeFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import subsetFont from 'subset-font'

const span = (/** @type {number} */ from, /** @type {number} */ to) => String.fromCodePoint(...Array.from({ length: to - from + 1 }, (_, index) => from + index))
const CHARACTERS = span(0x391, 0x3C9) + span(0x2070, 0x209C) + span(0x2150, 0x215F) + span(0x2190, 0x2195) + '\u2126\u2300√∛∞∑∏∂∆∫≈≠≡≤≥∙●○■□▲△▼▽◆◇✓✗'

const require = createRequire(import.meta.url)
for (const weight of [400, 700]) {
  const whole = readFileSync(require.resolve(`@fontsource/dejavu-sans/files/dejavu-sans-latin-${weight}-normal.woff2`))
  const cut = await subsetFont(whole, CHARACTERS, { targetFormat: 'woff2' })
  writeFileSync(new URL(`../assets/fonts/knurl-symbols-${weight}.woff2`, import.meta.url), cut)
  console.log(`knurl-symbols-${weight}.woff2  ${(cut.length / 1024).toFixed(1)} kB`)
}
