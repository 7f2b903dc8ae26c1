import { z } from 'zod'
import type { PartRecallBasis } from '../domain/part-lots'
import { PART_KINDS, PART_RECALL_BASES, PART_RECALL_OUTCOMES } from '../domain/part-lots'
import { day, line, optionalLine } from './common'
import { tagOf } from './params'

const emptyAsNull = (value: unknown) => value === '' ? null : value
const optionalDay = (label: string) => z.preprocess(emptyAsNull, day(label).nullable().default(null))

const typedBasis = z.object({
  basis: z.enum(PART_RECALL_BASES, { error: 'Choose what the recall goes by' }),
  lotTag: z.preprocess(emptyAsNull, tagOf('P').nullable().default(null)),
  supplierName: optionalLine('the supplier'),
  invoiceNumber: optionalLine('the invoice number', 60),
  madeFrom: optionalDay('the first day they were made'),
  madeTo: optionalDay('the last day they were made'),
  /** Narrows a range of date codes. */
  kind: z.preprocess(emptyAsNull, z.enum(PART_KINDS, { error: 'Choose a kind of part from the list' }).nullable().default(null)),
  maker: optionalLine('the maker as marked'),
  value: optionalLine('the value', 60),
})
type TypedBasis = z.output<typeof typedBasis>

/** What each basis can't do without, and what is said where it is missing. */
const NEEDS: Record<PartRecallBasis, Partial<Record<keyof TypedBasis, string>>> = {
  lot: { lotTag: 'Enter the tag of the lot, like P 000004 B' },
  invoice: { supplierName: 'Enter the supplier', invoiceNumber: 'Enter the invoice number' },
  made_between: { madeFrom: 'Enter the first day they were made', madeTo: 'Enter the last day they were made' },
  maker_and_value: { maker: 'Enter the maker as marked', value: 'Enter the value' },
}

function isWhole(said: TypedBasis, context: z.RefinementCtx): void {
  for (const [field, message] of Object.entries(NEEDS[said.basis])) {
    if (!Object.entries(said).some(([key, answer]) => key === field && answer !== null && answer !== '')) context.addIssue({ code: 'custom', path: [field], message })
  }
  if (said.basis === 'made_between' && said.madeFrom !== null && said.madeTo !== null && said.madeFrom > said.madeTo) {
    context.addIssue({ code: 'custom', path: ['madeTo'], message: 'The last day must not be before the first' })
  }
}

/** What was typed for another basis is not kept. */
function ofItsBasis<T extends TypedBasis>(said: T): T {
  const isOf = (...bases: PartRecallBasis[]) => bases.includes(said.basis)
  return {
    ...said,
    lotTag: isOf('lot') ? said.lotTag : null,
    supplierName: isOf('invoice') ? said.supplierName : '',
    invoiceNumber: isOf('invoice') ? said.invoiceNumber : '',
    madeFrom: isOf('made_between') ? said.madeFrom : null,
    madeTo: isOf('made_between') ? said.madeTo : null,
    kind: isOf('made_between') ? said.kind : null,
    maker: isOf('made_between', 'maker_and_value') ? said.maker : '',
    value: isOf('maker_and_value') ? said.value : '',
  }
}

/** Parts that may be bad, as a person says which. */
export const partRecallBasis = typedBasis.superRefine(isWhole).transform(ofItsBasis)
export type PartRecallBasisInput = z.output<typeof partRecallBasis>

/** A recall of parts as it is raised. */
export const newPartRecall = typedBasis.extend({
  why: line('why they may be bad', 400),
  /** Puts every recalled lot that is still good in quarantine with it. */
  quarantine: z.boolean({ error: 'Say whether the lots go in quarantine' }).default(false),
}).superRefine(isWhole).transform(ofItsBasis)
export type NewPartRecall = z.output<typeof newPartRecall>

export const partRecallParams = z.object({ number: z.coerce.number({ error: 'A recall has a number' }).int('A recall has a whole number').min(1, 'The first recall is 1').max(1_000_000, 'There is no such recall') })
export const partRecallUnitParams = partRecallParams.extend({ tag: tagOf('U') })

/** What was decided of one unit. */
export const decidedPartRecallUnit = z.object({
  outcome: z.enum(PART_RECALL_OUTCOMES, { error: 'Choose what was decided' }),
  note: optionalLine('the note', 400),
  /** The outcome that was seen when it was decided; null for none. Another in the meantime is refused. */
  seen: z.enum(PART_RECALL_OUTCOMES).nullable().default(null),
}).superRefine(({ outcome, note }, context) => {
  if (outcome === 'accepted' && note === '') context.addIssue({ code: 'custom', path: ['note'], message: 'Enter why it is accepted as it is' })
})
export type DecidedPartRecallUnit = z.output<typeof decidedPartRecallUnit>
