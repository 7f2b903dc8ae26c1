import type { Capability } from '../../shared/domain/accuracy'
import type { Role } from '../../shared/domain/roles'
import type { NewInstrument } from '../../shared/schemas/instrument'

export const DEMO_SHOP = {
  shopName: 'Culverhythe Wireless & Instrument', address: 'The sail loft, Boat Store Row, Culverhythe', currency: 'GBP', timeZone: 'Europe/London', ituRegion: 1,
  defaultTerms: 'Sold as described here. Fourteen days to return it, carriage back at the buyer’s cost unless it is not as described. Ninety days’ warranty on the work listed, valves excluded.',
} as const

export const DEMO_PEOPLE: readonly { email: string, name: string, role: Role }[] = [
  { email: 'owner@demo.invalid', name: 'Odile', role: 'owner' },
  { email: 'bench@demo.invalid', name: 'Bram', role: 'bench' },
  { email: 'floor@demo.invalid', name: 'Tamsin', role: 'floor' },
  { email: 'reader@demo.invalid', name: 'Noor', role: 'reader' },
]

const daysFrom = (today: Date, days: number) => new Date(today.getTime() + days * 86_400_000).toISOString().slice(0, 10)

/** A line of an instrument's specification; what is not said is not stated. */
const line = (quantity: Capability['quantity'], lower: number, upper: number, said: Partial<Capability>): Capability => ({
  label: '', quantity, lower, upper, percentOfReading: null, percentOfRange: null, digits: null, digitStep: null, ppm: null,
  ageingPpmPerYear: null, gateSeconds: null, decibels: null, ...said,
})

/** The bench's own instruments; the third is overdue. */
export function demoInstruments(today: Date): NewInstrument[] {
  const row = (name: string, serial: string, accuracy: string, [done, due]: [number, number], certificate: Partial<NonNullable<NewInstrument['calibration']>>, capabilities: Capability[]): NewInstrument => ({
    name, serial, accuracy, capabilities,
    calibration: { calibratedOn: daysFrom(today, -done), dueOn: daysFrom(today, due), certificateNumber: '', laboratory: '', traceableTo: '', note: '', ...certificate },
  })
  const laboratory = 'Wendmere County Laboratory'
  return [
    row('Counter, 8 digits', 'C-2207', '±0.1 ppm time base, ±1 count', [120, 245], { laboratory: 'Here, on our own bench', note: 'Checked against an off-air standard for 24 h' }, [
      line('frequency', 10, 120e6, { label: '1 s gate', ppm: 0.1, ageingPpmPerYear: 0.3, gateSeconds: 1 }),
    ]),
    row('Digital multimeter, 4½ digits', 'D-0913', '±(0.03 % of reading + 2 digits) DC', [200, 165], { laboratory, certificateNumber: 'WCL 20811', traceableTo: 'the national standards of voltage and resistance' }, [
      line('voltage', 0, 2, { label: 'DC 2 V', percentOfReading: 0.03, digits: 2, digitStep: 0.0001 }),
      line('voltage', 0, 20, { label: 'DC 20 V', percentOfReading: 0.03, digits: 2, digitStep: 0.001 }),
      line('voltage', 0, 1000, { label: 'DC 1000 V', percentOfReading: 0.05, digits: 2, digitStep: 0.1 }),
      line('resistance', 0, 2000, { label: '2 kΩ', percentOfReading: 0.1, digits: 2, digitStep: 0.1 }),
      line('resistance', 0, 20e6, { label: '20 MΩ', percentOfReading: 0.5, digits: 2, digitStep: 1000 }),
      line('current', 0, 2, { label: 'DC 2 A', percentOfReading: 0.3, digits: 2, digitStep: 0.0001 }),
    ]),
    row('RF millivoltmeter', 'R-118', '±3 % of full scale, 10 kHz to 1 GHz', [375, -10], { laboratory, certificateNumber: 'WCL 20114', traceableTo: 'the national standard of RF voltage', note: 'To be sent away' }, [
      ...[0.01, 0.03, 0.1, 0.3, 1, 3].map(full => line('voltage', full / 10, full, { label: `RF ${full * 1000} mV`, percentOfRange: 3 })),
      line('level', 0, 60, { label: 'Relative level', decibels: 0.3 }),
    ]),
    row('Oscilloscope, 100 MHz', 'S-55', '±3 % vertical, ±2 % time', [90, 275], { laboratory: 'Here, on our own bench', note: 'Checked against its calibrator and the counter' }, [
      line('voltage', 0.005, 40, { percentOfReading: 3 }),
      line('duration', 20e-9, 5, { percentOfReading: 2 }),
      line('percent', 0, 100, { label: 'Modulation depth from the trace', percentOfRange: 3 }),
    ]),
    row('Insulation and earth tester', 'T-774', '±5 % of reading', [60, 305], { laboratory, certificateNumber: 'WCL 21002', traceableTo: 'the national standard of resistance' }, [
      line('resistance', 0, 2e9, { percentOfReading: 5 }),
    ]),
  ]
}
