import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { boundsOf } from '../../../../shared/domain/limits'
import type { PublishedSpecification } from '../../../../shared/domain/procedure-suggestions'
import { bandSettings, GROUP_PLANS, SUGGESTION_GROUPS, suggestCheckpoints, USUAL_GROUPS } from '../../../../shared/domain/procedure-suggestions'
import { savedProcedure } from '../../../../shared/schemas/procedure'

const generator: PublishedSpecification = {
  kind: 'rf_generator', dialTolerancePercent: 2, modulationHz: 400,
  bands: [{ label: 'A', function: 'generates', lowerHz: 100_000, upperHz: 320_000, dialTolerancePercent: null }, { label: 'B', function: 'generates', lowerHz: 320_000, upperHz: 1_000_000, dialTolerancePercent: 1 }],
}
const made = (groups: Parameters<typeof suggestCheckpoints>[1]['groups'], dialPoints = 3) => suggestCheckpoints(generator, { groups, dialPoints })

describe('checkpoints from the published specification', () => {
  it('read each band low, middle and high within its own tolerance, and more points on request', () => {
    const { checkpoints, problems } = made({ dial: { list: '', limit: 0 } })
    expect(problems).toEqual([])
    expect(checkpoints.map(({ bandLabel, nominal, limit }) => [bandLabel, nominal, limit?.kind === 'percent_of_setting' && limit.amount])).toEqual([
      ['A', 100_000, 2], ['A', 180_000, 2], ['A', 320_000, 2], ['B', 320_000, 1], ['B', 570_000, 1], ['B', 1_000_000, 1],
    ])
    expect(made({ dial: { list: '', limit: 0 } }, 5).checkpoints.filter(({ bandLabel }) => bandLabel === 'A').map(({ nominal }) => nominal)).toEqual([100_000, 130_000, 180_000, 240_000, 320_000])
  })
  it('take attenuator steps, scales, rails and the tone from what is listed', () => {
    const { checkpoints } = made({ attenuator: { list: '0, -20, -40 dB', limit: 1.5 }, meter: { list: '1.5 V, 15 V', limit: 3 }, rail: { list: 'HT 250 V, heaters 6.3 V', limit: 5 }, modulation: { list: '30 %', limit: 10 } })
    const said = (section: string) => checkpoints.filter(point => point.section === section).map(({ label, nominal, span }) => [label, nominal, span])
    expect(said('attenuator')).toEqual([['Step', 0, null], ['Step', -20, null], ['Step', -40, null]])
    expect(said('meter')).toEqual([['full scale', 1.5, 1.5], ['half scale', 0.75, 1.5], ['full scale', 15, 15], ['half scale', 7.5, 15]])
    expect(said('rail')).toEqual([['HT', 250, null], ['heaters', 6.3, null]])
    expect(said('modulation')).toEqual([['Depth', 30, null], [expect.stringContaining('Tone'), 400, null]])
  })
  it('name the entry that can’t be read, and what a model lacks', () => {
    expect(made({ rail: { list: 'HT 250 V, heaters lots', limit: 5 } }).problems).toEqual([expect.stringMatching(/^Supply rails: “heaters lots”/)])
    expect(made({ rail: { list: ' ', limit: 5 } }).problems).toEqual([expect.stringContaining('list what is to be read')])
    expect(suggestCheckpoints({ ...generator, dialTolerancePercent: null, bands: [] }, { groups: { dial: { list: '', limit: 0 } }, dialPoints: 3 }).problems).toEqual([expect.stringContaining('no dial tolerance')])
  })
  it('can be made of every group’s own example, and stand in a procedure', () => {
    for (const group of SUGGESTION_GROUPS) {
      const { checkpoints, problems } = made({ [group]: { list: GROUP_PLANS[group].list ?? '', limit: GROUP_PLANS[group].limit ?? 2 } })
      expect(problems).toEqual([])
      expect(checkpoints.length).toBeGreaterThan(0)
      for (const point of checkpoints) expect(point.limit === null || boundsOf(point.limit, point).ok).toBe(true)
    }
    for (const groups of Object.values(USUAL_GROUPS)) for (const group of groups) expect(SUGGESTION_GROUPS).toContain(group)
  })
  it('stay within their band, in order, each once', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 1e9 }), fc.integer({ min: 1, max: 1e9 }), fc.integer({ min: 3, max: 21 }), (lowerHz, width, count) => {
      const settings = bandSettings({ lowerHz, upperHz: lowerHz + width }, count)
      expect(settings).toEqual([...new Set(settings)].sort((a, b) => a - b))
      for (const hz of settings) {
        expect(hz).toBeGreaterThan(0)
        expect(hz).toBeLessThanOrEqual(lowerHz + width)
        if (lowerHz > 0) expect(hz).toBeGreaterThanOrEqual(lowerHz)
      }
    }))
  })
})

describe('a procedure as typed', () => {
  const row = { section: 'rail', label: 'HT', quantity: 'voltage', nominal: '250 V', limit: { kind: 'percent_of_setting', amount: '±5 %' } }
  const whole = (checkpoints: unknown[]) => savedProcedure.safeParse({ seen: 0, decisionRule: 'guard_band', guardFactor: '1', checkpoints })
  it('reads limits of every kind with the units of what is read', () => {
    const read = whole([row, { ...row, limit: { kind: 'between', amount: '240 V', second: '260 V' } }, { ...row, limit: { kind: 'larger_of', amount: '5', second: '10 V', secondKind: 'absolute' } }, { ...row, limit: { kind: 'at_most', amount: '300 V' } }, { section: 'dial', bandLabel: 'A', quantity: 'frequency', nominal: '320 kc', limit: { kind: 'absolute', amount: '5 kc' } }])
    expect(read.success && read.data.checkpoints.map(({ limit }) => limit)).toEqual([
      { kind: 'percent_of_setting', amount: 5 }, { kind: 'between', lower: 240, upper: 260 }, { kind: 'larger_of', of: [{ kind: 'percent_of_setting', amount: 5 }, { kind: 'absolute', amount: 10 }] }, { kind: 'at_most', value: 300 }, { kind: 'absolute', amount: 5000 },
    ])
    expect(read.success && read.data.checkpoints.at(-1)).toMatchObject({ nominal: 320_000, atHz: 320_000 })
  })
  it.each([
    [{ ...row, limit: { kind: 'between', amount: '260 V', second: '240 V' } }, 'The lower limit is above the upper'],
    [{ ...row, limit: { kind: 'percent_of_span', amount: '3' } }, 'needs the full scale'],
    [{ ...row, nominal: '250' }, 'Say what 250 is in'],
    [{ ...row, limit: { kind: 'absolute', amount: '' } }, 'Enter the limit'],
    [{ section: 'dial', bandLabel: 'A', quantity: 'frequency' }, 'Enter what the dial is set to'],
    [{ section: 'rail', quantity: 'voltage' }, 'Say what is read'],
  ])('refuses %j', (checkpoint, sentence) => {
    const read = whole([checkpoint])
    expect(read.error?.issues.map(({ message }) => message).join()).toContain(sentence)
  })
  it('asks what was changed once there is a version', () => {
    expect(savedProcedure.safeParse({ seen: 1, decisionRule: 'simple', checkpoints: [row] }).error?.issues).toMatchObject([{ path: ['why'] }])
  })
})
