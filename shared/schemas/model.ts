import { z } from 'zod'
import { EQUIPMENT_KINDS, TECHNOLOGIES } from '../domain/equipment-kinds'
import { parseFrequency } from '../domain/frequency'
import { FUNCTIONS } from '../domain/functions'
import type { CoverageFunction } from '../domain/functions'
import { KEPT_WITH_KINDS } from '../domain/kept-with'
import { HAZARDS } from '../domain/triage'
import { line, optionalLine, optionalProse, pageQuery, versionSeen } from './common'
import { typedFrequency, typedTolerance, typedWhole } from './typed'

export const MOST_BANDS = 60
export const MOST_KIT_LINES = 60
/** The years a maker's plate can say; wide of the trade's 1930s to 1980s on purpose. */
export const EARLIEST_YEAR = 1890
export const LATEST_YEAR = 2100
/** The highest modulation tone kept, hertz. */
export const HIGHEST_TONE_HZ = 1_000_000

/** Functions for which a band may begin at DC: a scope measures from DC, a signal generator does not generate it. */
const FROM_DC: readonly CoverageFunction[] = ['measures', 'passes']

const band = z.object({
  label: line('the band’s label', 40),
  function: z.enum(FUNCTIONS, { error: 'Choose what the band does' }),
  lower: typedFrequency('the lower edge'),
  upper: typedFrequency('the upper edge'),
  tolerance: typedTolerance('the band’s tolerance'),
}).superRefine((value, context) => {
  const refuse = (field: 'lower' | 'upper', message: string) => context.addIssue({ code: 'custom', path: [field], message })
  if (value.upper === 0) refuse('upper', 'The upper edge must be above zero')
  else if (value.lower > value.upper) refuse('lower', 'The lower edge is above the upper edge: swap them or mend one')
  else if (value.lower === 0 && !FROM_DC.includes(value.function)) refuse('lower', 'Only a band that measures or passes can begin at DC')
}).transform(({ lower, upper, tolerance, ...rest }) => ({ ...rest, lowerHz: lower, upperHz: upper, dialTolerancePercent: tolerance }))
export type BandInput = z.output<typeof band>

const kitLine = z.object({
  /** The line it was, when the model is changed; new lines have none. */
  id: z.uuid({ error: 'That line of the kit is not known' }).nullable().default(null),
  kind: z.enum(KEPT_WITH_KINDS, { error: 'Choose what kind of thing it is' }),
  description: line('what belongs to it'),
  quantity: typedWhole('the quantity', 1, 99).transform(quantity => quantity ?? 1),
})

const tone = z.union([z.string(), z.number()], { error: 'Enter the modulation tone, like 400 c/s' }).nullable().default(null).transform((value, context) => {
  if (value === null || String(value).trim() === '') return null
  const reading = parseFrequency(String(value), { assume: 'Hz' })
  if (reading.ok && reading.hz <= HIGHEST_TONE_HZ) return reading.hz
  context.addIssue({ code: 'custom', message: reading.ok ? 'The modulation tone must be 1 MHz or less' : reading.sentence })
  return z.NEVER
})

/** A model's name, all that booking in a piece of an unknown model asks for. */
export const modelName = z.object({
  maker: line('the maker'),
  designation: line('the type designation'),
  kind: z.enum(EQUIPMENT_KINDS, { error: 'Choose what kind of equipment it is' }),
})
export type ModelNameInput = z.output<typeof modelName>

const spec = modelName.extend({
  technology: z.preprocess(value => value === '' ? null : value, z.enum(TECHNOLOGIES, { error: 'Choose valve, transistor, both or passive' }).nullable().default(null)),
  yearsFrom: typedWhole('the first year made', EARLIEST_YEAR, LATEST_YEAR),
  yearsTo: typedWhole('the last year made', EARLIEST_YEAR, LATEST_YEAR),
  supply: optionalLine('the supply'),
  summary: optionalProse('the summary'),
  typicalHazards: z.array(z.enum(HAZARDS, { error: 'Choose hazards from the list' }), { error: 'Choose hazards from the list' })
    .default([]).transform(hazards => HAZARDS.filter(hazard => hazards.includes(hazard))),
  dialTolerancePercent: typedTolerance('the dial tolerance'),
  modulationHz: tone,
  bands: z.array(band, { error: 'The bands must be a list' }).max(MOST_BANDS, `A model has ${MOST_BANDS} bands at most`).default([]),
  kit: z.array(kitLine, { error: 'The kit must be a list' }).max(MOST_KIT_LINES, `The kit has ${MOST_KIT_LINES} lines at most`).default([]),
})

const yearsInOrder = (value: { yearsFrom: number | null, yearsTo: number | null }, context: z.RefinementCtx) => {
  if (value.yearsFrom !== null && value.yearsTo !== null && value.yearsFrom > value.yearsTo) {
    context.addIssue({ code: 'custom', path: ['yearsTo'], message: 'The last year made is before the first' })
  }
}

/** A new model with as much of its specification as is known. */
export const newModel = spec.superRefine(yearsInOrder)
export type NewModel = z.output<typeof newModel>

/** A model as it should be now, and the version it was changed from. */
export const changedModel = spec.extend({ version: versionSeen }).superRefine(yearsInOrder)
export type ChangedModel = z.output<typeof changedModel>

/** The same as typed in the form. */
export interface ModelAnswers {
  maker: string
  designation: string
  kind: NewModel['kind'] | ''
  technology: Exclude<NewModel['technology'], null> | ''
  yearsFrom: string
  yearsTo: string
  supply: string
  summary: string
  typicalHazards: NewModel['typicalHazards']
  dialTolerancePercent: string
  modulationHz: string
  bands: { label: string, function: CoverageFunction, lower: string, upper: string, tolerance: string }[]
  kit: { id: string | null, kind: NewModel['kit'][number]['kind'], description: string, quantity: string }[]
}

/** What `GET /api/models` takes: `q` is words of the maker and the type, typing errors forgiven. */
export const modelsQuery = pageQuery.extend({
  q: z.string({ error: 'q must be words' }).max(120, 'Search for 120 characters at most')
    .transform(text => text.normalize('NFC').replace(/\p{Cc}/gu, ' ').trim()).optional(),
})
export type ModelsQuery = z.output<typeof modelsQuery>
