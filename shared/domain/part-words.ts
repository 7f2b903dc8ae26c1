import type { LotBalanceFacts } from './lot-balance'
import type { LotCondition } from './part-lots'
import { LOT_CONDITION_LABELS } from './part-lots'
import type { CountedIn } from './part-quantity'
import { formatQuantity } from './part-quantity'
import { formatTag } from './tag'

/** A part in one line: "Suppression capacitor X2 · 0.1 µF ±10 % · 275 V AC". */
export function partTitle({ description, value, tolerance, rating }: { description: string, value: string, tolerance?: string, rating?: string }): string {
  return [description, [value, tolerance].filter(Boolean).join(' '), rating].filter(Boolean).join(' · ')
}

/** A lot as a sentence names it: "Suppression capacitor X2 · 0.1 µF (P 000004 X)". */
export const lotTitle = (part: { description: string, value: string }, tag: string): string => `${partTitle(part)} (${formatTag(tag)})`

/** "10 came in: 3 fitted, 9 scrapped, none left". What is nought is left out, but for what is in the drawer. */
export function balanceInWords(balance: LotBalanceFacts, countedIn: CountedIn): string {
  const gone = (['fitted', 'sold', 'scrapped', 'lost'] as const).filter(way => balance[way] > 0).map(way => `${formatQuantity(balance[way], countedIn)} ${way}`)
  const left = balance.inDrawer === 0 ? 'none in the drawer' : `${formatQuantity(balance.inDrawer, countedIn)} in the drawer`
  return `${formatQuantity(balance.cameIn, countedIn)} came in: ${[...gone, left].join(', ')}`
}

/** Where the picture of a lot is served to staff; a new picture has a new address. */
export const lotPhotoUrl = (tag: string, fileId: string): string => `/api/parts/${tag}/photo?of=${fileId}`

interface FittedLot { tag: string, maker: string, dateCode: string, condition: LotCondition, donorTag: string | null, type: { description: string, value: string, tolerance: string, rating: string, countedIn: CountedIn } }

/**
 * A part fitted, as the piece's buyer may read it: "C14: suppression capacitor X2 · 0.1 µF · 275 V AC; marked Dielmark 2308; new; lot P 000004 X".
 * No cost and no supplier. Where the lot is unknown it says so.
 */
export function fittedInWords(fitting: { circuitReference: string, description: string, quantity: number, removedAt: Date | null }, lot: FittedLot | null): string {
  const many = formatQuantity(fitting.quantity, lot?.type.countedIn ?? 'piece')
  const what = `${many === '1' ? '' : `${many} × `}${lot ? partTitle(lot.type) : fitting.description}`
  const marked = lot ? [lot.maker, lot.dateCode].filter(Boolean).join(' ') : ''
  return [
    `${fitting.circuitReference === '' ? '' : `${fitting.circuitReference}: `}${what}`,
    marked && `marked ${marked}`,
    lot && lot.condition !== 'not_known' ? LOT_CONDITION_LABELS[lot.condition].toLowerCase() : '',
    lot?.donorTag ? `from ${formatTag(lot.donorTag)}` : '',
    lot ? `lot ${formatTag(lot.tag)}` : 'lot unknown',
    fitting.removedAt === null ? '' : 'taken out again since',
  ].filter(Boolean).join('; ')
}
