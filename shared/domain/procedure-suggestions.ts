/**
 * A procedure's checkpoints made from a model's published specification in one step, to be edited afterwards. What the model
 * does not hold (steps, ranges, rails) is typed as a list; what may stand in each is in `suggestion-groups.ts`.
 */
import { formatAmount } from './amount'
import type { Checkpoint } from './checkpoint'
import { dialCheckpoint, dialCheckpoints, markWithin } from './dial-check'
import type { DialBand } from './dial-check'
import type { SimpleLimit } from './limits'
import { boundsOf } from './limits'
import { nearestMark } from './log-scale'
import type { GroupPlan, PublishedSpecification, SuggestionGroup } from './suggestion-groups'
import { dialBands, GROUP_PLANS, levelBands, SUGGESTION_GROUPS } from './suggestion-groups'
import type { ListEntry } from './suggestion-list'
import { readList, readSteps } from './suggestion-list'

/** A group as chosen: its list as typed, and its limit in per cent or dB as its plan says; null where none was entered. */
export interface Choice { list: string, limit: number | null }
/** What a technician chose, and at how many points each band's dial is read. */
export interface SuggestionOptions { groups: Partial<Record<SuggestionGroup, Choice>>, dialPoints: number }
export interface Suggestions { checkpoints: Checkpoint[], problems: string[] }

/** The most points a band is read at in one suggestion; fewer than three are taken as three. */
export const MOST_DIAL_POINTS = 21
const FEWEST_DIAL_POINTS = 3
/** A tolerance wider than this is a slip. */
const WIDEST_LIMIT = 100

/** The settings of a band in Hz, read at `count` points: its ends, and between them marks of the dial evenly spaced on the logarithm; rising, none is 0. */
export function bandSettings(band: Pick<DialBand, 'lowerHz' | 'upperHz'>, count: number): number[] {
  const points = Math.min(Math.max(Math.floor(count) || 0, FEWEST_DIAL_POINTS), MOST_DIAL_POINTS)
  if (points === FEWEST_DIAL_POINTS || band.lowerHz === band.upperHz) return dialCheckpoints(band).map(({ settingHz }) => settingHz)
  const lower = band.lowerHz > 0 ? band.lowerHz : nearestMark(band.upperHz / 10)
  const ratio = (band.upperHz / lower) ** (1 / (points - 1))
  const between = Array.from({ length: points - 2 }, (_, index) => {
    const hz = lower * ratio ** (index + 1)
    // A mark nearer to this place than to its neighbours', so that no two places take the same.
    return markWithin(hz, hz / Math.sqrt(ratio), hz * Math.sqrt(ratio)) ?? Math.round(hz)
  })
  return [...new Set([lower, ...between, band.upperHz])].filter(hz => hz >= lower && hz <= band.upperHz).sort((a, b) => a - b)
}

/** The limit of a choice, or a sentence. */
function limitOf({ limit }: Choice, label: string): number | string {
  return limit !== null && limit > 0 && limit <= WIDEST_LIMIT ? limit : `${label}: enter the limit as a number above 0, at most ${WIDEST_LIMIT}.`
}

/** A band's own tolerance goes first, then the model's, then what the technician gave. */
function dialGroup(spec: PublishedSpecification, choice: Choice, count: number): Suggestions {
  const own = dialBands(spec)
  if (own.length === 0) return { checkpoints: [], problems: ['None of the model’s bands is set by a dial, so there are no dial points.'] }
  const stated = (band: DialBand) => band.dialTolerancePercent ?? spec.dialTolerancePercent
  const problem = own.some(band => stated(band) === null) ? limitOf(choice, 'Dial') : null
  if (typeof problem === 'string') {
    const without = own.filter(band => stated(band) === null).map(({ label }) => label).join(', ')
    return { checkpoints: [], problems: [`${problem} The model states no tolerance for band ${without}.`] }
  }
  return {
    problems: [],
    checkpoints: own.flatMap(band => bandSettings(band, count).map(hz => dialCheckpoint(band.label, hz, stated(band) ?? choice.limit ?? 0))),
  }
}

/** Level at low, middle and high of each band that gives one, against the set line. */
function levelGroup(spec: PublishedSpecification, limit: number): Suggestions {
  const own = levelBands(spec)
  if (own.length === 0) return { checkpoints: [], problems: ['None of the model’s bands gives an output, so there is no levelling to read.'] }
  const checkpoints = own.flatMap(band => dialCheckpoints(band).map(({ settingHz }): Checkpoint => ({
    section: 'output_level', bandLabel: band.label, label: '', quantity: 'level', atHz: settingHz, nominal: 0, span: null, limit: { kind: 'decibel', amount: limit },
  })))
  return { checkpoints, problems: [] }
}

