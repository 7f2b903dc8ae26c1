import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CHARGE_LIMIT_MICROCOULOMB, chargeMicrocoulomb, dischargeTime } from '../../../../shared/domain/capacitor-discharge'

describe('a reservoir capacitor', () => {
  // t = R·C·ln(V₀/V): 100 kΩ · 32 µF · ln(350/60) = 3.2 s · 1.7636 = 5.64 s.
  it('falls by its time constant', () => {
    const fall = dischargeTime({ volts: 350, farad: 32e-6, bleederOhm: 100e3 })
    expect(fall.kind === 'falls' && fall.seconds).toBeCloseTo(5.6435, 3)
    expect(fall.sentence).toBe('It falls from 350 V to 60 V in about 6 seconds if the bleeder is whole. Check with a meter before touching anything.')
  })
  it('leaves exactly the voltage asked for', () => {
    fc.assert(fc.property(fc.integer({ min: 61, max: 2000 }), fc.double({ min: 1e-7, max: 1e-3, noNaN: true }), fc.double({ min: 100, max: 1e7, noNaN: true }), (volts, farad, bleederOhm) => {
      const fall = dischargeTime({ volts, farad, bleederOhm })
      if (fall.kind !== 'falls') throw new Error(fall.sentence)
      expect(volts * Math.exp(-fall.seconds / (bleederOhm * farad))).toBeCloseTo(60, 6)
    }))
  })
  it('stays charged without a bleeder, and is refused nonsense', () => {
    expect(dischargeTime({ volts: 350, farad: 32e-6, bleederOhm: null })).toMatchObject({ kind: 'stays', sentence: expect.stringContaining('discharge it through a resistor') })
    for (const volts of [0, -1, Number.POSITIVE_INFINITY, Number.NaN]) expect(dischargeTime({ volts, farad: 1e-6, bleederOhm: 1e5 }).kind).toBe('refused')
    expect(dischargeTime({ volts: 40, farad: 1e-6, bleederOhm: 1e5 })).toMatchObject({ kind: 'falls', seconds: 0 })
  })
  // IEC 61010-1 limits the charge, about 45 µC (secondary source): 4.4 µF at 80 V is 352 µC, far beyond it though not far above 60 V.
  it('counts the charge, which is what the standard limits', () => {
    expect(chargeMicrocoulomb(80, 4.4e-6)).toBeCloseTo(352, 9)
    expect(chargeMicrocoulomb(80, 4.4e-6)).toBeGreaterThan(CHARGE_LIMIT_MICROCOULOMB)
  })
  it('never calls anything safe', () => {
    for (const volts of [10, 350]) expect(dischargeTime({ volts, farad: 1e-5, bleederOhm: 1e5 }).sentence).not.toMatch(/\bsafe\b/)
  })
})
