import type { LotCondition, LotSource, PartKind } from '../../shared/domain/part-lots'
import type { CountedIn } from '../../shared/domain/part-quantity'
import type { Job } from './work'

/** A lot in the demo shop's drawers. */
export interface DemoLot {
  key: string
  kind: PartKind
  description: string
  value?: string
  tolerance?: string
  rating?: string
  package?: string
  countedIn?: CountedIn
  maker?: string
  dateCode?: string
  made?: [from: string, to: string]
  condition: LotCondition
  source: Exclude<LotSource, 'donor' | 'split'>
  supplier?: string
  invoice?: string
  quantity: string
  /** Pounds for all of them. */
  cost?: string
  tested?: string
  minimum?: string
  standing?: { to: 'quarantined' | 'withdrawn', why: string }
}

const bought = (supplier: string, invoice: string) => ({ condition: 'new', source: 'supplier', supplier, invoice } as const)

export const DEMO_LOTS: readonly DemoLot[] = [
  { key: 'film10n', kind: 'capacitor', description: 'Film capacitor', value: '0.01 µF', rating: '630 V', package: 'Axial', maker: 'Dielmark', dateCode: '2231', made: ['2022-08-01', '2022-08-07'], ...bought('Distributor A', 'A 10412'), quantity: '100', cost: '18.00' },
  { key: 'film47n', kind: 'capacitor', description: 'Film capacitor', value: '0.047 µF', rating: '630 V', package: 'Axial', maker: 'Dielmark', dateCode: '2231', made: ['2022-08-01', '2022-08-07'], ...bought('Distributor A', 'A 10412'), quantity: '100', cost: '22.00' },
  { key: 'film100n', kind: 'capacitor', description: 'Film capacitor', value: '0.1 µF', rating: '400 V', package: 'Axial', maker: 'Dielmark', dateCode: '2214', made: ['2022-04-04', '2022-04-10'], ...bought('Distributor A', 'A 10412'), quantity: '100', cost: '26.00' },
  { key: 'x2', kind: 'capacitor', description: 'Suppression capacitor X2', value: '0.1 µF', rating: '275 V AC', package: 'Radial, 15 mm', maker: 'Dielmark', dateCode: '2308', made: ['2023-02-20', '2023-02-26'], ...bought('Distributor A', 'A 10977'), quantity: '25', cost: '13.75', tested: 'Approvals printed, photographed', minimum: '10' },
  { key: 'y2', kind: 'capacitor', description: 'Suppression capacitor Y2', value: '4.7 nF', rating: '300 V AC', package: 'Radial, 10 mm', maker: 'Dielmark', dateCode: '2311', made: ['2023-03-13', '2023-03-19'], ...bought('Distributor A', 'A 10977'), quantity: '25', cost: '9.00', minimum: '30' },
  { key: 'x2old', kind: 'capacitor', description: 'Suppression capacitor X2, epoxy paper', value: '0.1 µF', rating: '250 V AC', package: 'Radial, 15 mm', maker: 'Dielmark', dateCode: '8418', made: ['1984-04-30', '1984-05-06'], condition: 'old_stock', source: 'old_stock', quantity: '12', cost: '1.20', standing: { to: 'withdrawn', why: 'The epoxy cracks, even unused' } },
  { key: 'el22', kind: 'capacitor', description: 'Electrolytic capacitor', value: '22 µF', rating: '450 V, 105 °C', package: 'Radial', maker: 'Dielmark', dateCode: '2240', made: ['2022-10-03', '2022-10-09'], ...bought('Distributor B', '5518'), quantity: '40', cost: '34.00', tested: 'Leakage below 60 µA after 10 minutes', minimum: '12' },
  { key: 'el1000', kind: 'capacitor', description: 'Electrolytic capacitor', value: '1000 µF', rating: '40 V', package: 'Axial', maker: 'Dielmark', dateCode: '2302', made: ['2023-01-09', '2023-01-15'], ...bought('Distributor B', '5518'), quantity: '10', cost: '14.50' },
  { key: 'can', kind: 'capacitor', description: 'Electrolytic can', value: '32 + 32 µF', rating: '350 V', package: 'Chassis can', maker: 'Dielmark', dateCode: '6227', condition: 'old_stock', source: 'old_stock', quantity: '4', cost: '6.00', tested: 'Reform first, and log it' },
  { key: 'mica', kind: 'capacitor', description: 'Silver mica capacitor', value: '110 pF', tolerance: '±1 %', rating: '500 V', package: 'Radial', maker: 'Dielmark', dateCode: '7911', condition: 'old_stock', source: 'old_stock', quantity: '30', cost: '9.00', tested: 'Measured 109.2 to 110.6 pF' },
  { key: 'r470k', kind: 'resistor', description: 'Carbon film resistor', value: '470 kΩ', tolerance: '±5 %', rating: '0.5 W', package: 'Axial', maker: 'Ohmbarrow', ...bought('Distributor A', 'A 10412'), quantity: '200', cost: '4.00' },
  { key: 'r22', kind: 'resistor', description: 'Wirewound resistor', value: '22 Ω', rating: '7 W', package: 'Axial, ceramic', maker: 'Ohmbarrow', dateCode: '2304', ...bought('Distributor B', '5518'), quantity: '10', cost: '7.90' },
  { key: 'pot', kind: 'potentiometer', description: 'Potentiometer with switch', value: '1 MΩ log', rating: 'switch 250 V 2 A', maker: 'Ohmbarrow', dateCode: '6520', condition: 'old_stock', source: 'old_stock', quantity: '3', cost: '9.00' },
  { key: 'diode', kind: 'valve', description: 'Twin diode', package: 'Octal', maker: 'Quernby', dateCode: 'H7', condition: 'old_stock', source: 'old_stock', quantity: '10', cost: '40.00', tested: '94 to 101 % on the valve tester' },
  { key: 'tetrode', kind: 'valve', description: 'Output tetrode', package: 'Octal', maker: 'Zelwicz', dateCode: '82-14', condition: 'not_known', source: 'supplier', supplier: 'A broker', invoice: '88-3', quantity: '8', cost: '96.00', tested: '3 of 8 gassy', standing: { to: 'quarantined', why: '3 of 8 gassy: each is to be tested before any is fitted' } },
  { key: 'rectifier', kind: 'valve', description: 'Rectifier valve, 5 V heater', package: 'Octal', maker: 'Zelwicz', dateCode: '74-03', condition: 'old_stock', source: 'old_stock', quantity: '6', cost: '54.00', tested: 'HT 6 V above the original type' },
  { key: 'bridge', kind: 'semiconductor', description: 'Silicon bridge', rating: '400 V 2 A', maker: 'Ferdlund', dateCode: '2151', ...bought('Distributor A', 'A 10412'), quantity: '20', cost: '16.00' },
  { key: 'good', kind: 'semiconductor', description: 'Power transistor pair', rating: '140 V 15 A', package: 'TO-3', countedIn: 'pair', maker: 'Ferdlund', dateCode: '2147', ...bought('Distributor A', 'A 10977'), quantity: '6', cost: '51.00', tested: 'One opened: the die is full size' },
  { key: 'fake', kind: 'semiconductor', description: 'Power transistor pair', rating: '140 V 15 A', package: 'TO-3', countedIn: 'pair', maker: 'Ferdlund', dateCode: '9913', condition: 'not_known', source: 'supplier', supplier: 'A marketplace', invoice: '7710', quantity: '5', cost: '22.00', tested: 'Small die in a marked-over case', standing: { to: 'withdrawn', why: 'Counterfeit: a small die in a marked-over case' } },
  { key: 'fuselamp', kind: 'lamp', description: 'Fuse lamp', value: '8 V', rating: '0.3 A', maker: 'Aubrecourt', ...bought('Distributor C', 'C-2204'), quantity: '40', cost: '22.00' },
  { key: 'led', kind: 'lamp', description: 'LED lamp, warm', value: '6.3 V AC', package: 'Small bayonet', maker: 'Aubrecourt', dateCode: '2233', ...bought('Distributor C', 'C-2204'), quantity: '20', cost: '28.00', minimum: '18' },
  { key: 'flex', kind: 'wire', description: 'Mains flex 3-core, black', value: '0.75 mm²', countedIn: 'millimetre', ...bought('A cable wholesaler', '60117'), quantity: '50 m', cost: '39.50', minimum: '20 m' },
  { key: 'inlet', kind: 'connector', description: 'Moulded mains inlet, fused', rating: '10 A', dateCode: '2305', ...bought('Distributor A', 'A 10977'), quantity: '10', cost: '17.50' },
  { key: 'pointer', kind: 'knob', description: 'Knob pointer, replica', value: '6.35 mm shaft', condition: 'made_here', source: 'made_here', quantity: '4', cost: '6.00', tested: 'Sold as a reproduction' },
  { key: 'cell', kind: 'battery', description: 'Battery adaptor, five 3 V coin cells', value: '15 V', condition: 'made_here', source: 'made_here', quantity: '6', cost: '9.00', tested: 'Polarity marked' },
]

