import type { EquipmentKind } from './equipment-kinds'

/** How a check that is answered rather than measured came out. */
export const CHECK_RESULTS = ['pass', 'fail', 'not_done', 'not_applicable'] as const
export type CheckResult = (typeof CHECK_RESULTS)[number]
export const CHECK_RESULT_LABELS: Record<CheckResult, string> = {
  pass: 'Pass', fail: 'Fail', not_done: 'Not done', not_applicable: 'Not applicable',
}

const anyMains = ['Pilot lamp lights', 'Switches and controls work', 'No smell, smoke or undue heat after warm-up']

/** The free checks suggested for a kind (common practice, no source); edited freely on the sheet. */
export const SUGGESTED_CHECKS: Record<EquipmentKind, readonly string[]> = {
  rf_generator: ['Internal modulation present', 'Attenuator works on every step', 'Output present on every band', ...anyMains],
  sweep_generator: ['Sweep present', 'Markers present', 'Attenuator works on every step', ...anyMains],
  stereo_generator: ['Pilot present', 'Left and right separate', ...anyMains],
  audio_oscillator: ['Output present on every range', 'Output control works', ...anyMains],
  oscilloscope: ['Trace on both beams', 'Focus and brightness', 'Triggers on every source', 'Calibrator present', ...anyMains],
  voltmeter: ['Zero holds on every range', 'Meter moves freely', ...anyMains],
  multimeter: ['Meter moves freely', 'Ohms zero on every range', 'Battery compartment clean'],
  bridge: ['Null found on every range', 'Internal source present', ...anyMains],
  counter: ['All digits light', 'Every gate time works', 'Counts its own reference', ...anyMains],
  power_supply: ['Output adjusts over the whole range', 'Current limit works', 'Meters read', ...anyMains],
  valve_tester: ['Line set reaches its mark', 'Shorts lamp works', 'Protective lamp is of the right type', ...anyMains],
  communications_receiver: ['Receives on every band', 'BFO works', 'AVC works', 'Signal meter moves', ...anyMains],
  domestic_receiver: ['Receives on every waveband', 'Tone and volume work', 'Dial cord runs', ...anyMains],
  tuner: ['Receives on every band', 'Stereo lamp lights', 'Muting works', ...anyMains],
  amplifier: ['Both channels work', 'No DC at the loudspeaker terminals', 'Controls quiet', ...anyMains],
  transceiver: ['Receives', 'Transmits into a dummy load only', 'Changeover relay works'],
  other: [...anyMains],
}

/** The free checks suggested for a sitting without power (common practice, no source). */
export const COLD_CHECKS: readonly string[] = [
  'Lead, plug and fuse looked at', 'Controls and switches turn freely', 'Nothing loose, burnt or leaking inside',
]
