import { z } from 'zod'
import { DISPOSITIONS } from '../domain/modifications'
import { PART_KINDS } from '../domain/part-lots'
import { line, optionalLine } from './common'
import { tagOf, unitParams } from './params'

/** The most parts fitted in one entry. */
export const MOST_FITTINGS = 60

const emptyAsNull = (value: unknown) => value === '' ? null : value

/** A part fitted: from a lot, or honestly of an unknown one; with what it replaced and what became of that. */
const fitting = z.object({
  /** Null: the lot is unknown. */
  lotTag: z.preprocess(emptyAsNull, tagOf('P').nullable().default(null)),
  /** What was fitted, where the lot is unknown. */
  description: optionalLine('what was fitted'),
  /** As typed, read by how the lot is counted. */
  quantity: line('how many', 40).default('1'),
  circuitReference: optionalLine('the circuit reference', 60),
  replaced: optionalLine('what it replaced', 200),
  /** The fitting of ours whose place it takes. */
  replacesFittingId: z.preprocess(emptyAsNull, z.uuid('Choose the part from the list').nullable().default(null)),
  disposition: z.enum(DISPOSITIONS, { error: 'Choose what became of the old part' }).default('nothing_removed'),
  /** For an old part that goes back to stock as a lot of its own. */
  oldPartKind: z.preprocess(emptyAsNull, z.enum(PART_KINDS, { error: 'Choose what kind of part the old one is' }).nullable().default(null)),
})
type Fitting = z.output<typeof fitting>

function checkFitting(said: Fitting, context: z.RefinementCtx): void {
  const issue = (path: keyof Fitting, message: string) => context.addIssue({ code: 'custom', path: [path], message })
  if (said.lotTag === null && said.description === '') issue('lotTag', 'Scan or choose the lot, or write what was fitted and leave the lot unknown')
  if (said.disposition !== 'returned_to_stock' || said.replacesFittingId !== null) return
  if (said.replaced === '') issue('replaced', 'Enter what came out: it goes back to stock under that name')
  if (said.oldPartKind === null) issue('oldPartKind', 'Choose what kind of part goes back to stock')
}

export const newFitting = fitting.superRefine(checkFitting)
export type NewFitting = z.output<typeof newFitting>

/** A part added to an entry that is logged already. */
export const addedFitting = fitting.extend({ modificationId: z.uuid('Choose an entry of this unit’s work log') }).superRefine(checkFitting)
export type AddedFitting = z.output<typeof addedFitting>

export const undoneFitting = z.object({ why: line('why it is undone', 400) })
export type UndoneFitting = z.output<typeof undoneFitting>

export const fittingParams = unitParams.extend({ id: z.uuid('There is nothing at this address.') })
