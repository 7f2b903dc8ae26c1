import type { Capability } from '../../shared/domain/accuracy'
import type { Checkpoint } from '../../shared/domain/checkpoint'
import type { DecisionRule } from '../../shared/domain/decision'
import { evaluateReading, gaugeOf } from '../../shared/domain/evaluation'
import { tallyOf } from '../../shared/domain/sheet-tally'
import type { TestReportFacts } from '../../shared/domain/test-report'
import type { InstrumentView, ReadingView, TakenView, TestSheetView } from '../../shared/types/bench'
import { makeCapability } from './bench'

/** A checkpoint with what was typed at it; `left` where it was adjusted. */
export type Typed = Pick<Checkpoint, 'section' | 'quantity'> & Partial<Checkpoint> & { found?: string, left?: string, note?: string }

const TESTED_ON = '2026-11-09'

function instrument(id: string, tag: string, name: string, capabilities: Capability[], said: Partial<InstrumentView> = {}): InstrumentView {
  return {
    id, tag, name, serial: '40118', accuracy: '', capabilities, calibratedOn: '2026-01-10', calibrationDue: '2027-01-10', calibration: 'in_date', retired: false, version: 1,
    certificate: {
      id: `${id}-certificate`, calibratedOn: '2026-01-10', dueOn: '2027-01-10', certificateNumber: 'C 2041', laboratory: 'The county laboratory', traceableTo: 'the national standard',
      note: '', hasFile: false, enteredBy: null, withdrawnBecause: null,
    },
    ...said,
  }
}

export const COUNTER = instrument('counter', 'B0000011', 'Frequency counter', [makeCapability({ quantity: 'frequency', lower: 10, upper: 100e6, ppm: 2, ageingPpmPerYear: 1, gateSeconds: 1 })])
export const METER = instrument('meter', 'B000002Z', 'Bench multimeter', [
  makeCapability({ label: 'DC volts', quantity: 'voltage', lower: 0, upper: 1000, percentOfReading: 0.5, digits: 2 }),
  makeCapability({ label: 'Level', quantity: 'level', lower: 0, upper: 120, decibels: 0.5 }),
  makeCapability({ label: 'Modulation', quantity: 'percent', lower: 0, upper: 100, percentOfReading: 4 }),
], {
  calibratedOn: null, calibrationDue: null, calibration: 'not_recorded',
  certificate: { id: 'none', calibratedOn: '2026-03-02', dueOn: null, certificateNumber: '', laboratory: '', traceableTo: '', note: 'the shop’s own standard cell', hasFile: false, enteredBy: null, withdrawnBecause: null },
})

function dialBand(bandLabel: string, points: readonly [hz: number, found: string, left?: string][]): Typed[] {
  return points.map(([hz, found, left]) => ({ section: 'dial', quantity: 'frequency', bandLabel, atHz: hz, nominal: hz, limit: { kind: 'percent_of_setting', amount: 2 }, found, left }))
}
const level = (atHz: number, found: string): Typed => ({ section: 'output_level', quantity: 'level', label: 'Carrier at the set line', atHz, nominal: 0, limit: { kind: 'decibel', amount: 1.5 }, found })
const step = (nominal: number, found: string): Typed => ({ section: 'attenuator', quantity: 'level', nominal, limit: { kind: 'decibel', amount: 1 }, found })
const depth = (atHz: number, found: string, left?: string): Typed => ({ section: 'modulation', quantity: 'percent', label: 'Depth', atHz, nominal: 30, limit: { kind: 'absolute', amount: 5 }, found, left })
const rail = (label: string, nominal: number, found: string): Typed => ({ section: 'rail', quantity: 'voltage', label, nominal, limit: { kind: 'percent_of_setting', amount: 10 }, found })

