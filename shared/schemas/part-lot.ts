import { z } from 'zod'
import { COUNT_SETTLEMENTS, ENTERED_SOURCES, LOT_CONDITIONS, LOT_STANDINGS, PART_KINDS, REMOVALS } from '../domain/part-lots'
import { COUNTED_IN } from '../domain/part-quantity'
import { day, line, optionalLine, pageQuery, versionSeen } from './common'
import { tagOf } from './params'
import { typedAmount } from './typed'

const emptyAsNull = (value: unknown) => value === '' ? null : value
const optionalDay = (label: string) => z.preprocess(emptyAsNull, day(label).nullable().default(null))
const placeTag = z.preprocess(emptyAsNull, tagOf('L').nullable().default(null))
/** As typed ("12", "1.5 m"): read by how the lot is counted. */
const typedQuantity = (label: string) => line(label, 40)

/** What the part is, whoever made it. */
export const partType = z.object({
  kind: z.enum(PART_KINDS, { error: 'Choose what kind of part it is' }),
  description: line('what it is'),
  value: optionalLine('the value', 60),
  tolerance: optionalLine('the tolerance', 40),
  rating: optionalLine('the rating', 80),
  package: optionalLine('the package or base', 80),
  countedIn: z.enum(COUNTED_IN, { error: 'Choose how it is counted' }).default('piece'),
})
export type PartTypeInput = z.output<typeof partType>

/** What is said of the lot itself. */
const described = z.object({
  maker: optionalLine('the maker as marked'),
  dateCode: optionalLine('the date code as marked', 40),
  madeFrom: optionalDay('the first day it can have been made'),
  madeTo: optionalDay('the last day it can have been made'),
  condition: z.enum(LOT_CONDITIONS, { error: 'Choose whether it is new, old stock or pulled' }),
  tested: optionalLine('how it was tested', 400),
  note: optionalLine('the note', 1000),
  placeTag,
})

type Dated = Pick<z.output<typeof described>, 'madeFrom' | 'madeTo'>
const datesTogether = ({ madeFrom, madeTo }: Dated, context: z.RefinementCtx) => {
  if ((madeFrom === null) !== (madeTo === null)) context.addIssue({ code: 'custom', path: [madeFrom === null ? 'madeFrom' : 'madeTo'], message: 'Enter both ends of when it was made, or neither' })
  if (madeFrom !== null && madeTo !== null && madeFrom > madeTo) context.addIssue({ code: 'custom', path: ['madeTo'], message: 'The last day must not be before the first' })
}

/** Where an entered lot came from. */
const source = z.object({
  sourceKind: z.enum(ENTERED_SOURCES, { error: 'Choose where it came from' }),
  supplierName: optionalLine('the supplier'),
  invoiceNumber: optionalLine('the invoice number', 60),
  acquiredOn: day('the day it came'),
})
const supplierNamed = ({ sourceKind, supplierName }: { sourceKind: string, supplierName: string }, context: z.RefinementCtx) => {
  if (sourceKind === 'supplier' && supplierName === '') context.addIssue({ code: 'custom', path: ['supplierName'], message: 'Enter the supplier, or choose another source' })
}

/** A lot that came in; it takes the next P tag. */
export const newPartLot = z.object({
  type: partType,
  ...described.shape,
  ...source.shape,
  quantity: typedQuantity('how many came in'),
  /** What they cost together, as typed; only from those who may see costs. */
  cost: typedAmount('what they cost together').default(''),
}).superRefine((lot, context) => {
  datesTogether(lot, context)
  supplierNamed(lot, context)
})
export type NewPartLot = z.output<typeof newPartLot>

/** The source corrected: also to another lot, where some of it was entered as a lot of its own. */
const correctedSource = source.extend({
  sourceKind: z.enum([...ENTERED_SOURCES, 'split'], { error: 'Choose where it came from' }),
  parentTag: z.preprocess(emptyAsNull, tagOf('P').nullable().default(null)),
}).superRefine((said, context) => {
  supplierNamed(said, context)
  if (said.sourceKind === 'split' && said.parentTag === null) context.addIssue({ code: 'custom', path: ['parentTag'], message: 'Enter the tag of the lot it was taken out of' })
})

/** A lot as it should be described now. */
export const changedPartLot = z.object({
  type: partType,
  ...described.shape,
  /** Left out for a lot that was pulled or split: its source is in the graph. */
  source: correctedSource.nullable().default(null),
  version: versionSeen,
}).superRefine(datesTogether)
export type ChangedPartLot = z.output<typeof changedPartLot>

export const lotParams = z.object({ tag: tagOf('P') })
export const movementParams = lotParams.extend({ id: z.coerce.number().int().min(1) })
export const countParams = lotParams.extend({ id: z.uuid('There is nothing at this address.') })

const flag = z.enum(['yes', 'no']).default('no')
export const lotsQuery = pageQuery.extend({
  q: optionalLine('the words', 200),
  kind: z.preprocess(emptyAsNull, z.enum(PART_KINDS).nullable().default(null)),
  standing: z.preprocess(emptyAsNull, z.enum(LOT_STANDINGS).nullable().default(null)),
  location: z.preprocess(emptyAsNull, tagOf('L').nullable().default(null)),
  /** Lots of which nothing is left, too. */
  empty: flag,
  /** Only those with a counting difference that nobody has settled. */
  findings: flag,
})
export type LotsQuery = z.output<typeof lotsQuery>

/** Parts that leave the drawer otherwise than into a unit. */
export const lotRemoval = z.object({
  how: z.enum(REMOVALS, { error: 'Choose what became of them' }),
  quantity: typedQuantity('how many'),
  note: line('to whom, or why', 400),
})
export type LotRemoval = z.output<typeof lotRemoval>

export const undoneMovement = z.object({ why: line('why it is taken back', 400) })
export type UndoneMovement = z.output<typeof undoneMovement>

export const lotStandingChange = z.object({
  standing: z.enum(LOT_STANDINGS, { error: 'Choose whether it may be fitted' }),
  why: line('why', 400),
  version: versionSeen,
})
export type LotStandingChange = z.output<typeof lotStandingChange>

/** Some of a lot become a lot of their own: a matched pair, the gassy ones. */
export const lotSplit = z.object({
  quantity: typedQuantity('how many'),
  why: line('why they are kept apart', 400),
  tested: optionalLine('how they were tested', 400),
  standing: z.enum(LOT_STANDINGS, { error: 'Choose whether they may be fitted' }).default('good'),
  placeTag,
})
export type LotSplit = z.output<typeof lotSplit>

export const lotCount = z.object({ counted: line('how many were counted', 40), note: optionalLine('the note', 400) })
export type LotCount = z.output<typeof lotCount>

export const settledCount = z.object({
  how: z.enum(COUNT_SETTLEMENTS, { error: 'Choose what the difference was' }),
  note: optionalLine('the note', 400),
})
export type SettledCount = z.output<typeof settledCount>

export const lotPlacing = z.object({ placeTag, version: versionSeen })
export type LotPlacing = z.output<typeof lotPlacing>

export const correctedReceipt = z.object({
  quantity: typedQuantity('how many came in'),
  cost: typedAmount('what they cost together').default(''),
  why: line('why it is corrected', 400),
  version: versionSeen,
})
export type CorrectedReceipt = z.output<typeof correctedReceipt>

export const lotPhotoQuery = z.object({ of: z.uuid('There is no such picture.') })
