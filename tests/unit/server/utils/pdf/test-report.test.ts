import { execFileSync } from 'node:child_process'
import { beforeAll, describe, expect, it } from 'vitest'
import { printTestReport } from '../../../../../server/utils/pdf/test-report'
import { makeTestReport } from '../../../../../shared/domain/test-report'
import { readPdfText } from '../../../../support/pdf'
import type { GreyImage } from '../../../../support/raster'
import { rasterise } from '../../../../support/raster'
import { makeReportFacts, makeSignedSheet, THIRTY } from '../../../../support/signed-sheet'

/** The words of each page, as poppler reads them. */
function pagesOf(pdf: Buffer): string[] {
  return execFileSync('pdftotext', ['-layout', '-enc', 'UTF-8', '-', '-'], { input: pdf, encoding: 'utf8' }).split('\f').map(page => page.replaceAll(/[\u2009\u202F\u00A0]/g, ' ')).filter(page => page.trim() !== '')
}
const DPI = 72
const MARGIN = 48
const DARK = 200
/** Dark pixels in the columns of a page from one to another. */
function inkBetween({ width, height, data }: GreyImage, from: number, to: number): number {
  return Array.from({ length: height }, (_, row) => data.subarray(row * width + from, row * width + to)).reduce((sum, line) => sum + line.filter(grey => grey < DARK).length, 0)
}

describe('a test report on paper', () => {
  const sheet = makeSignedSheet()
  const report = makeTestReport(makeReportFacts(sheet), iso => iso)
  let pdf: Buffer
  let pages: string[]
  beforeAll(async () => {
    pdf = await printTestReport(report, sheet, 'Halloran & Pike')
    pages = pagesOf(pdf)
  }, 30_000)

  it('bears its number and "Page x of y" on every page, and ends where it says so', () => {
    expect(pages.length).toBeGreaterThan(2)
    pages.forEach((page, index) => {
      expect(page).toContain('Test report U 000001 6 / T2')
      expect(page).toContain(`Page ${index + 1} of ${pages.length}`)
      expect(page.includes('End of test report')).toBe(index === pages.length - 1)
    })
  })

  it('shows every reading before and after, with what a table says in one line', () => {
    const lines = pages.join('\n').split('\n').map(line => line.replaceAll(/\s+/g, ' ').trim())
    expect(lines).toContain('A, 100 kHz as found ±2 % 96.914 kHz −3.09 % ±0.98 Hz 1.65 < 0.1 % > 100 fail')
    expect(lines).toContain('A, 100 kHz as left ±2 % 99.912 kHz −0.09 % ±0.98 Hz 1.65 > 99.9 % > 100 pass')
    expect(lines).toContain('D, 10 MHz ±2 % 10.19993 MHz +2.00 % ±680 Hz 4.53 67 % > 100 conditional pass')
    expect(lines.filter(line => / as (found|left) ±/.test(line))).toHaveLength(2 * THIRTY.filter(({ left }) => left).length)
  })

  it('has no hyphen for a minus, no box for a letter, and none of the words that it must not have', () => {
    const words = readPdfText(pdf)
    expect(words).not.toMatch(/(^|\s)-\d/)
    expect(words).not.toContain('[U+')
    expect(words).not.toMatch(/calibration certificate|\bsafe\b/i)
    expect(words).toContain('U = k u')
    expect(words).toContain('√3')
  })

  it('keeps every page within its margins', async () => {
    const images = await rasterise(pdf, DPI)
    expect(images).toHaveLength(pages.length)
    for (const image of images) {
      expect(inkBetween(image, 0, MARGIN - 2)).toBe(0)
      expect(inkBetween(image, image.width - MARGIN + 2, image.width)).toBe(0)
      expect(inkBetween(image, MARGIN, image.width - MARGIN)).toBeGreaterThan(500)
    }
  })

  it('warns on its first page that it no longer holds', async () => {
    const overtaken = makeSignedSheet({ staleBecause: 'C14 was replaced on 12 November.' }, THIRTY.slice(0, 3))
    const [first] = pagesOf(await printTestReport(makeTestReport(makeReportFacts(overtaken), iso => iso), overtaken, 'Halloran & Pike'))
    expect(first).toContain('This report no longer holds for the piece as it stands. C14 was replaced on 12 November.')
  })
})
