import { z } from 'zod'
import { LOT_STANDINGS } from '../domain/part-lots'
import { line, optionalLine, versionSeen } from './common'
import { REASON_LENGTH } from './moves'
import { tagOf } from './params'
import { partType } from './part-lot'
import { typedAmount } from './typed'

/** The most kinds of parts pulled at a time. */
export const MOST_PULLED = 100
const emptyAsNull = (value: unknown) => value === '' ? null : value

/** Parts of one kind pulled from a donor: they become a lot. */
export const pulledPart = z.object({
  type: partType,
  quantity: line('how many', 40),
  maker: optionalLine('the maker as marked'),
  dateCode: optionalLine('the date code as marked', 40),
  tested: optionalLine('how it was tested', 400),
  standing: z.enum(LOT_STANDINGS, { error: 'Choose whether it may be fitted' }).default('good'),
  standingBecause: optionalLine('why it may not be fitted', 400),
  /** The part is one that we had fitted; null: one it came with, or nobody knows. */
  fromFittingId: z.preprocess(emptyAsNull, z.uuid('Choose the part from the list').nullable().default(null)),
  placeTag: z.preprocess(emptyAsNull, tagOf('L').nullable().default(null)),
  /** What these are worth together, as typed: the weight of their share. Only from those who may see costs. */
  worth: typedAmount('what they are worth').default(''),
  /** Their share set by hand, as typed; empty: by worth. */
  share: typedAmount('their share of the cost').default(''),
}).superRefine(({ standing, standingBecause }, context) => {
  if (standing !== 'good' && standingBecause === '') context.addIssue({ code: 'custom', path: ['standingBecause'], message: 'Enter why it may not be fitted' })
})

/** A unit broken for parts, or more taken from one that is broken already. */
export const breakUp = z.object({
  parts: z.array(pulledPart, { error: 'The parts must be a list' }).min(1, 'Enter at least one part that was pulled').max(MOST_PULLED, `Enter ${MOST_PULLED} kinds of parts at a time at most`),
  /** What the rest of the piece is worth, as typed. */
  carcassWorth: typedAmount('what the rest is worth').default(''),
  /** Asked for when it is broken now. */
  why: optionalLine('the reason', REASON_LENGTH),
  ownerConsent: optionalLine('the owner’s consent', REASON_LENGTH),
  version: versionSeen,
})
export type BreakUp = z.output<typeof breakUp>

export const putBack = z.object({ why: line('why it is put back', 400), version: versionSeen })
export type PutBack = z.output<typeof putBack>
