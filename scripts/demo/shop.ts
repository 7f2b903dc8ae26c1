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

/** The bench's own instruments; the third is overdue. */
export function demoInstruments(today: Date): NewInstrument[] {
  const row = (name: string, serial: string, accuracy: string, done: number, due: number, calibrationNote = ''): NewInstrument =>
    ({ name, serial, accuracy, calibratedOn: daysFrom(today, -done), calibrationDue: daysFrom(today, due), calibrationNote })
  return [
    row('Counter, 8 digits', 'C-2207', '±0.1 ppm time base, ±1 count', 120, 245, 'Checked against an off-air standard for 24 h'),
    row('Digital multimeter, 4½ digits', 'D-0913', '±(0.03 % of reading + 2 digits) DC', 200, 165, 'Certificate on file'),
    row('RF millivoltmeter', 'R-118', '±3 % of full scale, 10 kHz–1 GHz', 430, -65, 'Due: to be sent away'),
    row('Oscilloscope, 100 MHz', 'S-55', '±3 % vertical, ±2 % time', 90, 275),
    row('Insulation and earth tester', 'T-774', '±5 % of reading', 60, 305, 'Certificate on file'),
  ]
}
