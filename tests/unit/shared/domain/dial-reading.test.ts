import { describe, expect, it } from 'vitest'
import { formatErrorPercent } from '../../../../shared/domain/dial-check'
import { modelCheckpoints, readDial } from '../../../../shared/domain/dial-reading'

/** Common practice, no source: 2 % of the setting is the usual tolerance of a service-grade generator's dial. */
const at = (settingHz: number) => ({ settingHz, tolerancePercent: 2 })

describe('readDial', () => {
  it.each([
    [100_000, '98.2 kc', '−1.80 %', true],
    [100_000, '98.2', '−1.80 %', true],
    [300_000, '293.6 kHz', '−2.13 %', false],
    [11_000_000, '10.77 Mc', '−2.09 %', false],
    [1_100_000, '1093.4', '−0.60 %', true],
    [400, '408 c/s', '+2.00 %', true],
  ])('judges %i Hz read as "%s": %s', (setting, typed, error, within) => {
    const read = readDial(typed, at(setting))
    expect(read).toMatchObject({ ok: true, verdict: { within } })
    if (read.ok) expect(formatErrorPercent(read.verdict.errorPercent, 2).replace('\u202F', ' ')).toBe(error)
  })

  it('asks about a decimal point, and keeps the reading', () => {
    expect(readDial('982 kc', at(100_000))).toMatchObject({ ok: true, hz: 982_000, question: expect.stringContaining('ten times') })
  })

  it.each(['banana', '0', '0 kc', '-98 kc', '1e30 Hz', '98.2 volts', '1'])('refuses "%s" with a sentence', (typed) => {
    expect(readDial(typed, at(100_000))).toMatchObject({ ok: false, sentence: expect.stringMatching(/\w/) })
  })
})

describe('modelCheckpoints', () => {
  const band = { label: 'A', function: 'generates' as const, lowerHz: 100_000, upperHz: 320_000, dialTolerancePercent: null }

  it('checks low, middle and high of every band that a dial sets', () => {
    expect(modelCheckpoints([band], 2)).toEqual([
      { bandLabel: 'A', settingHz: 100_000, tolerancePercent: 2 },
      { bandLabel: 'A', settingHz: 180_000, tolerancePercent: 2 },
      { bandLabel: 'A', settingHz: 320_000, tolerancePercent: 2 },
    ])
  })

  it('takes a band’s own tolerance before the model’s', () => {
    expect(modelCheckpoints([{ ...band, dialTolerancePercent: 1 }], 2).map(point => point.tolerancePercent)).toEqual([1, 1, 1])
  })

  it('checks no dial where none is, or where no tolerance is known', () => {
    expect(modelCheckpoints([{ ...band, function: 'measures' }], 2)).toEqual([])
    expect(modelCheckpoints([band], null)).toEqual([])
  })
})
