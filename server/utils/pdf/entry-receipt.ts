import type { Ownership } from '../../../shared/domain/acquisition'
import { formatTag } from '../../../shared/domain/tag'
import { startFlow } from './flow'
import type { Flow } from './flow'
import type { Pdf } from './index'
import { createPdf } from './index'
import { PALETTE } from './palette'

/** What the receipt says, ready to be printed. Money is never on it. */
export interface EntryReceipt {
  shop: { name: string, address: string }
  tag: string
  what: string
  kind: string
  serial: string
  /** "11 March 1961", and when the receipt was printed. */
  receivedOn: string
  printedAt: string
  condition: string
  supplyAsSet: string
  /** "Club sale or rally table", and who brought it if the reader may know. */
  source: string
  sourceName: string | null
  ownership: Ownership
  photoCount: number
  kit: { description: string, tag: string | null, found: 'Here' | 'Elsewhere' | 'Missing' | 'Not looked for', condition: string }[]
}

/** The entry receipt as an A4 PDF: for whoever brought the piece, to be signed by both. */
export async function printEntryReceipt(receipt: EntryReceipt): Promise<Buffer> {
  const pdf = await createPdf({ title: `Entry receipt ${formatTag(receipt.tag)}`, author: receipt.shop.name, margins: { top: 48, right: 54, bottom: 60, left: 54 } })
  const flow = startFlow(pdf)
  head(pdf, flow, receipt)
  flow.heading('What was received')
  flow.keyValues([
    ['Piece', `${receipt.what}\n${receipt.kind}`],
    ['Serial', receipt.serial],
    ['Received on', receipt.receivedOn],
    ['From', [receipt.source, receipt.sourceName].filter(Boolean).join(': ')],
    ['Whose it is', ownershipInWords(receipt)],
    ['Condition on arrival', receipt.condition || 'not looked'],
    ['Supply as set', receipt.supplyAsSet || 'not looked'],
    ['Photographs taken', receipt.photoCount === 0 ? 'None yet' : String(receipt.photoCount)],
  ], 130)
  flow.heading('What came with it')
  if (receipt.kit.length === 0) flow.paragraph('Nothing else was noted with it.')
  else {
    flow.table(
      [{ heading: 'Thing', share: 5 }, { heading: 'Tag', share: 2 }, { heading: 'Found', share: 2 }, { heading: 'Condition', share: 4 }],
      receipt.kit.map(item => [item.description, item.tag ? formatTag(item.tag) : '', foundCell(item.found), item.condition]),
    )
  }
  flow.space(12)
  flow.paragraph('This receipt says what was handed over and how it looked. It had not been tested or powered when it was handed over.', { colour: PALETTE.inkSoft })
  signatures(pdf, flow, receipt)
  flow.footer(`${receipt.shop.name} · Entry receipt ${formatTag(receipt.tag)} · printed ${receipt.printedAt}`)
  return pdf.finish()
}

function head(pdf: Pdf, flow: Flow, receipt: EntryReceipt): void {
  const right = flow.left + flow.width
  const top = flow.y
  flow.y = pdf.drawText(receipt.shop.name, { x: flow.left, y: top, width: flow.width * 0.6, size: 11, weight: 600 })
  if (receipt.shop.address) flow.y = pdf.drawText(receipt.shop.address, { x: flow.left, y: flow.y, width: flow.width * 0.6, size: 8.5, colour: PALETTE.inkSoft })
  pdf.drawLine('STOCK TAG', right, top + 9, { size: 7.5, weight: 600, tracking: 0.9, colour: PALETTE.inkSoft, align: 'right' })
  pdf.drawLine(formatTag(receipt.tag), right, top + 32, { size: 22, weight: 700, align: 'right' })
  flow.y = Math.max(flow.y, top + 40) + 10
  flow.title('Entry receipt')
}

function foundCell(found: EntryReceipt['kit'][number]['found']) {
  return found === 'Missing' ? { text: found, weight: 600 as const, colour: PALETTE.fault } : found
}

function ownershipInWords({ ownership, shop, sourceName }: EntryReceipt): string {
  return ownership === 'bought'
    ? `Bought by ${shop.name}`
    : `Left with ${shop.name} on consignment: it stays the property of ${sourceName ?? 'its owner'} until it is sold, and is not changed without consent`
}

function signatures(pdf: Pdf, flow: Flow, { shop }: EntryReceipt): void {
  flow.need(90)
  flow.space(44)
  const width = (flow.width - 30) / 2
  const lines = ['Brought by, and date', `For ${shop.name}, and date`]
  lines.forEach((words, index) => {
    const x = flow.left + index * (width + 30)
    pdf.doc.moveTo(x, flow.y).lineTo(x + width, flow.y).lineWidth(0.75).strokeColor(PALETTE.ink).stroke()
    pdf.drawText(words, { x, y: flow.y + 4, width, size: 8.5, colour: PALETTE.inkSoft })
  })
  flow.space(22)
}
