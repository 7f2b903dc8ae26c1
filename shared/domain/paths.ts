/**
 * The parts of a piece that a measurement depends on, so that later work is held against what it could have changed.
 * Which part feeds which reading is common practice, no source; that a rectifier of another type shifts the HT and with it
 * the dial is said in an oscillator handbook of 1961 (see the trade notes of staleness).
 */
import type { Section } from './checkpoint'

export const PATHS = ['supply', 'oscillator', 'output', 'modulator', 'signal', 'sweep', 'meter', 'nothing_measured'] as const
export type Path = (typeof PATHS)[number]

export const PATH_LABELS: Record<Path, string> = {
  supply: 'Supply rails and rectifier',
  oscillator: 'Oscillator, tuning and alignment',
  output: 'Output stage and attenuator',
  modulator: 'Modulator',
  signal: 'Amplifier and signal path',
  sweep: 'Sweep and deflection',
  meter: 'Meter and its circuit',
  nothing_measured: 'Nothing that is measured',
}

/** What each kind of reading depends on. The supply feeds them all. */
export const SECTION_PATHS: Record<Section, readonly Path[]> = {
  dial: ['supply', 'oscillator'],
  output_level: ['supply', 'oscillator', 'output', 'meter'],
  attenuator: ['output'],
  modulation: ['supply', 'oscillator', 'modulator'],
  meter: ['supply', 'meter', 'signal'],
  timebase: ['supply', 'sweep'],
  vertical: ['supply', 'signal', 'sweep'],
  component_range: ['supply', 'signal', 'meter', 'oscillator'],
  rail: ['supply'],
  voltage_chart: ['supply', 'oscillator', 'output', 'modulator', 'signal', 'sweep', 'meter'],
  other: ['supply', 'oscillator', 'output', 'modulator', 'signal', 'sweep', 'meter'],
}
