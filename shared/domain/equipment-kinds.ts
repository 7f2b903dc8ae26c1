/** What a model is. Words people search by stand beside each label. */
export const EQUIPMENT_KINDS = [
  'rf_generator', 'sweep_generator', 'stereo_generator', 'audio_oscillator', 'oscilloscope', 'voltmeter', 'multimeter',
  'bridge', 'counter', 'power_supply', 'valve_tester', 'communications_receiver', 'domestic_receiver', 'tuner',
  'amplifier', 'transceiver', 'other',
] as const
export type EquipmentKind = (typeof EQUIPMENT_KINDS)[number]

export const EQUIPMENT_KIND_LABELS: Record<EquipmentKind, string> = {
  rf_generator: 'RF signal generator',
  sweep_generator: 'Sweep generator',
  stereo_generator: 'FM stereo generator',
  audio_oscillator: 'Audio oscillator',
  oscilloscope: 'Oscilloscope',
  voltmeter: 'Electronic voltmeter',
  multimeter: 'Multimeter',
  bridge: 'Component bridge',
  counter: 'Frequency counter',
  power_supply: 'Bench power supply',
  valve_tester: 'Valve tester',
  communications_receiver: 'Communications receiver',
  domestic_receiver: 'Domestic receiver',
  tuner: 'Tuner',
  amplifier: 'Amplifier',
  transceiver: 'Transceiver',
  other: 'Other equipment',
}

/** Other words for the kind, for search: common practice, no source. */
export const EQUIPMENT_KIND_WORDS: Record<EquipmentKind, string> = {
  rf_generator: 'sig gen signal generator service oscillator RF',
  sweep_generator: 'sweeper wobbulator marker',
  stereo_generator: 'multiplex encoder stereo generator',
  audio_oscillator: 'AF generator sine oscillator low distortion',
  oscilloscope: 'scope trace CRO',
  voltmeter: 'VTVM valve voltmeter millivoltmeter',
  multimeter: 'meter volt-ohm multi',
  bridge: 'LCR impedance capacitance bridge',
  counter: 'frequency meter timer',
  power_supply: 'PSU bench supply HT',
  valve_tester: 'tube tester valve checker',
  communications_receiver: 'comms shortwave general coverage set',
  domestic_receiver: 'wireless radio set',
  tuner: 'FM AM tuner',
  amplifier: 'amp hi-fi',
  transceiver: 'transmitter receiver rig',
  other: '',
}

export const TECHNOLOGIES = ['valve', 'transistor', 'hybrid', 'passive'] as const
export type Technology = (typeof TECHNOLOGIES)[number]
export const TECHNOLOGY_LABELS: Record<Technology, string> = {
  valve: 'Valve', transistor: 'Transistor', hybrid: 'Valve and transistor', passive: 'Passive',
}
