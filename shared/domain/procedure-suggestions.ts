/**
 * A procedure's checkpoints made from a model's published specification in one step, to be edited afterwards. What the model
 * does not hold (steps, ranges, rails) is typed as a list. Limits that stand here are usual for the period; common practice,
 * no source, unless the line says otherwise: the model's own table goes before them.
 */
import type { Checkpoint, Section } from './checkpoint'
import { dialCheckpoint, dialCheckpoints, modelCheckpoints } from './dial-check'
import type { DialBand } from './dial-check'
import type { EquipmentKind } from './equipment-kinds'
import { formatFrequency } from './frequency'
import type { Limit } from './limits'
import { nearestMark } from './log-scale'
import type { Quantity } from './reading'
import { parseReading } from './reading'

/** What a model tells, as far as a procedure is made of it. */
export interface PublishedSpecification {
  kind: EquipmentKind
  bands: readonly DialBand[]
  dialTolerancePercent: number | null
  modulationHz: number | null
}

export const SUGGESTION_GROUPS = ['dial', 'output_level', 'attenuator', 'modulation', 'meter', 'timebase', 'vertical', 'resistance', 'capacitance', 'inductance', 'rail', 'voltage_chart'] as const
export type SuggestionGroup = (typeof SUGGESTION_GROUPS)[number]

/** How a group is asked for: its words, what its list holds, and the limit it starts from. `limit` in per cent or dB as `limitKind` says. */
interface GroupPlan { label: string, section: Section, quantity: Quantity, list: string | null, limitKind: 'percent_of_setting' | 'percent_of_span' | 'decibel' | null, limit: number | null }
export const GROUP_PLANS: Record<SuggestionGroup, GroupPlan> = {
  dial: { label: 'Dial, every band', section: 'dial', quantity: 'frequency', list: null, limitKind: 'percent_of_setting', limit: null },
  output_level: { label: 'Output level over the bands', section: 'output_level', quantity: 'level', list: null, limitKind: 'decibel', limit: 2 },
  attenuator: { label: 'Attenuator steps', section: 'attenuator', quantity: 'level', list: '0, -20, -40, -60, -80 dB', limitKind: 'decibel', limit: 2 },
  modulation: { label: 'Modulation depth and tone', section: 'modulation', quantity: 'percent', list: '30 %', limitKind: 'percent_of_setting', limit: 10 },
  meter: { label: 'Meter scales, full and half', section: 'meter', quantity: 'voltage', list: '1.5 V, 5 V, 15 V, 50 V, 150 V', limitKind: 'percent_of_span', limit: 3 },
  timebase: { label: 'Sweep, every speed', section: 'timebase', quantity: 'duration', list: '10 ms, 1 ms, 100 us, 10 us, 1 us', limitKind: 'percent_of_setting', limit: 3 },
  vertical: { label: 'Vertical, every step', section: 'vertical', quantity: 'voltage', list: '50 mV, 0.1 V, 0.5 V, 1 V, 5 V', limitKind: 'percent_of_setting', limit: 3 },
  resistance: { label: 'Resistance ranges', section: 'component_range', quantity: 'resistance', list: '10 ohm, 1 k, 100 k, 1 M', limitKind: 'percent_of_setting', limit: 1 },
  capacitance: { label: 'Capacitance ranges', section: 'component_range', quantity: 'capacitance', list: '100 pF, 10 nF, 1 uF', limitKind: 'percent_of_setting', limit: 1 },
  inductance: { label: 'Inductance ranges', section: 'component_range', quantity: 'inductance', list: '1 mH, 100 mH, 10 H', limitKind: 'percent_of_setting', limit: 1 },
  rail: { label: 'Supply rails', section: 'rail', quantity: 'voltage', list: 'HT 250 V, heaters 6.3 V', limitKind: 'percent_of_setting', limit: 5 },
  voltage_chart: { label: 'Voltage chart', section: 'voltage_chart', quantity: 'voltage', list: 'V1 anode 180 V, V1 screen 90 V', limitKind: 'percent_of_setting', limit: 20 },
}

