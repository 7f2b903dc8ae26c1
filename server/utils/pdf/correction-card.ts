import type { CardBand } from '../../../shared/domain/correction-card'
import { formatFrequency } from '../../../shared/domain/frequency'
import type { Flow } from './flow'
import { startFlow } from './flow'
import { createPdf } from './index'
import { mm, PALETTE } from './palette'

export interface CardHead { shopName: string, unitName: string, tag: string, serial: string, testedOn: string, warmUpMinutes: number | null, instruments: readonly string[], warnings: readonly string[] }

/** Four figures: finer than any dial is set. */
const rounded = (hz: number) => formatFrequency(Math.round(Number(hz.toPrecision(4))))

/** A card of A5 for the buyer to keep with the set: what its dial really gives, and what to set for a wanted frequency. */
export async function printCorrectionCard(head: CardHead, bands: readonly CardBand[]): Promise<Buffer> {
  const pdf = await createPdf({ size: [mm(148), mm(210)], margins: 34, title: `Dial correction card, ${head.unitName}, ${head.tag}`, author: head.shopName })
  const flow = startFlow(pdf)
  flow.paragraph(`Dial corrections: ${head.unitName}`, { size: 13, weight: 600 })
  flow.paragraph([head.serial && `serial ${head.serial}`, head.tag, `tested ${head.testedOn}`, head.warmUpMinutes === null ? '' : `after ${head.warmUpMinutes} minutes’ warm-up`].filter(Boolean).join(' · '), { size: 8, colour: PALETTE.inkSoft })
  for (const warning of head.warnings) flow.paragraph(warning, { size: 8, weight: 600, colour: PALETTE.fault })
  for (const band of bands) bandTable(flow, band)
  flow.space(3)
  flow.paragraph(`Measured with ${head.instruments.join(', ') || 'an instrument not recorded'}. It holds for this set as it was tested on that day; between the points a straight line is taken, and beyond them nothing is said.`, { size: 7, colour: PALETTE.inkSoft })
  flow.footer(`${head.shopName} · dial correction card`)
  return pdf.finish()
}

function bandTable(flow: Flow, { label, points, settings }: CardBand): void {
  flow.need(52)
  flow.space(3)
  flow.paragraph(label ? `Band ${label}` : 'Dial', { size: 9, weight: 600 })
  const rows = Array.from({ length: Math.max(points.length, settings.length) }, (_, index) => {
    const [point, setting] = [points[index], settings[index]]
    return [point ? formatFrequency(point.dialHz) : '', point ? rounded(point.trueHz) : '', setting ? formatFrequency(setting.wantedHz) : '', setting ? rounded(setting.setHz) : '']
  })
  flow.table([
    { heading: 'Dial says', share: 25, align: 'right' }, { heading: 'really gives', share: 25, align: 'right' }, { heading: 'To get', share: 25, align: 'right' }, { heading: 'set', share: 25, align: 'right', weight: 600 },
  ], rows)
}
