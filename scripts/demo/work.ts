import type { Disposition, Hand, Reason, Reversibility } from '../../shared/domain/modifications'

/** An entry of a demo piece's work log; `daysAgo` is when it was done (or found). */
export interface DemoWork {
  daysAgo: number
  hand?: Hand
  place: string
  before: string
  after: string
  reason: Reason
  reversibility?: Reversibility
  disposition: Disposition
  dispositionNote?: string
  bag?: string
  parts?: string
  testedAfter?: string
  minutes?: number
  photos?: boolean
}

const ours = (daysAgo: number, place: string, before: string, after: string, rest: Partial<DemoWork> & Pick<DemoWork, 'reason' | 'disposition'>): DemoWork =>
  ({ daysAgo, hand: 'done_by_us', place, before, after, reversibility: 're_solder', ...rest })
const found = (daysAgo: number, place: string, after: string, rest: Partial<DemoWork> = {}): DemoWork =>
  ({ daysAgo, hand: 'found_like_this', place, before: '', after, reason: 'not_known', reversibility: 'hole_to_fill', disposition: 'not_known', ...rest })
const leftAlone = (daysAgo: number, place: string, what: string, testedAfter = ''): DemoWork =>
  ({ daysAgo, hand: 'left_alone', place, before: what, after: '', reason: 'decision', disposition: 'nothing_removed', testedAfter })

