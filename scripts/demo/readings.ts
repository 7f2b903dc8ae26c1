import { boundsOf } from '../../shared/domain/limits'
import { typedAmount } from '../../shared/domain/amount'
import type { Checkpoint } from '../../shared/domain/checkpoint'
import { BASE_UNITS } from '../../shared/domain/reading'
import { seeded } from './pictures/primitives'

export interface DemoTest {
  daysAgo: number
  /** Which way the whole piece leans, in thirds of its limits. */
  bias?: number
  /** Errors in per cent beside those of a good one, by position. */
  errors?: Record<number, number>
  /** What was found before adjustment, in per cent, by position; the readings then stand as left. */
  found?: Record<number, number>
  open?: boolean
  drift?: boolean
}

const UNITS: readonly [least: number, factor: number, unit: string][] = [[1e6, 1e6, 'Mc'], [1e3, 1e3, 'kc'], [0, 1, 'c/s']]
const FIGURES = 5

/** A value as the technician types it, five figures: "98.214 kc", "2.4871 V". */
function typed(value: number, { quantity }: Checkpoint): string {
  if (quantity === 'level' || quantity === 'percent') return `${value.toFixed(1)} ${BASE_UNITS[quantity]}`
  if (quantity !== 'frequency') return typedAmount(Number(value.toPrecision(FIGURES - 1)), quantity)
  const [, factor, unit] = UNITS.find(([least]) => value >= least) ?? [0, 1, 'c/s']
  return `${(value / factor).toPrecision(FIGURES)} ${unit}`
}

/** How far a reading may lie from its nominal; a twentieth of the nominal where no limit says. */
function reach(point: Checkpoint): number {
  const limits = point.limit === null ? null : boundsOf(point.limit, point)
  const upper = limits?.ok ? limits.bounds.upper ?? limits.bounds.lower : null
  return Math.abs((upper ?? (point.nominal ?? 1) * 1.05) - (point.nominal ?? 0)) || Math.abs(point.nominal ?? 1) * 0.05
}

/** Readings with a spread like that of real pieces: small mostly, never wild, repeatable. */
export function readDemoSheet(seed: string, points: readonly (Checkpoint & { position: number })[], { bias = 0, errors = {}, found = {} }: Omit<DemoTest, 'daysAgo'>) {
  const random = seeded(seed)
  return points.flatMap((point) => {
    const { position, nominal } = point
    if (nominal === null) return []
    const spread = Math.max(-0.92, Math.min(0.92, (random() + random() + random() - 1.5) / 1.5 * 0.5 + bias * 0.3))
    const said = (percent: number | undefined, otherwise: number) => typed(percent === undefined ? otherwise : nominal * (1 + percent / 100), point)
    const stands = said(errors[position], nominal + spread * reach(point))
    return [found[position] === undefined ? { position, found: stands } : { position, found: said(found[position], nominal), left: stands }]
  })
}

/** The first dial point watched from cold: fast at first, then slower, as valve oscillators do. */
export function demoWarmUp(points: readonly Checkpoint[]) {
  const point = points.find(({ section }) => section === 'dial')
  const nominal = point?.nominal ?? 1e6
  return {
    label: point ? `Band ${point.bandLabel}, from cold` : 'From cold', quantity: 'frequency' as const,
    readings: [2, 5, 10, 15, 20, 30, 45, 60].map(minutes => ({ minutes, text: `${((nominal * (1 + 0.0045 * Math.exp(-minutes / 9))) / 1000).toFixed(4)} kc` })),
  }
}

/** Which of the bench's instruments, in the order of `demoInstruments`, reads a quantity. */
const READ_BY: Partial<Record<Checkpoint['quantity'], number>> = { frequency: 0, voltage: 1, resistance: 1, current: 1, level: 2, duration: 3, percent: 3 }

/** The instruments that a sheet's checkpoints ask for. */
export function instrumentsFor(points: readonly Checkpoint[], ids: readonly string[]): string[] {
  const wanted = new Set(points.map(({ quantity }) => READ_BY[quantity] ?? 0))
  return ids.filter((_, index) => wanted.has(index))
}