/** Thirty readings in five parts: adjusted in band A and of the modulation, one left out of limits, some too near to be sure. */
export const THIRTY: readonly Typed[] = [
  ...dialBand('A', [[100_000, '96.914 kc', '99.912 kc'], [180_000, '176.02 kc', '180.31 kc'], [320_000, '311.48 kc', '320.44 kc']]),
  ...dialBand('B', [[320_000, '318.211 kc'], [600_000, '603.914 kc'], [1_000_000, '1008.21 kc']]),
  ...dialBand('C', [[1_000_000, '0.99714 Mc'], [1_800_000, '1.80922 Mc'], [3_200_000, '3.2618 Mc']]),
  ...dialBand('D', [[3_200_000, '3.1931 Mc'], [6_000_000, '6.0411 Mc'], [10_000_000, '10.1999 Mc; 10.2002 Mc; 10.1997 Mc']]),
  ...dialBand('E', [[10_000_000, '9.9214 Mc'], [18_000_000, '18.2104 Mc'], [30_000_000, '30.9318 Mc']]),
  level(100_000, '0.2 dB'), level(1_000_000, '0.1 dB'), level(10_000_000, '-0.7 dB'), level(30_000_000, '-1.1 dB'),
  step(0, '0.0 dB'), step(-20, '-20.2 dB'), step(-40, '-40.1 dB'), step(-60, '-60.6 dB'), step(-80, '-79.4 dB'),
  depth(1_000_000, '8.1/4.9', '8.2/4.5'), depth(10_000_000, '7.7/4.3'), depth(30_000_000, '8/4.2'),
  rail('HT after the choke', 250, '243.2 V'), rail('Heaters', 6.3, '6.51 V'), rail('HT at V3 anode', 180, '171.4 V'),
]

const UNTITLED: Checkpoint = { section: 'dial', bandLabel: '', label: '', quantity: 'frequency', atHz: null, nominal: null, span: null, limit: null }

/** Readings as they would stand on a sheet; throws where a test typed what can't be read. */
export function makeReadings(typed: readonly Typed[], instruments: readonly InstrumentView[], rule: DecisionRule): ReadingView[] {
  const gauges = instruments.map(each => gaugeOf(each, TESTED_ON))
  return typed.map(({ found, left, note = '', ...said }, index) => {
    const checkpoint = { ...UNTITLED, ...said }
    const taken = (text: string | undefined): TakenView | null => {
      if (text === undefined) return null
      const evaluated = evaluateReading(text, checkpoint, gauges, null, rule)
      if (!evaluated.ok) throw new Error(`${text}: ${evaluated.sentence}`)
      return { text, result: evaluated.result }
    }
    return { ...checkpoint, id: `reading-${index + 1}`, position: index + 1, found: taken(found), left: taken(left), instrumentId: null, note, photoIds: [] }
  })
}

/** A signed sheet of a generator; thirty readings unless told. */
export function makeSignedSheet(said: Partial<TestSheetView> = {}, typed: readonly Typed[] = THIRTY): TestSheetView {
  const decisionRule = said.decisionRule ?? { rule: 'guard_band', factor: 1 }
  const instrumentList = said.instrumentList ?? [COUNTER, METER]
  const readings = makeReadings(typed, instrumentList, decisionRule)
  return {
    number: 2, testedOn: TESTED_ON, testedBy: 'Edith Marsh', signedAt: '2026-11-10T10:02:00.000Z', signedBy: 'Edith Marsh', staleBecause: null, staleWork: null, tally: tallyOf(readings),
    checksFailed: 0, instruments: [], instrumentWarnings: [], unitTag: 'U0000016', unitName: 'Oxmarden 307-G', hazardHold: null, powerRefusal: null, warmUpMinutes: 45, supply: '240 V 50 Hz', ambientCelsius: 19,
    note: '', procedure: { number: 3, origin: 'the maker’s handbook, 1957' }, deviations: 'The crystal check points were not read: the crystal is missing', decisionRule,
    drift: { label: 'Band C at 1.8 Mc', quantity: 'frequency', readings: [{ minutes: 0, text: '1.8131 Mc', value: 1_813_100 }, { minutes: 15, text: '1.8102 Mc', value: 1_810_200 }, { minutes: 30, text: '1.8094 Mc', value: 1_809_400 }, { minutes: 45, text: '1.8092 Mc', value: 1_809_200 }] },
    instrumentList, readings, checks: [{ name: 'Smooth tuning over every band', result: 'pass', note: '' }, { name: 'Set-carrier meter returns to zero', result: 'fail', note: 'Sticks at 5 of 100' }],
    safety: null, earlier: [], version: 5, ...said,
  }
}

/** The facts of a report on a sheet. */
export function makeReportFacts(sheet: TestSheetView, said: Partial<TestReportFacts> = {}): TestReportFacts {
  return {
    shop: { name: 'Halloran & Pike', address: '4 Cutler’s Row, Westerby' }, tag: 'U0000016', maker: 'Oxmarden', designation: '307-G', kind: 'Signal generator',
    serial: { answer: 'known', text: '30714' }, condition: 'Case chipped at one corner; scales clean', receivedOn: '2026-10-02', issuedOn: '2026-11-10', ownership: 'bought',
    issue: { number: 1, because: null }, sheet, ...said,
  }
}
