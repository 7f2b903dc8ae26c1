import { z } from 'zod'
import type { Checkpoint } from '../domain/checkpoint'
import { SECTIONS } from '../domain/checkpoint'
import { DECISION_RULES, MOST_GUARD_FACTOR } from '../domain/decision'
import { HIGHEST_HZ, parseFrequency } from '../domain/frequency'
import type { Bounds, Limit, LimitKind } from '../domain/limits'
import { boundsOf, LIMIT_KINDS, SIMPLE_LIMIT_KINDS } from '../domain/limits'
import type { Quantity } from '../domain/reading'
import { QUANTITIES } from '../domain/reading'
import { optionalLine, uuid } from './common'
import { rawAmount, readAmount, typedShare } from './measure'
import type { RawAmount } from './measure'
import { MOST_POINTS } from './test-sheet'
import { typedWhole } from './typed'

/** A limit as typed: its kind and one or two amounts; the second for "from … to …" and for the other of "the larger of two". */
const typedLimit = z.object({
  kind: z.enum([...LIMIT_KINDS, 'none'], { error: 'Choose how the limit is stated' }),
  amount: rawAmount.nullable().default(null),
  second: rawAmount.nullable().default(null),
  secondKind: z.enum(SIMPLE_LIMIT_KINDS, { error: 'Choose how the other limit is stated' }).default('absolute'),
})
type TypedLimit = z.output<typeof typedLimit>

const row = z.object({
  section: z.enum(SECTIONS, { error: 'Choose the part it belongs to' }),
  bandLabel: optionalLine('the band', 40),
  label: optionalLine('what is read'),
  quantity: z.enum(QUANTITIES, { error: 'Choose what is read' }),
  /** The frequency at which it is read, with its unit; empty where none matters. */
  at: z.union([z.string().max(60), z.number()]).nullable().default(null),
  nominal: rawAmount.nullable().default(null),
  span: rawAmount.nullable().default(null),
  limit: typedLimit.default({ kind: 'none', amount: null, second: null, secondKind: 'absolute' }),
})
type Row = z.output<typeof row>
type Refuse = (path: (string | number)[], message: string) => void

const isPlain = (kind: LimitKind) => kind === 'percent_of_setting' || kind === 'percent_of_span' || kind === 'decibel'

/** An amount of a limit: a plain number where it is per cent or dB, else with the unit of the quantity. */
function limitAmount(raw: RawAmount | null, kind: LimitKind, quantity: Quantity, refuse: (message: string) => void): number | null {
  if (raw === null || String(raw).trim() === '') {
    refuse('Enter the limit')
    return null
  }
  const bare = typeof raw === 'number' ? raw : raw.replace(/^\s*(?:±|\+\/?-)/u, '').trim()
  const read = readAmount(isPlain(kind) && typeof bare === 'string' ? bare.replace(/(?:%|dB)\s*$/u, '') + (kind === 'decibel' ? ' dB' : ' %') : bare, kind === 'decibel' ? 'level' : isPlain(kind) ? 'percent' : quantity)
  if (read.ok && read.value !== null) return read.value
  refuse(read.ok ? 'Enter the limit' : read.sentence)
  return null
}

function readLimit({ kind, amount, second, secondKind }: TypedLimit, quantity: Quantity, refuse: Refuse): Limit | null {
  if (kind === 'none') return null
  const firstKind = kind === 'larger_of' ? 'percent_of_setting' : kind
  const value = limitAmount(amount, firstKind, quantity, message => refuse(['limit', 'amount'], message))
  const needsSecond = kind === 'between' || kind === 'larger_of'
  const other = needsSecond ? limitAmount(second, kind === 'between' ? 'between' : secondKind, quantity, message => refuse(['limit', 'second'], message)) : 0
  if (value === null || other === null) return null
  if (kind === 'between') return { kind, lower: value, upper: other }
  if (kind === 'larger_of') return { kind, of: [{ kind: 'percent_of_setting', amount: value }, { kind: secondKind, amount: other }] }
  return kind === 'at_least' || kind === 'at_most' ? { kind, value } : { kind, amount: value }
}

function readHz(raw: string | number | null, refuse: Refuse): number | null {
  if (raw === null || String(raw).trim() === '') return null
  const reading = typeof raw === 'number' ? parseFrequency(String(raw), { assume: 'Hz' }) : parseFrequency(raw)
  if (reading.ok && reading.hz <= HIGHEST_HZ) return reading.hz
  refuse(['at'], reading.ok ? 'That is above 3 000 GHz, the highest frequency kept' : reading.sentence)
  return null
}

