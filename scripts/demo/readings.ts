import { seeded } from './pictures/primitives'

/** A spread like that of real dials: small mostly, never wild, repeatable. */
export function dialErrors(seed: string, count: number, tolerancePercent: number, bias = 0): number[] {
  const random = seeded(seed)
  return Array.from({ length: count }, () => {
    const spread = (random() + random() + random() - 1.5) / 1.5 * tolerancePercent * 0.55
    return Math.max(-tolerancePercent * 0.92, Math.min(tolerancePercent * 0.92, spread + bias * tolerancePercent * 0.3))
  })
}

const UNITS: readonly [least: number, factor: number, unit: string][] = [[1e6, 1e6, 'Mc'], [1e3, 1e3, 'kc'], [0, 1, 'c/s']]

/** A frequency as the technician types it from the counter: "98.2 kc", five figures. */
export function typedReading(hz: number): string {
  const [, factor, unit] = UNITS.find(([least]) => hz >= least) ?? [0, 1, 'c/s']
  return `${Number((hz / factor).toPrecision(5))} ${unit}`
}
