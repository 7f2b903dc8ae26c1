/**
 * What is usually checked of each kind of equipment, and the limits to start from. The limits are usual for the 1940s to
 * 1970s and vary by model: the model's own table goes before them. Where nothing else is said: common practice, no source.
 */
import { typedAmount } from './amount'
import type { Section } from './checkpoint'
import { isSetByDial } from './dial-check'
import type { DialBand } from './dial-check'
import type { EquipmentKind } from './equipment-kinds'
import type { CoverageFunction } from './functions'
import type { Quantity } from './reading'

/** What a model tells, as far as a procedure is made of it. */
export interface PublishedSpecification {
  kind: EquipmentKind
  bands: readonly DialBand[]
  dialTolerancePercent: number | null
  modulationHz: number | null
}

export const SUGGESTION_GROUPS = [
  'dial', 'set_level', 'output_level', 'attenuator', 'modulation', 'modulation_tone', 'meter', 'timebase', 'vertical',
  'resistance', 'capacitance', 'inductance', 'rail', 'voltage_chart',
] as const
export type SuggestionGroup = (typeof SUGGESTION_GROUPS)[number]

/** How a group is asked for: its words, what its list holds (null: no list), and how its limit is stated. */
export interface GroupPlan {
  label: string
  section: Section
  quantities: readonly [Quantity, ...Quantity[]]
  example: string | null
  limitKind: 'percent_of_setting' | 'percent_of_span' | 'decibel'
  limit: number
}

export const GROUP_PLANS: Record<SuggestionGroup, GroupPlan> = {
  dial: { label: 'Dial, every band', section: 'dial', quantities: ['frequency'], example: null, limitKind: 'percent_of_setting', limit: 2 },
  set_level: { label: 'Output at the set line', section: 'output_level', quantities: ['voltage', 'power', 'power_level'], example: '1 V or 0 dBm', limitKind: 'decibel', limit: 2 },
  output_level: { label: 'Output level over the bands', section: 'output_level', quantities: ['level'], example: null, limitKind: 'decibel', limit: 2 },
  attenuator: { label: 'Attenuator steps', section: 'attenuator', quantities: ['level'], example: '20 dB × 5, or 0, -20, -40 dB', limitKind: 'decibel', limit: 2 },
  modulation: { label: 'Modulation depth', section: 'modulation', quantities: ['percent'], example: '30 %', limitKind: 'percent_of_setting', limit: 10 },
  modulation_tone: { label: 'Modulation tone', section: 'modulation', quantities: ['frequency'], example: '400 Hz', limitKind: 'percent_of_setting', limit: 10 },
  meter: { label: 'Meter scales, full and half', section: 'meter', quantities: ['voltage', 'current'], example: '3 V, 10 V, AC 30 V', limitKind: 'percent_of_span', limit: 3 },
  timebase: { label: 'Sweep, every speed', section: 'timebase', quantities: ['duration'], example: '10 ms, 1 ms, 100 us', limitKind: 'percent_of_setting', limit: 3 },
  vertical: { label: 'Vertical, every step', section: 'vertical', quantities: ['voltage'], example: '50 mV, 0.1 V, 1 V', limitKind: 'percent_of_setting', limit: 3 },
  resistance: { label: 'Resistance ranges', section: 'component_range', quantities: ['resistance'], example: '10 ohm, 1 k, 100 k', limitKind: 'percent_of_setting', limit: 1 },
  capacitance: { label: 'Capacitance ranges', section: 'component_range', quantities: ['capacitance'], example: '100 pF, 10 nF, 1 uF', limitKind: 'percent_of_setting', limit: 1 },
  inductance: { label: 'Inductance ranges', section: 'component_range', quantities: ['inductance'], example: '1 mH, 100 mH, 10 H', limitKind: 'percent_of_setting', limit: 1 },
  rail: { label: 'Supply rails', section: 'rail', quantities: ['voltage'], example: 'HT 250 V ±10 %, heaters 6.3 V', limitKind: 'percent_of_setting', limit: 5 },
  voltage_chart: { label: 'Voltage chart', section: 'voltage_chart', quantities: ['voltage'], example: 'V3 anode 180 V, V3 screen 90 V', limitKind: 'percent_of_setting', limit: 20 },
}