/** The groups usually checked for a kind (table of what is checked, trade notes; common practice, no source). */
export const USUAL_GROUPS: Record<EquipmentKind, readonly SuggestionGroup[]> = {
  rf_generator: ['dial', 'output_level', 'attenuator', 'modulation', 'rail'],
  sweep_generator: ['dial', 'output_level', 'attenuator', 'rail'],
  stereo_generator: ['dial', 'output_level', 'modulation'],
  audio_oscillator: ['dial', 'output_level', 'attenuator', 'rail'],
  oscilloscope: ['rail', 'vertical', 'timebase'],
  voltmeter: ['meter', 'resistance', 'rail'],
  multimeter: ['meter', 'resistance'],
  bridge: ['resistance', 'capacitance', 'inductance'],
  counter: ['dial', 'rail'],
  power_supply: ['rail', 'meter'],
  valve_tester: ['meter', 'voltage_chart'],
  communications_receiver: ['dial', 'rail', 'voltage_chart'],
  domestic_receiver: ['dial', 'voltage_chart'],
  tuner: ['dial', 'rail'],
  amplifier: ['output_level', 'rail', 'voltage_chart'],
  transceiver: ['dial', 'output_level', 'rail'],
  other: ['rail'],
}

/** What a technician chose: for each group its list as typed and its limit, in per cent or dB. */
export type GroupChoice = Partial<Record<SuggestionGroup, { list: string, limit: number }>>
export interface SuggestionOptions { groups: GroupChoice, dialPoints: number }
export interface Suggestions { checkpoints: Checkpoint[], problems: string[] }

/** Most points a band is read at in one suggestion. */
export const MOST_DIAL_POINTS = 21

/** The settings of a band read at `count` points: its ends and marks evenly spaced on the logarithm between; never one twice, none is 0. */
export function bandSettings(band: Pick<DialBand, 'lowerHz' | 'upperHz'>, count: number): number[] {
  if (count <= 3 || band.lowerHz === band.upperHz) return dialCheckpoints(band).map(({ settingHz }) => settingHz)
  const lower = band.lowerHz > 0 ? band.lowerHz : nearestMark(band.upperHz / 10)
  const between = Array.from({ length: count - 2 }, (_, index) => lower * (band.upperHz / lower) ** ((index + 1) / (count - 1)))
  const marks = between.map((hz) => {
    const mark = nearestMark(hz, 2)
    return mark > lower && mark < band.upperHz ? mark : Math.round(hz)
  })
  return [...new Set([lower, ...marks, band.upperHz])].filter(hz => hz > 0).sort((a, b) => a - b)
}

function dialGroup({ bands, dialTolerancePercent }: PublishedSpecification, count: number): Suggestions {
  if (count <= 3) {
    const checkpoints = modelCheckpoints(bands, dialTolerancePercent)
    return { checkpoints, problems: checkpoints.length === 0 ? ['The model gives no dial tolerance, so no dial points can be made. Enter one on the model first.'] : [] }
  }
  const wide = modelCheckpoints(bands, dialTolerancePercent)
  const labels = new Set(wide.map(({ bandLabel }) => bandLabel))
  return {
    checkpoints: bands.filter(({ label }) => labels.has(label)).flatMap(band =>
      bandSettings(band, count).map(hz => dialCheckpoint(band.label, hz, band.dialTolerancePercent ?? dialTolerancePercent ?? 0))),
    problems: wide.length === 0 ? ['The model gives no dial tolerance, so no dial points can be made. Enter one on the model first.'] : [],
  }
}

/** Level relative to the first point of all, at low, middle and high of each band that generates or passes. */
function levelGroup({ bands }: PublishedSpecification, limit: number): Suggestions {
  const own = bands.filter(({ function: does }) => does === 'generates' || does === 'passes' || does === 'transmits')
  const checkpoints = own.flatMap(band => dialCheckpoints(band).map(({ settingHz }): Checkpoint => ({
    section: 'output_level', bandLabel: band.label, label: '', quantity: 'level', atHz: settingHz, nominal: 0, span: null, limit: { kind: 'decibel', amount: limit },
  })))
  return { checkpoints, problems: checkpoints.length === 0 ? ['None of the model’s bands generates or passes anything, so there is no output level to read.'] : [] }
}

/** The tone of the modulator, read in hertz; ±10 % of its nominal is usual. */
function toneCheckpoint(modulationHz: number): Checkpoint {
  return { section: 'modulation', bandLabel: '', label: `Tone, ${formatFrequency(modulationHz)}`, quantity: 'frequency', atHz: null, nominal: modulationHz, span: null, limit: { kind: 'percent_of_setting', amount: 10 } }
}