/** What each of the bench's usual jobs takes out of the drawers. */
export const JOB_PARTS: Partial<Record<Job, readonly { lot: string, quantity?: string, at: string, replaced: string }[]>> = {
  mainsFilter: [{ lot: 'x2', at: 'C14', replaced: '0.1 µF wax-paper 350 V' }],
  lead: [{ lot: 'flex', quantity: '1.8', at: 'Mains lead', replaced: 'Two-core cloth lead' }],
  selenium: [{ lot: 'bridge', at: 'SR2', replaced: 'Selenium stack' }, { lot: 'r22', at: 'R40', replaced: '' }],
  coupling: [{ lot: 'film10n', at: 'C22', replaced: '0.01 µF waxed' }],
  smoothing: [{ lot: 'el22', quantity: '2', at: 'C30, C31', replaced: '16 + 16 µF 450 V' }],
  ifCan: [{ lot: 'mica', at: 'T3', replaced: 'Silver mica of the can' }],
  cell: [{ lot: 'cell', at: 'Battery box', replaced: '15 V cell' }],
  diodeValve: [{ lot: 'diode', at: 'V1', replaced: 'Original valve' }],
  inlet: [{ lot: 'inlet', at: 'Mains inlet', replaced: 'Two-pin inlet' }],
  outputPair: [{ lot: 'good', at: 'Q8, Q9', replaced: 'Shorted pair' }],
  lamps: [{ lot: 'led', quantity: '2', at: 'LP1, LP2', replaced: '6.3 V filament lamps' }],
  knob: [{ lot: 'pointer', at: 'Range knob', replaced: '' }],
  rail: [{ lot: 'el1000', at: 'C201', replaced: '1000 µF' }],
  suppressor: [{ lot: 'y2', at: 'C1', replaced: '5 nF ceramic' }],
}

/** What was pulled from the pieces that were broken, by the model's key. */
export const PULLED: Readonly<Record<string, readonly { kind: PartKind, description: string, value?: string, quantity: string, worth: string, tested?: string }[]>> = {
  'MS 5': [
    { kind: 'inductor', description: 'Tuning coil set, MS 5', quantity: '1', worth: '8', tested: 'Continuity on every winding' }, { kind: 'dial', description: 'Dial glass, MS 5', quantity: '1', worth: '6' },
  ],
  '1370/P': [
    { kind: 'assembly', description: 'EHT multiplier, 1370/P', value: '3 kV', quantity: '1', worth: '15', tested: '3.0 kV on the bench' },
    { kind: 'knob', description: 'Knob, grey, 6.35 mm', quantity: '9', worth: '9' }, { kind: 'transformer', description: 'Convergence transformer', quantity: '1', worth: '4' },
  ],
}