const NAMES: Partial<Record<SuggestionGroup, string>> = {
  set_level: 'Output at the set line', attenuator: 'Step', modulation: 'Depth', timebase: 'Per division', vertical: 'Per division',
  resistance: 'Standard resistor', capacitance: 'Standard capacitor', inductance: 'Standard inductor', rail: 'Rail',
}

/** A meter's range is read at full scale and at half; its limit is of full scale. */
function meterPoints({ label, value, quantity, limit: own }: ListEntry, limit: SimpleLimit): Checkpoint[] {
  const bandLabel = [label, formatAmount(value, quantity)].filter(Boolean).join(' ')
  const applied: SimpleLimit = own?.kind === 'percent_of_setting' ? { kind: 'percent_of_span', amount: own.amount } : own ?? limit
  return ([['Full scale', 1], ['Half scale', 0.5]] as const).map(([name, share]): Checkpoint =>
    ({ section: 'meter', bandLabel, label: name, quantity, atHz: null, nominal: value * share, span: Math.abs(value), limit: applied }))
}

function pointsOf(group: SuggestionGroup, { section }: GroupPlan, entry: ListEntry, limit: SimpleLimit): Checkpoint[] {
  if (group === 'meter') return meterPoints(entry, limit)
  const label = group === 'modulation_tone' ? 'Tone' : entry.label || (NAMES[group] ?? '')
  return [{ section, bandLabel: '', label, quantity: entry.quantity, atHz: null, nominal: entry.value, span: null, limit: entry.limit ?? limit }]
}

/** What is wrong with an entry that could be read: one without a name that needs it, or limits between which nothing lies. */
function entryProblem(group: SuggestionGroup, entry: ListEntry, points: readonly Checkpoint[]): string | null {
  const shown = formatAmount(entry.value, entry.quantity)
  if (group === 'voltage_chart' && entry.label === '') return `Say where ${shown} is read, like V3 anode ${shown}.`
  const isNarrow = points.some((point) => {
    const limits = point.limit === null ? null : boundsOf(point.limit, point)
    return limits !== null && (!limits.ok || (limits.bounds.lower ?? 0) >= (limits.bounds.upper ?? 0))
  })
  return isNarrow ? `${shown} can’t have that limit: nothing would lie within it. Leave it out, or add it by hand with a limit as an amount.` : null
}

function listGroup(group: SuggestionGroup, choice: Choice, limit: number): Suggestions {
  const plan = GROUP_PLANS[group]
  const read = group === 'attenuator' ? readSteps(choice.list) : readList(choice.list, plan.quantities)
  const made = read.entries.map((entry) => {
    const points = pointsOf(group, plan, entry, { kind: plan.limitKind, amount: limit })
    return { points, problem: entryProblem(group, entry, points) }
  })
  const problems = [...read.problems, ...made.flatMap(({ problem }) => problem ?? [])]
  return {
    checkpoints: made.flatMap(({ points, problem }) => problem === null ? points : []),
    problems: problems.length === 0 && made.length === 0 ? [`${plan.label}: list what is to be read, like ${plan.example ?? ''}.`] : problems.map(problem => `${plan.label}: ${problem}`),
  }
}

function suggestGroup(group: SuggestionGroup, choice: Choice, spec: PublishedSpecification, dialPoints: number): Suggestions {
  if (group === 'dial') return dialGroup(spec, choice, dialPoints)
  const limit = limitOf(choice, GROUP_PLANS[group].label)
  if (typeof limit === 'string') return { checkpoints: [], problems: [limit] }
  return group === 'output_level' ? levelGroup(spec, limit) : listGroup(group, choice, limit)
}

/** What makes two checkpoints the same setting, whatever their limits. */
export const settingKey = ({ section, bandLabel, label, quantity, atHz, nominal }: Checkpoint): string => JSON.stringify([section, bandLabel, label, quantity, atHz, nominal])

/** Everything chosen, group by group, with every entry that could not be read as a sentence. No setting stands twice. */
export function suggestCheckpoints(spec: PublishedSpecification, { groups, dialPoints }: SuggestionOptions): Suggestions {
  const made = SUGGESTION_GROUPS.flatMap((group) => {
    const choice = groups[group]
    return choice ? [suggestGroup(group, choice, spec, dialPoints)] : []
  })
  const checkpoints = new Map<string, Checkpoint>()
  for (const point of made.flatMap(suggested => suggested.checkpoints)) {
    if (!checkpoints.has(settingKey(point))) checkpoints.set(settingKey(point), point)
  }
  return { checkpoints: [...checkpoints.values()], problems: made.flatMap(({ problems }) => problems) }
}
