import { z } from 'zod'
import { OWNERSHIPS, SOURCE_KINDS } from '../domain/acquisition'
import { KEPT_WITH_KINDS, ORIGINALITIES } from '../domain/kept-with'
import { KNOWLEDGE } from '../domain/knowledge'
import type { Knowledge } from '../domain/knowledge'
import { day, line, optionalLine, optionalProse, versionSeen } from './common'
import { modelName } from './model'
import { tagOf } from './params'
import { typedAmount, typedMinutes, typedWhole } from './typed'

/** What was found of a line of the model's kit. */
export const KIT_FINDINGS = ['here', 'missing', 'not_looked'] as const
export type KitFinding = (typeof KIT_FINDINGS)[number]
export const KIT_FINDING_LABELS: Record<KitFinding, string> = { here: 'Here', missing: 'Missing', not_looked: 'Not looked' }

const SERIAL_LENGTH = 80
const serialAnswer = z.enum(KNOWLEDGE, { error: 'Choose what is known of the serial' })
const ownership = z.enum(OWNERSHIPS, { error: 'Choose whose it is' })
const sourceKind = z.enum(SOURCE_KINDS, { error: 'Choose where it came from' })

/** A serial is there exactly when it is known; anything else typed beside another answer is dropped. */
const settleSerial = (answer: Knowledge, serial: string) => answer === 'known' ? serial : null

const kitCount = z.object({
  kitItemId: z.uuid({ error: 'That line of the kit is not known' }),
  found: z.enum(KIT_FINDINGS, { error: 'Say whether it is here, missing or not looked for' }),
  /** How many of the line are here; all of them unless said. */
  count: typedWhole('the count', 0, 99),
  originality: z.enum(ORIGINALITIES, { error: 'Choose whether it is the original' }).default('not_known'),
  condition: optionalLine('the condition', 400),
})

const extra = z.object({
  kind: z.enum(KEPT_WITH_KINDS, { error: 'Choose what kind of thing it is' }),
  description: line('what it is'),
  originality: z.enum(ORIGINALITIES, { error: 'Choose whether it is the original' }).default('not_known'),
  condition: optionalLine('the condition', 400),
})

/** A piece booked in at the doorway. */
export const newUnit = z.object({
  /** One of the two: a model the shop knows, or the name of a new one. */
  modelId: z.uuid({ error: 'Choose the model' }).nullable().default(null),
  newModel: modelName.nullable().default(null),
  serialAnswer,
  serial: optionalLine('the serial', SERIAL_LENGTH),
  conditionNotes: optionalProse('the condition notes'),
  supplyAsSet: optionalLine('the supply as set'),
  ownership,
  sourceKind,
  sourceName: optionalLine('the name'),
  sourceNote: optionalLine('the note', 400),
  acquiredOn: day('the day it came'),
  /** As typed, in the shop's currency; only from those who may see costs. */
  cost: typedAmount('what it cost').default(''),
  placeTag: z.preprocess(value => value === '' ? null : value, tagOf('L').nullable().default(null)),
  kit: z.array(kitCount, { error: 'The kit must be a list' }).max(60, 'The kit has 60 lines at most').default([]),
  extras: z.array(extra, { error: 'The other things must be a list' }).max(60, 'Note 60 other things at most').default([]),
}).refine(value => Boolean(value.modelId) || Boolean(value.newModel), {
  path: ['model'],
  error: 'Choose the model, or add a new one',
  // Said at once with whatever else is missing, not after it.
  when: ({ value }) => typeof value === 'object' && value !== null,
}).superRefine((value, context) => {
  const refuse = (path: string, message: string) => context.addIssue({ code: 'custom', path: [path], message })
  if (value.modelId !== null && value.newModel !== null) refuse('model', 'Choose the model or add a new one, not both')
  if (value.serialAnswer === 'known' && value.serial === '') refuse('serial', 'Enter the serial, or choose why there is none')
  if (value.ownership === 'consigned' && value.sourceName === '') refuse('sourceName', 'Enter the consignor’s name')
  if (value.ownership === 'consigned' && value.cost !== '') refuse('cost', 'A consigned piece was not paid for: leave the cost empty')
}).transform(value => ({ ...value, serial: settleSerial(value.serialAnswer, value.serial) }))
export type NewUnit = z.output<typeof newUnit>
/** The same as a script or a form sends it. */
export type NewUnitSent = z.input<typeof newUnit>

/** Text that is left alone when it is not sent. */
const given = (schema: ReturnType<typeof optionalLine>, label: string) => z.string({ error: `${label} must be text` }).transform((text, context) => {
  const read = schema.safeParse(text)
  if (read.success) return read.data
  context.addIssue({ code: 'custom', message: read.error.issues[0]?.message ?? `${label} must be text` })
  return z.NEVER
}).optional()

/** Changes to a unit's record: what is not sent stays as it is. */
export const changedUnit = z.object({
  modelId: z.uuid({ error: 'Choose the model' }).optional(),
  serialAnswer: serialAnswer.optional(),
  serial: given(optionalLine('the serial', SERIAL_LENGTH), 'Serial'),
  conditionNotes: given(optionalProse('the condition notes'), 'Condition notes'),
  supplyAsSet: given(optionalLine('the supply as set'), 'Supply as set'),
  ownership: ownership.optional(),
  sourceKind: sourceKind.optional(),
  sourceName: given(optionalLine('the name'), 'Name'),
  sourceNote: given(optionalLine('the note', 400), 'Note'),
  acquiredOn: day('the day it came').optional(),
  cost: typedAmount('what it cost').optional(),
  version: versionSeen,
}).superRefine((value, context) => {
  const refuse = (path: string, message: string) => context.addIssue({ code: 'custom', path: [path], message })
  if (value.serialAnswer === 'known' && !value.serial) refuse('serial', 'Enter the serial, or choose why there is none')
  if (value.serialAnswer === undefined && value.serial !== undefined) refuse('serialAnswer', 'Choose what is known of the serial')
  if (value.ownership === 'consigned' && value.sourceName === '') refuse('sourceName', 'Enter the consignor’s name')
}).transform(value => ({ ...value, serial: value.serialAnswer === undefined ? undefined : settleSerial(value.serialAnswer, value.serial ?? '') }))
export type ChangedUnit = z.output<typeof changedUnit>

/** The asking price as typed, in the shop's currency; empty takes it off. */
export const askingPrice = z.object({ asking: typedAmount('the asking price'), version: versionSeen })
export type AskingPrice = z.output<typeof askingPrice>

/** Bench time after which to stop and think, typed like minutes in the log; empty takes it off. */
export const unitCeiling = z.object({ minutes: typedMinutes('the ceiling', 1), version: versionSeen })
export type UnitCeiling = z.output<typeof unitCeiling>