/** The groups usually checked of a kind. */
const USUAL_GROUPS: Record<EquipmentKind, readonly SuggestionGroup[]> = {
  rf_generator: ['dial', 'set_level', 'output_level', 'attenuator', 'modulation', 'modulation_tone', 'rail'],
  sweep_generator: ['dial', 'set_level', 'output_level', 'attenuator', 'rail'],
  stereo_generator: ['dial', 'set_level', 'modulation', 'modulation_tone'],
  audio_oscillator: ['dial', 'set_level', 'output_level', 'attenuator', 'rail'],
  oscilloscope: ['rail', 'vertical', 'timebase'],
  voltmeter: ['meter', 'resistance', 'rail'],
  multimeter: ['meter', 'resistance'],
  bridge: ['resistance', 'capacitance', 'inductance'],
  counter: ['rail'],
  power_supply: ['rail', 'meter'],
  valve_tester: ['meter', 'voltage_chart'],
  communications_receiver: ['dial', 'rail', 'voltage_chart'],
  domestic_receiver: ['dial', 'voltage_chart'],
  tuner: ['dial', 'rail'],
  amplifier: ['set_level', 'output_level', 'rail', 'voltage_chart'],
  transceiver: ['dial', 'set_level', 'output_level', 'rail'],
  other: ['rail'],
}

/**
 * Where a kind's usual limit is not the group's. Audio oscillators: dial ±2 to 3 % (common practice, no source), flatness
 * ±1 dB (makers' house journals and handbooks, 1951 to 1961). Oscilloscopes: rails within 1 to 3 % (makers' handbooks and
 * calibration bulletins of the time). Transceivers: rated power −1 dB. Bench meters read as resistance: 5 % at mid-scale.
 */
const KIND_LIMITS: Partial<Record<EquipmentKind, Partial<Record<SuggestionGroup, number>>>> = {
  audio_oscillator: { dial: 3, set_level: 1, output_level: 1 },
  oscilloscope: { rail: 3 },
  voltmeter: { resistance: 5 },
  multimeter: { resistance: 5 },
  transceiver: { set_level: 1, output_level: 1 },
}

/** Depth at which a generator is usually checked. */
const USUAL_DEPTH = '30 %'
const GIVES_A_LEVEL: readonly CoverageFunction[] = ['generates', 'passes', 'transmits']

/** The bands whose level can be read. */
export const levelBands = ({ bands }: PublishedSpecification): DialBand[] => bands.filter(band => GIVES_A_LEVEL.includes(band.function))
/** The bands that a dial sets. */
export const dialBands = ({ bands }: PublishedSpecification): DialBand[] => bands.filter(isSetByDial)

/** A group as it is proposed for a model: the limit to start from, and the list as far as the model tells it. */
export interface ProposedGroup { group: SuggestionGroup, plan: GroupPlan, isUsual: boolean, isReady: boolean, list: string, limit: number }

function isPossible(group: SuggestionGroup, spec: PublishedSpecification): boolean {
  if (group === 'dial') return dialBands(spec).length > 0
  return group !== 'output_level' || levelBands(spec).length > 0
}

function listFor(group: SuggestionGroup, { modulationHz }: PublishedSpecification): string {
  if (group === 'modulation_tone' && modulationHz !== null) return typedAmount(modulationHz, 'frequency')
  return group === 'modulation' && modulationHz !== null ? USUAL_DEPTH : ''
}

/**
 * Every group that can be made for a model, those usual for its kind first. `isReady`: nothing more need be typed. Figures
 * that a model does not hold are left for the technician: one that is only usual would be a limit that nobody published.
 */
export function proposeGroups(spec: PublishedSpecification): ProposedGroup[] {
  const usual = USUAL_GROUPS[spec.kind]
  const ordered = [...usual, ...SUGGESTION_GROUPS.filter(group => !usual.includes(group))]
  return ordered.filter(group => isPossible(group, spec)).map((group) => {
    const plan = GROUP_PLANS[group]
    const list = listFor(group, spec)
    return { group, plan, isUsual: usual.includes(group), isReady: plan.example === null || list !== '', list, limit: KIND_LIMITS[spec.kind]?.[group] ?? plan.limit }
  })
}
