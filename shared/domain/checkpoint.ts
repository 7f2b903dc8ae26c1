/** One setting to be read on a sheet, and the part of a piece that it tells of. Values in base units of the quantity. */
import { formatFrequency } from './frequency'
import type { Limit } from './limits'
import type { Quantity } from './reading'

export const SECTIONS = [
  'dial', 'output_level', 'attenuator', 'modulation', 'meter', 'timebase', 'vertical', 'component_range', 'rail', 'voltage_chart', 'other',
] as const
export type Section = (typeof SECTIONS)[number]

export const SECTION_LABELS: Record<Section, string> = {
  dial: 'Dial',
  output_level: 'Output level',
  attenuator: 'Attenuator',
  modulation: 'Modulation',
  meter: 'Meter scales',
  timebase: 'Sweep',
  vertical: 'Vertical',
  component_range: 'Ranges',
  rail: 'Supply rails',
  voltage_chart: 'Voltage chart',
  other: 'Other readings',
}

/** What is usually read there; a checkpoint may say otherwise. */
export const SECTION_QUANTITIES: Record<Section, Quantity> = {
  dial: 'frequency', output_level: 'level', attenuator: 'level', modulation: 'percent', meter: 'voltage', timebase: 'duration',
  vertical: 'voltage', component_range: 'resistance', rail: 'voltage', voltage_chart: 'voltage', other: 'voltage',
}

export interface Checkpoint {
  section: Section
  /** Switch position: the band, range or step; empty where there is none. */
  bandLabel: string
  /** What is set or measured where the nominal value doesn't say it: "HT at V3 anode". */
  label: string
  quantity: Quantity
  /** Frequency at which it is read, whole hertz, where that matters: the setting of a dial, the carrier of a level. */
  atHz: number | null
  nominal: number | null
  /** Full scale, for limits in per cent of it. */
  span: number | null
  /** Null: no limit is published, so the reading is an indication. */
  limit: Limit | null
}

/** What a checkpoint is called in a row or a chart: "320 kc/s" for a dial, its label and frequency else. */
export function checkpointInWords({ section, label, atHz }: Pick<Checkpoint, 'section' | 'label' | 'atHz'>): string {
  const at = atHz === null ? '' : formatFrequency(atHz)
  if (section === 'dial') return at
  return label && at ? `${label}, ${at}` : label || at
}