/** What a dial is set to must be a frequency that can be kept; its whole hertz are where it is drawn. */
function dialSetting(quantity: Quantity, setting: number | null, refuse: Refuse): void {
  if (quantity !== 'frequency') refuse(['quantity'], 'A dial is read as a frequency')
  else if (setting === null) refuse(['nominal'], 'Enter what the dial is set to')
  else if (!(setting >= 1 && setting <= HIGHEST_HZ)) refuse(['nominal'], 'A dial is set to 1 Hz or more, up to 3 000 GHz')
}

/** Why nothing could lie within limits that are stated well enough. */
function narrowProblem(limit: Limit, bounds: Bounds): string | null {
  if (limit.kind === 'between' || bounds.lower === null || bounds.upper === null || bounds.lower < bounds.upper) return null
  return 'Nothing lies within this limit: state it as an amount above 0'
}

/** One row, as a checkpoint. */
export const checkpointRow = row.transform((typed: Row, context): Checkpoint => {
  const refuse: Refuse = (path, message) => context.addIssue({ code: 'custom', path, message })
  const { section, bandLabel, label, quantity } = typed
  const amount = (field: 'nominal' | 'span') => {
    const read = readAmount(typed[field], quantity)
    if (!read.ok) refuse([field], read.sentence)
    return read.ok ? read.value : null
  }
  const [nominal, span, atHz] = [amount('nominal'), amount('span'), readHz(typed.at, refuse)]
  const isDial = section === 'dial'
  const setting = isDial ? nominal ?? atHz : nominal
  const limit = readLimit(typed.limit, quantity, refuse)
  if (context.issues.length === 0 && limit !== null) {
    const limits = boundsOf(limit, { quantity, nominal: setting, span })
    const problem = limits.ok ? narrowProblem(limit, limits.bounds) : limits.sentence
    if (problem !== null) refuse(['limit', 'amount'], problem)
  }
  if (isDial) dialSetting(quantity, setting, refuse)
  else if (label === '' && bandLabel === '' && atHz === null) refuse(['label'], 'Say what is read')
  if (span !== null && span <= 0) refuse(['span'], 'The full scale must be above zero')
  return { section, bandLabel, label, quantity, atHz: isDial && setting !== null ? Math.round(setting) : atHz, nominal: setting, span, limit }
})

/** A procedure as it should be now. `seen`: the number of the version the form was opened on, 0 for none. */
export const savedProcedure = z.object({
  seen: z.int({ error: 'Open the procedure again: the version is missing' }).min(0),
  origin: optionalLine('where the limits come from', 400),
  why: optionalLine('what was changed', 400),
  warmUpMinutes: typedWhole('the warm-up in minutes', 0, 10_000),
  supply: optionalLine('the supply'),
  decisionRule: z.enum(DECISION_RULES, { error: 'Choose simple acceptance or a guard band' }),
  guardFactor: typedShare('the guard band’s factor', MOST_GUARD_FACTOR).transform(factor => Math.round((factor ?? 1) * 100) / 100),
  checkpoints: z.array(checkpointRow, { error: 'The checkpoints must be a list' })
    .min(1, 'A procedure reads at least one thing').max(MOST_POINTS, `A procedure has ${MOST_POINTS} checkpoints at most`),
}).superRefine(({ seen, why }, context) => {
  if (seen > 0 && why === '') context.addIssue({ code: 'custom', path: ['why'], message: 'Say what was changed since the last version' })
})
export type SavedProcedure = z.output<typeof savedProcedure>

/** The same as typed in the form. */
export interface CheckpointAnswers {
  section: Checkpoint['section']
  bandLabel: string
  label: string
  quantity: Quantity
  at: string
  nominal: string
  span: string
  limit: { kind: LimitKind | 'none', amount: string, second: string, secondKind: (typeof SIMPLE_LIMIT_KINDS)[number] }
}

export const procedureVersionParams = z.object({ id: uuid('a model'), number: z.coerce.number({ error: 'The version is a number' }).int('The version is a whole number').min(1, 'The first version is 1') })
export const procedureCopyQuery = z.object({ from: uuid('a model to copy from') })
