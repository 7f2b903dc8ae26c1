import { z } from 'zod'
import { UNIT_STATES } from '../domain/unit-state-names'
import { day, line, minorUnits, optionalLine, versionSeen } from './common'

/** The longest reason given for a move. */
export const REASON_LENGTH = 400

/** A move through the states. Holding, selling and taking back have routes of their own, since they ask for more. */
export const unitMove = z.object({
  to: z.enum(UNIT_STATES, { error: 'Choose where it goes next' }),
  why: optionalLine('the reason', REASON_LENGTH),
  /** For breaking up a consigned piece: how its owner agreed. */
  ownerConsent: optionalLine('the owner’s consent', REASON_LENGTH),
  version: versionSeen,
})
export type UnitMove = z.output<typeof unitMove>

export const unitHold = z.object({
  heldFor: line('who it is held for'),
  until: day('the last day of the hold'),
  note: optionalLine('the note', REASON_LENGTH),
  version: versionSeen,
})
export type UnitHold = z.output<typeof unitHold>

export const holdRelease = z.object({ why: optionalLine('the reason', REASON_LENGTH), version: versionSeen })
export type HoldRelease = z.output<typeof holdRelease>

/** An empty text takes the disclosure back. */
export const notEnergised = z.object({ text: optionalLine('what the buyer is told', REASON_LENGTH), version: versionSeen })
export type NotEnergised = z.output<typeof notEnergised>

export const unitSale = z.object({
  buyerName: line('who bought it'),
  buyerContact: optionalLine('how to reach the buyer', REASON_LENGTH),
  priceMinor: minorUnits('the price'),
  currency: z.string({ error: 'Choose the currency' }).regex(/^[A-Z]{3}$/u, 'The currency is three capital letters, like GBP'),
  soldOn: day('the day of the sale'),
  version: versionSeen,
})
export type UnitSale = z.output<typeof unitSale>

export const SALE_ENDINGS = ['returned', 'offered'] as const
export const saleUndone = z.object({
  /** Whether the piece came back, or the sale fell through before it left. */
  to: z.enum(SALE_ENDINGS, { error: 'Choose whether it came back or the sale fell through' }),
  why: line('why the sale is undone', REASON_LENGTH),
  version: versionSeen,
})
export type SaleUndone = z.output<typeof saleUndone>
