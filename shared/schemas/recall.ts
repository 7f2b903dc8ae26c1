import { z } from 'zod'
import { FOUND_ERROR_KINDS, RECALL_OUTCOMES } from '../domain/recall'
import { QUANTITIES } from '../domain/reading'
import { day, line, optionalLine, uuid } from './common'
import { rawAmount, readAmount } from './measure'
import { tagOf } from './params'

const blankAsNull = (value: unknown) => value === '' ? null : value

/** What was found wrong with an instrument, and from when on its readings are in question. */
export const newRecall = z.object({
  foundOn: day('the day it was found wrong'),
  goodOn: z.preprocess(blankAsNull, day('the last day it was known to be right').nullable().default(null)),
  quantity: z.preprocess(blankAsNull, z.enum(QUANTITIES, { error: 'Choose which readings' }).nullable().default(null)),
  errorKind: z.enum(FOUND_ERROR_KINDS, { error: 'Choose how far out it was' }),
  errorAmount: rawAmount.nullable().default(null),
  why: line('what was found', 400),
}).transform((said, context) => {
  const refuse = (path: string, message: string) => context.addIssue({ code: 'custom', path: [path], message })
  if (said.goodOn !== null && said.goodOn > said.foundOn) refuse('goodOn', 'The last good day must not be after the day it was found wrong')
  if (said.errorKind === 'not_known') return { ...said, errorAmount: null }
  if (said.errorKind === 'absolute' && said.quantity === null) refuse('quantity', 'Choose which readings: a fixed amount is of one quantity')
  const bare = typeof said.errorAmount === 'string' ? said.errorAmount.replace(/(?:%|ppm)\s*$/u, '').trim() : said.errorAmount
  const read = said.errorKind === 'absolute' && said.quantity !== null ? readAmount(said.errorAmount, said.quantity) : readAmount(bare, said.errorKind === 'decibel' ? 'level' : 'percent')
  if (!read.ok || read.value === null) refuse('errorAmount', read.ok ? 'Enter by how much it reads too high; with a minus if too low' : read.sentence)
  return { ...said, errorAmount: read.ok ? read.value : null }
})
export type NewRecall = z.output<typeof newRecall>

export const recallParams = z.object({ tag: tagOf('B'), number: z.coerce.number({ error: 'A recall has a number' }).int('A recall has a whole number').min(1, 'The first recall is 1') })
export const recallSheetParams = recallParams.extend({ id: uuid('a sheet of the recall') })

export const decidedRecallSheet = z.object({
  outcome: z.enum(RECALL_OUTCOMES, { error: 'Choose what follows' }),
  note: optionalLine('the note', 400),
  /** The outcome that was seen when it was decided; null for none. Another in the meantime is refused. */
  seen: z.enum(RECALL_OUTCOMES).nullable().default(null),
})
export type DecidedRecallSheet = z.output<typeof decidedRecallSheet>