/** The bench's usual jobs, by name, each as many days ago as the piece's own diary says. */
export const JOBS = {
  mainsFilter: (at: number) => ours(at, 'C14 mains filter', '0.1 µF wax-paper 350 V, cracked', '0.1 µF X2 275 V AC', { reason: 'safety', disposition: 'kept_with_unit', bag: 'Bag: removed mains filter capacitor', parts: 'Film X2 0.1 µF 275 V AC, Dielmark', testedAfter: 'Leakage 0.04 mA', minutes: 25, photos: true }),
  lead: (at: number) => ours(at, 'Mains lead', 'Perished two-core cloth lead', 'Three-core 0.75 mm² black, chassis earthed', { reason: 'safety', reversibility: 'no_trace', disposition: 'kept_with_unit', bag: 'Bag: removed lead and plug', parts: 'Mains flex 3-core 0.75 mm²', testedAfter: 'Earth bond 0.06 Ω', minutes: 35 }),
  selenium: (at: number) => ours(at, 'SR2, HT rail', 'Selenium stack, HT low', 'Silicon bridge and a 22 Ω 7 W dropper; stack left in place, isolated', { reason: 'fault', disposition: 'left_in_place', parts: 'Silicon bridge 400 V 2 A, Ferdlund; wirewound 22 Ω 7 W, Ohmbarrow', testedAfter: 'HT 248 V at 240 V', minutes: 45, photos: true }),
  coupling: (at: number) => ours(at, 'V4, C22', '0.01 µF waxed, leaky (1.1 MΩ)', '0.01 µF 630 V film, restuffed in the waxed tube', { reason: 'fault', disposition: 'discarded', dispositionNote: 'core only; the tube is reused', parts: 'Film 0.01 µF 630 V, Dielmark', testedAfter: 'Grid 0.0 V', minutes: 30 }),
  smoothing: (at: number) => ours(at, 'C30/C31 smoothing', '16 + 16 µF 450 V, 9 mA leakage', '2 × 22 µF 450 V 105 °C inside the old can', { reason: 'preventive', disposition: 'discarded', dispositionNote: 'innards only; the can is kept', parts: 'Electrolytic 22 µF 450 V 105 °C, Dielmark', testedAfter: 'HT 268 V at 240 V', minutes: 70 }),
  ifCan: (at: number) => ours(at, 'T3 IF can', 'Silver-mica shards, noisy', '110 pF 1 % silver-mica outside the coil', { reason: 'fault', disposition: 'discarded', parts: 'Silver mica 110 pF 1 % 500 V, Dielmark', testedAfter: 'IF re-peaked at 455 kHz', minutes: 60 }),
  cell: (at: number) => ours(at, 'Battery box', 'Leaked 15 V cell, corrosion', 'Cleaned; adaptor holding five 3 V coin cells', { reason: 'usability', reversibility: 'no_trace', disposition: 'kept_with_unit', bag: 'Bag: old cell clips', parts: 'Battery adaptor, made here', testedAfter: 'Ohms zero on every range', minutes: 50 }),
  diodeValve: (at: number) => ours(at, 'V1 AC diode', 'Original valve, low', 'Quernby twin diode, 96 % on the valve tester', { reason: 'fault', reversibility: 'no_trace', disposition: 'kept_with_unit', bag: 'Bag: original V1', parts: 'Twin diode, Quernby batch H7', testedAfter: '1.5 V range +1.2 %', minutes: 20 }),
  inlet: (at: number) => ours(at, 'Mains inlet', 'Unshrouded two-pin inlet', 'Moulded fused inlet; panel filed 1 mm each side', { reason: 'safety', reversibility: 'not_reversible', disposition: 'kept_with_unit', bag: 'Bag: old inlet', parts: 'Moulded inlet, fused, 10 A', testedAfter: 'Earth bond 0.05 Ω', minutes: 55, photos: true }),
  timebase: (at: number) => ours(at, 'Time base', '10 MHz +4.1 ppm as found', '+0.02 ppm as left after 24 h against an off-air standard', { reason: 'fault', reversibility: 'no_trace', disposition: 'nothing_removed', minutes: 40 }),
  outputPair: (at: number) => ours(at, 'Right channel outputs', 'Shorted pair', 'Complementary TO-3 pair, a sample opened and load-tested', { reason: 'fault', disposition: 'discarded', parts: 'Power transistor pair 140 V 15 A, Ferdlund', testedAfter: 'Offset 8 mV, idle 21 mA', minutes: 95 }),
  lamps: (at: number) => ours(at, 'Dial lamps', '6.3 V 0.3 A filament lamps', 'Warm-white LED on the same cap, with a bridge', { reason: 'usability', reversibility: 'no_trace', disposition: 'kept_with_unit', bag: 'Bag: original dial lamps', parts: 'LED lamp, small bayonet, Aubrecourt', testedAfter: 'No HF noise seen on 3.5 MHz', minutes: 25 }),
  tube: (at: number) => ours(at, 'EHT multiplier', 'Multiplier failed', 'Multiplier from a donor of the same type', { reason: 'fault', disposition: 'kept_with_unit', bag: 'Bag: failed multiplier', testedAfter: '3.01 kV, trace good', minutes: 80 }),
  knob: (at: number) => ours(at, 'Range knob', 'Pointer missing', 'Turned replica pointer', { reason: 'completeness', reversibility: 'no_trace', disposition: 'nothing_removed', parts: 'Knob pointer, replica, made here', minutes: 30 }),
  rewind: (at: number) => ours(at, 'Output transformer', 'Open primary', 'Rewound in the old frame by an outworker', { reason: 'fault', disposition: 'discarded', dispositionNote: 'old winding', testedAfter: '5.2 kΩ, no change of hum', minutes: 60 }),
  separation: (at: number) => ours(at, 'Stereo decoder', 'Separation 22 dB as found', '41 dB as left', { reason: 'fault', reversibility: 'no_trace', disposition: 'nothing_removed', minutes: 45 }),
  rail: (at: number) => ours(at, 'C201, −20 V rail', '1000 µF dry, ESR 3 Ω', '1000 µF 40 V axial', { reason: 'fault', disposition: 'kept_with_unit', bag: 'Bag: removed C201', parts: 'Electrolytic 1000 µF 40 V, Dielmark', testedAfter: 'Ripple 2 mV', minutes: 35 }),
  bung: (at: number) => ours(at, 'Rear apron', 'Extra coax socket from an earlier hand', 'Hole blanked with a matched grommet', { reason: 'undoing', reversibility: 'no_trace', disposition: 'kept_with_unit', bag: 'Bag: removed coax socket', minutes: 20 }),
  crystal: (at: number) => ours(at, 'Tone-call crystal', 'Crystal swapped by an earlier owner', 'Original 1750 Hz unit put back from its bag', { reason: 'undoing', reversibility: 'no_trace', disposition: 'kept_with_unit', bag: 'Bag: the earlier owner’s crystal', testedAfter: '9.8 W into a 50 Ω dummy load', minutes: 30 }),
  suppressor: (at: number) => ours(at, 'C1, mains to chassis', '5 nF ceramic, unmarked', '4.7 nF Y2', { reason: 'safety', disposition: 'discarded', parts: 'Suppression Y2 4.7 nF 300 V AC, Dielmark', testedAfter: 'Leakage 0.21 mA', minutes: 20 }),
  align: (at: number) => ours(at, 'Trimmers, all bands', 'Dial low at the top of every band', 'Realigned to the handbook’s table', { reason: 'fault', reversibility: 'no_trace', disposition: 'nothing_removed', minutes: 90 }),
  extraSocket: (at: number) => found(at, 'Rear apron', 'Extra 16 mm hole with a coax socket'),
  drilled: (at: number) => found(at, 'Front panel', 'Hole drilled for an extra switch, later filled and touched up', { reversibility: 'not_reversible' }),
  repaint: (at: number) => found(at, 'Case', 'Case resprayed, lettering intact', { reversibility: 'not_reversible' }),
  oldRecap: (at: number) => found(at, 'Under the chassis', 'Three film capacitors fitted by an earlier repairer, neat', { reversibility: 're_solder' }),
  thermistor: (at: number) => leftAlone(at, 'Stabilising thermistor', 'Original thermistor, output flat ±0.3 dB'),
  micas: (at: number) => leftAlone(at, 'RF deck', 'Mica and ceramic capacitors, all original', 'No drift seen in an hour'),
  finish: (at: number) => leftAlone(at, 'Front panel', 'Original wrinkle finish, washed and not repainted'),
} satisfies Record<string, (daysAgo: number) => DemoWork>
export type Job = keyof typeof JOBS
