import type { Capability } from '#shared/domain/accuracy'
import { typedAmount } from '#shared/domain/amount'
import type { Quantity } from '#shared/domain/reading'
import type { CertificateAnswers } from '~/components/bench/CertificateFields.vue'

/** One line of an instrument's specification as its form holds it. */
export type CapabilityAnswers = Record<Exclude<keyof Capability, 'quantity'>, string> & { quantity: Quantity }

const shown = (value: number | null) => value === null ? '' : String(value)

/** A line as its row of the form shows it. */
export function capabilityAnswers(line: Capability): CapabilityAnswers {
  const amount = (value: number | null) => value === null ? '' : typedAmount(value, line.quantity)
  return {
    label: line.label, quantity: line.quantity, lower: amount(line.lower), upper: amount(line.upper), digitStep: amount(line.digitStep),
    percentOfReading: shown(line.percentOfReading), percentOfRange: shown(line.percentOfRange), digits: shown(line.digits), ppm: shown(line.ppm),
    ageingPpmPerYear: shown(line.ageingPpmPerYear), gateSeconds: shown(line.gateSeconds), decibels: shown(line.decibels),
  }
}

/** An empty row, of the quantity of the one before. */
export function emptyCapability(quantity: Quantity = 'voltage'): CapabilityAnswers {
  return { label: '', quantity, lower: '', upper: '', digitStep: '', percentOfReading: '', percentOfRange: '', digits: '', ppm: '', ageingPpmPerYear: '', gateSeconds: '', decibels: '' }
}

export const emptyCertificate = (): CertificateAnswers => ({ calibratedOn: '', dueOn: '', certificateNumber: '', laboratory: '', traceableTo: '', note: '' })
