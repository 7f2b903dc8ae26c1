import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { PLUG_TEST_NOTE, storedChargeInWords } from '../../../../shared/domain/stored-charge'

const words = (reservoirMicrofarad: number | null, reservoirVolts: number | null, bleederKilohm: number | null) =>
  storedChargeInWords({ reservoirMicrofarad, reservoirVolts, bleederKilohm })?.replaceAll('\u202F', ' ') ?? null

describe('storedChargeInWords', () => {
  // Computed from t = R·C·ln(V₀/V): 9.470 s, 41.74 s, 26.52 s and 0.1833 s, said no shorter than they are.
  it.each([
    [47, 450, 100, 'in about 10 seconds'], [100, 400, 220, 'in about 42 seconds'], [32, 350, 470, 'in about 27 seconds'], [0.1, 375, 1000, 'in under a second'],
  ])('lets %s µF at %s V fall through %s kΩ %s', (microfarad, volts, kilohm, wait) => {
    const said = words(microfarad, volts, kilohm)
    expect(said).toContain(`${microfarad} µF at ${volts} V, bleeder ${kilohm} kΩ. It falls from ${volts} V to 60 V ${wait}`)
    expect(said).toContain('Check with a meter')
  })

  it('gives no time where nothing is known to empty it', () => {
    const said = words(32, 350, null)
    expect(said).toContain('32 µF at 350 V, no bleeder entered. Without a bleeder it can stay charged for days')
    expect(said).not.toMatch(/second|minute/)
  })

  it('says nothing before the capacitor and its voltage are known', () => {
    expect(words(null, 350, 470)).toBeNull()
    expect(words(32, null, 470)).toBeNull()
  })

  it('never throws, and never says a time that is not a number', () => {
    const amount = fc.option(fc.double({ min: 1e-4, max: 1e7, noNaN: true }))
    fc.assert(fc.property(amount, amount, amount, (microfarad, volts, kilohm) => {
      expect(words(microfarad, volts, kilohm) ?? '').not.toMatch(/NaN|Infinity|in about 0 /)
    }))
  })

  // IEC 61010-1, 6.10.3 and 6.3.1 c: a limit of charge, 45 µC; 60 V is only the shortcut (a product-safety engineers' list).
  it('does not take the shortcut for the test', () => {
    expect(PLUG_TEST_NOTE.replaceAll('\u202F', ' ')).toContain('45 µC), not by a voltage')
  })
})
