/** How a report's uncertainties come about: the components of the widest reading of each range used (GUM, JCGM 100:2008). */
import type { InstrumentView, TestSheetView } from '../types/bench'
import { formatAmount } from './amount'
import type { Result } from './evaluation'
import type { Quantity } from './reading'
import { bound, boundTag } from './report-words'
import { checkpointTitle, uncertaintyInWords, valueInWords } from './result-words'
import type { Component } from './uncertainty'

export interface BudgetLine { label: string, evaluation: string, degrees: string, standard: string }

/** How one range of one instrument comes to its uncertainty, at the reading where it is widest. */
export interface ReportBudget {
  instrument: string
  accuracy: string
  /** "D, 10 MHz, as found: 10.19993 MHz ± 0.00068 MHz". */
  reading: string
  lines: BudgetLine[]
  /** Combined standard uncertainty u, and its effective degrees of freedom. */
  combined: string
  degrees: string
  /** Coverage factor k, "2.00", and where it comes from: "k = 2.00, about 95 %". */
  factor: string
  coverage: string
  /** Expanded uncertainty U = k·u. */
  expanded: string
}

interface Budgeted { title: string, quantity: Quantity, result: Result }

const UNLIMITED = '∞'
const SHAPE_WORDS: Record<Component['shape'], string> = { normal: 'normal', rectangular: 'rectangular', triangular: 'triangular', u_shaped: 'U-shaped' }
/** Degrees of freedom are cut, never rounded up (GUM G.4.1). */
const degreesInWords = (degrees: number | null): string => degrees === null ? UNLIMITED : String(Math.floor(degrees + 1e-9))

function budgetOf({ title, quantity, result }: Budgeted, instruments: readonly InstrumentView[]): ReportBudget[] {
  const { uncertainty } = result
  if (!uncertainty) return []
  const instrument = instruments.find(({ id }) => id === result.instrumentId)
  return [{
    instrument: instrument ? `${instrument.name} (${boundTag(instrument.tag)})` : 'Instrument not on the sheet',
    accuracy: bound(result.accuracy ?? 'not stated'),
    reading: `${title}: ${valueInWords(result, quantity)}`,
    lines: uncertainty.components.map(({ label, evaluation, shape, degrees, standard }) => ({
      label: bound(label), evaluation: `Type ${evaluation}, ${SHAPE_WORDS[shape]}`, degrees: degreesInWords(degrees), standard: formatAmount(standard, quantity, 3),
    })),
    combined: formatAmount(uncertainty.standard, quantity, 3),
    degrees: degreesInWords(uncertainty.degrees),
    factor: uncertainty.factor.toFixed(2),
    coverage: bound(uncertainty.coverage),
    expanded: uncertaintyInWords(result, quantity),
  }]
}

/** A budget for each range used (instrument, stated accuracy and quantity): of its readings the one with the widest uncertainty. */
export function budgetsOf(sheet: Pick<TestSheetView, 'readings' | 'instrumentList'>): ReportBudget[] {
  const widest = new Map<string, Budgeted>()
  for (const reading of sheet.readings) {
    for (const [taken, phase] of [[reading.found, reading.left ? ', as found' : ''], [reading.left, ', as left']] as const) {
      if (!taken?.result.uncertainty) continue
      const key = `${taken.result.instrumentId} ${taken.result.accuracy} ${reading.quantity}`
      const before = widest.get(key)?.result.uncertainty?.expanded ?? -1
      if (taken.result.uncertainty.expanded > before) widest.set(key, { title: `${checkpointTitle(reading)}${phase}`, quantity: reading.quantity, result: taken.result })
    }
  }
  return [...widest.values()].flatMap(each => budgetOf(each, sheet.instrumentList))
}
