import { execFileSync } from 'node:child_process'
import { describe, expect, it } from 'vitest'
import { createPdf } from '../../../../../server/utils/pdf'
import { startFlow } from '../../../../../server/utils/pdf/flow'
import { loadFonts } from '../../../../../server/utils/pdf/fonts'
import { drawable, runsOf } from '../../../../../server/utils/pdf/runs'

/** What poppler, which did not write the file, reads out of it. */
const textOf = (pdf: Buffer) => execFileSync('pdftotext', ['-layout', '-enc', 'UTF-8', '-', '-'], { input: pdf, encoding: 'utf8' })

const WORDS = ['47 Ω', '4.7 \u2126', '10 µF', '22 μF', '√2', '≥ 1 MΩ', '≤ 0.1 Ω', 'A → B', '⌀ 6 mm', 'Σ I', '±2 %', '63.5 × 33.9', '½', '70 °C', '£ 12', '€ 12', '≈ 400 c/s', 'Δf', 'λ = 200 m', 'Łódź', 'Ősz', 'Žižkov', 'Прибор']

describe('createPdf', () => {
  it('draws every special character so that the words can be read out again', async () => {
    const pdf = await createPdf({ title: 'Characters' })
    for (const weight of [400, 500, 600, 700] as const) {
      WORDS.forEach((word, index) => pdf.drawLine(word, 50 + (weight - 400) * 1.2, 60 + index * 20, { weight }))
    }
    // Whether a gap between two faces is a space is the reader's guess, so spaces are left out of it.
    const bare = (text: string) => text.normalize('NFKC').replace(/\s/gu, '')
    const read = bare(textOf(await pdf.finish()))
    for (const word of WORDS) expect(read.split(bare(word)).length - 1, word).toBe(4)
  })

  it('embeds each face that it used, and none by its name alone', async () => {
    const pdf = await createPdf({ title: 'Faces' })
    pdf.drawLine('Resistance 47 kΩ', 50, 50)
    const listed = execFileSync('pdffonts', ['-'], { input: await pdf.finish(), encoding: 'utf8' }).split('\n').slice(2).filter(Boolean)
    expect(listed).toHaveLength(2)
    for (const line of listed) expect(line).toMatch(/yes yes yes/u)
  })

  it('never breaks a frequency, and cuts a word longer than its line', async () => {
    const pdf = await createPdf({ title: 'Wrapping' })
    for (let width = 60; width < 200; width += 7) {
      expect(pdf.linesOf('reaches 10.7\u202FMHz and 455\u202FkHz', width).join('|')).toMatch(/10\.7\u2009MHz.*455\u2009kHz/u)
    }
    const cut = pdf.linesOf('W'.repeat(400), 100)
    expect(cut.join('')).toBe('W'.repeat(400))
    expect(Math.max(...cut.map(line => pdf.widthOf(line)))).toBeLessThanOrEqual(100)
    await pdf.finish()
  })

  it('gives figures one width, so that columns stand straight', async () => {
    const pdf = await createPdf({ title: 'Figures' })
    expect(pdf.widthOf('1111')).toBeCloseTo(pdf.widthOf('8888'), 6)
    await pdf.finish()
  })
})

describe('startFlow', () => {
  it('repeats a table\'s heading on each page and numbers the pages', async () => {
    const pdf = await createPdf({ title: 'Long table' })
    const flow = startFlow(pdf)
    flow.title('Many lines')
    flow.heading('Readings')
    flow.table([{ heading: 'Setting', share: 1, align: 'right' }, { heading: 'Note', share: 3 }], Array.from({ length: 120 }, (_, index) => [String(index), 'read']))
    flow.footer('Test')
    const pages = textOf(await pdf.finish()).split('\f').filter(page => page.trim() !== '')
    expect(pages.length).toBeGreaterThan(2)
    pages.forEach((page, index) => {
      expect(page).toContain('Setting')
      expect(page).toContain(`Page ${index + 1} of ${pages.length}`)
    })
  })
})

describe('runsOf', () => {
  it('keeps the text whole and changes face only where it must', async () => {
    const { 400: stack } = await loadFonts()
    const text = drawable('R7 = 47 kΩ, ±5 %', stack)
    const runs = runsOf(text, stack)
    expect(runs.map(run => run.text).join('')).toBe(text)
    expect(runs.map(run => run.text)).toEqual(['R7 = 47 k', 'Ω', ', ±5 %'])
  })

  it('spells out what no face has, and drops what is never drawn', async () => {
    const { 400: stack } = await loadFonts()
    expect(drawable('SN \u{1FAE0}1\u200D\uFE0F', stack)).toBe('SN [U+1FAE0]1')
  })
})
