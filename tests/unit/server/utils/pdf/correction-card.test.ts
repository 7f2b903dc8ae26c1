import { execFileSync } from 'node:child_process'
import { describe, expect, it } from 'vitest'
import type { CardHead } from '../../../../../server/utils/pdf/correction-card'
import { printCorrectionCard } from '../../../../../server/utils/pdf/correction-card'
import type { CardBand } from '../../../../../shared/domain/correction-card'
import { correctionCard } from '../../../../../shared/domain/correction-card'
import { readPdfText } from '../../../../support/pdf'
import { makeSignedSheet } from '../../../../support/signed-sheet'

const HEAD: CardHead = {
  shopName: 'Halloran & Pike', unitName: 'Oxmarden 307-G', tag: 'U 000001 6', serial: '30714', testedOn: '9 November 2026', warmUpMinutes: 45, instruments: ['Frequency counter (B 000001 1)'], warnings: [],
}
const pagesOf = (pdf: Buffer) => execFileSync('pdftotext', ['-layout', '-enc', 'UTF-8', '-', '-'], { input: pdf, encoding: 'utf8' }).split('\f').filter(page => page.trim() !== '')
const infoOf = (pdf: Buffer) => execFileSync('pdfinfo', ['-'], { input: pdf, encoding: 'utf8' })

describe('a dial correction card on paper', () => {
  const bands = correctionCard(makeSignedSheet().readings)

  it('is A6, two bands to a card, and each card says which set it is of and when it was tested', async () => {
    const pdf = await printCorrectionCard(HEAD, bands)
    // ISO 216: A6 is 105 mm by 148 mm; 1 pt is 1/72 in.
    expect(infoOf(pdf)).toMatch(/Page size:\s+419\.5\d* x 297\.6\d* pts/)
    const pages = pagesOf(pdf)
    expect(pages).toHaveLength(3)
    pages.forEach((page, index) => {
      const words = page.replaceAll(/\s+/g, ' ')
      for (const each of ['Dial corrections: Oxmarden 307-G', 'serial 30714', 'U 000001 6', 'tested 9 November 2026 after 45 minutes’ warm-up', 'Frequency counter', 'as it was tested on that day', `Card ${index + 1} of 3`]) expect(words).toContain(each)
    })
  })

  it('carries a long band on, and loses no point of it', async () => {
    const points = Array.from({ length: 25 }, (_, index) => ({ dialHz: 100_000 + index * 1000, trueHz: 100_000 + index * 1000 }))
    const long: CardBand = { label: 'A', points, settings: [] }
    const words = readPdfText(await printCorrectionCard(HEAD, [long]))
    expect(words).toContain('Band A, continued')
    for (const { dialHz } of points) expect(words.split(`${dialHz / 1000} kHz`).length - 1).toBeGreaterThanOrEqual(2)
  })

  it('warns that it may no longer hold, and says where the warm-up or the instrument is not recorded', async () => {
    const words = readPdfText(await printCorrectionCard({ ...HEAD, warmUpMinutes: null, instruments: [], warnings: ['C14 was replaced on 12 November.'] }, bands))
    for (const each of ['C14 was replaced on 12 November.', 'an instrument not recorded']) expect(words).toContain(each)
    expect(words).not.toContain('warm up as long')
  })
})
