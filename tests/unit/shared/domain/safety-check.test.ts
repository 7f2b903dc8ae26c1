import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { SafetyFindings, SafetyLimits } from '../../../../shared/domain/safety-check'
import { formatKilohm, formatMicroamp, formatMilliohm, judgeSafety, safetyHeadline, suggestLimits } from '../../../../shared/domain/safety-check'
import { CHECK_RESULTS } from '../../../../shared/domain/sheet-checks'
import { SAFETY_CLASSES } from '../../../../shared/domain/triage'

/** UK code of practice for in-service inspection, Class I: 0.1 Ω, 1 MΩ at 500 V DC, 3.5 mA. */
const CLASS_I: SafetyLimits = { earthBondMilliohm: 100, insulationKilohm: 1000, leakageMicroamp: 3500 }
const good: SafetyFindings = {
  safetyClass: 'earthed', earthBondMilliohm: 60, insulationKilohm: 20_000, leakageMicroamp: 400,
  leadAndPlug: 'pass', fuse: 'pass', polarity: 'pass', visual: 'pass',
}
const passes = (values: Partial<SafetyFindings>, limits = CLASS_I) => judgeSafety({ ...good, ...values }, limits).passed

const value = fc.option(fc.integer({ min: 0, max: 100_000_000 }))
const look = fc.constantFrom(...CHECK_RESULTS)
const findings: fc.Arbitrary<SafetyFindings> = fc.record({
  safetyClass: fc.constantFrom(...SAFETY_CLASSES), earthBondMilliohm: value, insulationKilohm: value, leakageMicroamp: value,
  leadAndPlug: look, fuse: look, polarity: look, visual: look,
})
const limit = fc.integer({ min: 1, max: 100_000_000 })
const limits: fc.Arbitrary<SafetyLimits> = fc.record({ earthBondMilliohm: limit, insulationKilohm: limit, leakageMicroamp: limit })

describe('judgeSafety', () => {
  it('passes an earthed piece within every limit, and one exactly on each', () => {
    expect(passes({})).toBe(true)
    expect(passes({ earthBondMilliohm: 100, insulationKilohm: 1000, leakageMicroamp: 3500 })).toBe(true)
  })

  it.each([
    ['the earth bond', { earthBondMilliohm: 101 }],
    ['the insulation', { insulationKilohm: 999 }],
    ['the leakage', { leakageMicroamp: 3501 }],
    ['an unmeasured earth bond', { earthBondMilliohm: null }],
    ['neither insulation nor leakage measured', { insulationKilohm: null, leakageMicroamp: null }],
    ['the lead', { leadAndPlug: 'fail' }],
    ['a fuse nobody looked at', { fuse: 'not_done' }],
    ['no visual inspection', { visual: 'not_applicable' }],
    ['an unknown class', { safetyClass: 'not_known' }],
  ] as const)('does not pass for %s', (_name, values) => {
    expect(passes(values)).toBe(false)
  })

  it('asks no earth bond of a piece that has none', () => {
    expect(passes({ safetyClass: 'double_insulated', earthBondMilliohm: null })).toBe(true)
  })

  it('takes polarity as always applying to a live chassis', () => {
    const live = { safetyClass: 'live_chassis', earthBondMilliohm: null } as const
    expect(passes({ ...live, polarity: 'not_applicable' })).toBe(false)
    expect(passes({ ...live, polarity: 'pass' })).toBe(true)
  })

  it('never passes with a value beyond its limit', () => {
    fc.assert(fc.property(findings, limits, (found, against) => {
      const beyond = (found.earthBondMilliohm ?? 0) > against.earthBondMilliohm
        || (found.insulationKilohm ?? Number.POSITIVE_INFINITY) < against.insulationKilohm
        || (found.leakageMicroamp ?? 0) > against.leakageMicroamp
      return !(beyond && judgeSafety(found, against).passed)
    }), { numRuns: 2000 })
  })

  it('never passes a mains piece with nothing measured, nor any with a failed look', () => {
    fc.assert(fc.property(findings, limits, (found, against) => {
      const { passed } = judgeSafety(found, against)
      const measured = found.earthBondMilliohm !== null || found.insulationKilohm !== null || found.leakageMicroamp !== null
      const failed = [found.leadAndPlug, found.fuse, found.polarity, found.visual].includes('fail')
      return !passed || (!failed && (measured || found.safetyClass === 'low_voltage'))
    }), { numRuns: 2000 })
  })

  it('gives a reason for every refusal, and never the word safe', () => {
    fc.assert(fc.property(findings, limits, (found, against) => {
      const { passed, reasons } = judgeSafety(found, against)
      const words = [safetyHeadline(passed, found.safetyClass), ...reasons.map(reason => reason.sentence)].join(' ')
      return passed === reasons.every(reason => reason.outcome === 'met') && !/\bsafe\b/i.test(words)
    }))
  })
})

describe('suggestLimits', () => {
  it('takes the shop’s own for an earthed piece', () => {
    expect(suggestLimits('earthed', CLASS_I, 'our code')).toEqual({ limits: CLASS_I, origin: 'our code' })
  })

  // UK code of practice for in-service inspection, Class II: 2 MΩ, touch current 0.25 mA.
  it('takes the Class II figures where they are stricter, and says so', () => {
    const { limits: suggested, origin } = suggestLimits('double_insulated', CLASS_I, 'our code')
    expect(suggested).toMatchObject({ insulationKilohm: 2000, leakageMicroamp: 250 })
    expect(origin).toContain('Class II')
  })

  it('keeps a shop’s stricter limits', () => {
    const strict = { earthBondMilliohm: 50, insulationKilohm: 7000, leakageMicroamp: 100 }
    expect(suggestLimits('double_insulated', strict, 'our code')).toEqual({ limits: strict, origin: 'our code' })
  })
})

it('writes values as they are read', () => {
  expect([formatMilliohm(60), formatKilohm(470), formatKilohm(2000), formatMicroamp(250), formatMicroamp(3500)].map(text => text.replace('\u202F', ' ')))
    .toEqual(['0.06 Ω', '470 kΩ', '2 MΩ', '250 µA', '3.5 mA'])
})