/** Takes a list of amounts apart: "HT 250 V, heaters 6.3 V". A unit at the end holds for bare numbers before it. */
function readList(list: string, quantity: Quantity): { entries: { label: string, value: number }[], problems: string[] } {
  const parts = list.split(/[,;\n]+/).map(part => part.trim()).filter(Boolean)
  const unit = /[^\d.\s+\u2212-]+$/u.exec(parts.at(-1) ?? '')?.[0] ?? ''
  const read = parts.map((part) => {
    const [, label = '', amount = part] = /^(.*?)\s*([-+\u2212]?\d[\d.]*\s*\S*)$/u.exec(part) ?? []
    const reading = parseReading(/^[-+\u2212]?[\d.]+$/u.test(amount.trim()) ? `${amount} ${unit}` : amount, quantity)
    return reading.ok ? { ok: true as const, label: label.trim(), value: reading.value } : { ok: false as const, sentence: `“${part}”: ${reading.sentence}` }
  })
  return { entries: read.flatMap(each => each.ok ? [{ label: each.label, value: each.value }] : []), problems: read.flatMap(each => each.ok ? [] : [each.sentence]) }
}

const limitOf = (kind: GroupPlan['limitKind'], amount: number): Limit | null => kind === null ? null : { kind, amount }

/** What one entry of a list becomes: a meter's range is read at full scale and at half, everything else once. */
function pointsOf(group: SuggestionGroup, { section, quantity, limitKind }: GroupPlan, entry: { label: string, value: number }, limit: number): Checkpoint[] {
  const point = (label: string, nominal: number, span: number | null): Checkpoint =>
    ({ section, bandLabel: '', label, quantity, atHz: null, nominal, span, limit: limitOf(limitKind, limit) })
  const named = entry.label
  if (group === 'meter') return [point([named, 'full scale'].filter(Boolean).join(', '), entry.value, entry.value), point([named, 'half scale'].filter(Boolean).join(', '), entry.value / 2, entry.value)]
  return [point(named || LABELS[group] || '', entry.value, null)]
}

const LABELS: Partial<Record<SuggestionGroup, string>> = {
  attenuator: 'Step', modulation: 'Depth', timebase: 'Per division', vertical: 'Per division', resistance: 'Standard resistor', capacitance: 'Standard capacitor', inductance: 'Standard inductor', rail: 'Rail',
}

function listGroup(group: SuggestionGroup, choice: { list: string, limit: number }): Suggestions {
  const plan = GROUP_PLANS[group]
  const { entries, problems } = readList(choice.list, plan.quantity)
  return {
    checkpoints: entries.flatMap(entry => pointsOf(group, plan, entry, choice.limit)),
    problems: problems.length === 0 && entries.length === 0 ? [`${plan.label}: list what is to be read, like ${plan.list ?? ''}.`] : problems.map(problem => `${plan.label}: ${problem}`),
  }
}

function suggestGroup(group: SuggestionGroup, choice: { list: string, limit: number }, spec: PublishedSpecification, dialPoints: number): Suggestions {
  if (group === 'dial') return dialGroup(spec, Math.min(dialPoints, MOST_DIAL_POINTS))
  if (group === 'output_level') return levelGroup(spec, choice.limit)
  const listed = listGroup(group, choice)
  return group === 'modulation' && spec.modulationHz ? { ...listed, checkpoints: [...listed.checkpoints, toneCheckpoint(spec.modulationHz)] } : listed
}

/** Everything chosen, group by group, with every entry that could not be read as a sentence. No checkpoint stands twice. */
export function suggestCheckpoints(spec: PublishedSpecification, { groups, dialPoints }: SuggestionOptions): Suggestions {
  const made = SUGGESTION_GROUPS.flatMap((group) => {
    const choice = groups[group]
    return choice ? [suggestGroup(group, choice, spec, dialPoints)] : []
  })
  const seen = new Set<string>()
  return {
    problems: made.flatMap(({ problems }) => problems),
    checkpoints: made.flatMap(({ checkpoints }) => checkpoints).filter((point) => {
      const key = JSON.stringify([point.section, point.bandLabel, point.label, point.quantity, point.atHz, point.nominal])
      return seen.has(key) ? false : Boolean(seen.add(key))
    }),
  }
}
