import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { formatAmount } from '../../../../shared/domain/amount'
import { limitInWords } from '../../../../shared/domain/result-words'
import { dialCheckpoints } from '../../../../shared/domain/dial-check'
import { EQUIPMENT_KINDS } from '../../../../shared/domain/equipment-kinds'
import { boundsOf } from '../../../../shared/domain/limits'
import { bandSettings, MOST_DIAL_POINTS, settingKey, suggestCheckpoints } from '../../../../shared/domain/procedure-suggestions'
import type { Choice, SuggestionOptions } from '../../../../shared/domain/procedure-suggestions'
import { proposeGroups } from '../../../../shared/domain/suggestion-groups'
import type { PublishedSpecification, SuggestionGroup } from '../../../../shared/domain/suggestion-groups'

const band = (label: string, lowerHz: number, upperHz: number, rest: Partial<PublishedSpecification['bands'][number]> = {}) =>
  ({ label, function: 'generates' as const, lowerHz, upperHz, dialTolerancePercent: null, ...rest })
const spec = (said: Partial<PublishedSpecification> = {}): PublishedSpecification =>
  ({ kind: 'rf_generator', bands: [band('A', 100_000, 320_000), band('B', 320_000, 1_000_000)], dialTolerancePercent: 2, modulationHz: 400, ...said })
const suggest = (group: SuggestionGroup, choice: Partial<Choice> = {}, said: Partial<PublishedSpecification> = {}, dialPoints = 3) =>
  suggestCheckpoints(spec(said), { groups: { [group]: { list: '', limit: 2, ...choice } }, dialPoints })
const plain = (text: string) => text.replaceAll('\u202F', ' ')
const inWords = ({ checkpoints }: ReturnType<typeof suggest>) => checkpoints.map(point => plain(`${[point.bandLabel, point.label, formatAmount(point.nominal ?? Number.NaN, point.quantity)].filter(Boolean).join(', ')}: ${limitInWords(point.limit, point.quantity)}`))

describe('bandSettings', () => {
  it('reads a band low, middle and high, or at marks evenly spaced on the logarithm', () => {
    expect(bandSettings(band('A', 100_000, 320_000), 3)).toEqual(dialCheckpoints(band('A', 100_000, 320_000)).map(({ settingHz }) => settingHz))
    // 100 kHz × 3.2^(1/4) = 133.7, ^(2/4) = 178.9, ^(3/4) = 239.3 kHz: to two figures 130, 180, 240.
    expect(bandSettings(band('A', 100_000, 320_000), 5)).toEqual([100_000, 130_000, 180_000, 240_000, 320_000])
  })

  it('keeps to marks that a dial carries where the band is narrow', () => {
    expect(bandSettings(band('4', 21e6, 21.45e6), 5)).toEqual([21e6, 21.1e6, 21.2e6, 21.3e6, 21.45e6])
  })

  it('reads a spot frequency once, and never at DC', () => {
    expect(bandSettings(band('×', 1000, 1000), 9)).toEqual([1000])
    expect(bandSettings(band('Y', 0, 30e6), 5)[0]).toBe(3e6)
  })

  it('keeps every setting within the band, rising, whole, from edge to edge and no more than asked for', () => {
    const bands = fc.tuple(fc.integer({ min: 1, max: 3e9 }), fc.double({ min: 1, max: 1000, noNaN: true })).map(([lowerHz, ratio]) => ({ lowerHz, upperHz: Math.round(lowerHz * ratio) }))
    fc.assert(fc.property(bands, fc.oneof(fc.integer({ min: -5, max: 40 }), fc.constant(Number.NaN)), (edges, count) => {
      const settings = bandSettings(edges, count)
      expect(settings.at(0)).toBe(edges.lowerHz)
      expect(settings.at(-1)).toBe(edges.upperHz)
      expect(settings.every((hz, index) => Number.isInteger(hz) && (index === 0 || hz > (settings[index - 1] ?? 0)))).toBe(true)
      expect(settings.length).toBeLessThanOrEqual(Math.min(Math.max(count || 0, 3), MOST_DIAL_POINTS))
    }))
  })

  it('keeps a band from DC above it and within it', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 2e9 }), fc.integer({ min: 3, max: MOST_DIAL_POINTS }), (upperHz, count) => {
      const settings = bandSettings({ lowerHz: 0, upperHz }, count)
      expect(settings).toEqual([...new Set(settings)].sort((a, b) => a - b))
      expect(settings.every(hz => hz > 0 && hz <= upperHz)).toBe(true)
    }))
  })

  it('gives as many as were asked for where the band has room', () => {
    fc.assert(fc.property(fc.integer({ min: 10_000, max: 3e8 }), fc.double({ min: 1.01, max: 1000, noNaN: true }), fc.integer({ min: 3, max: MOST_DIAL_POINTS }), (lowerHz, ratio, count) => {
      expect(bandSettings({ lowerHz, upperHz: Math.ceil(lowerHz * ratio) }, count)).toHaveLength(count)
    }))
  })
})

describe('the dial', () => {
  it('is judged by the band’s own tolerance, then the model’s, then the one given', () => {
    const bands = [band('A', 1e5, 3e5, { dialTolerancePercent: 1 }), band('B', 3e5, 1e6)]
    const limits = (dialTolerancePercent: number | null) => [...new Set(suggest('dial', { limit: 3 }, { bands, dialTolerancePercent }).checkpoints.map(({ bandLabel, limit }) => `${bandLabel} ${limitInWords(limit, 'frequency')}`))].map(plain)
    expect(limits(2)).toEqual(['A ±1 %', 'B ±2 %'])
    expect(limits(null)).toEqual(['A ±1 %', 'B ±3 %'])
  })

  it('names the bands that no tolerance is known for', () => {
    const bands = [band('A', 1e5, 3e5, { dialTolerancePercent: 1 }), band('B', 3e5, 1e6)]
    const { checkpoints, problems } = suggest('dial', { limit: null }, { bands, dialTolerancePercent: null })
    expect(checkpoints).toEqual([])
    expect(problems).toEqual([expect.stringContaining('band B')])
    expect(suggest('dial', { limit: null }).problems).toEqual([])
  })

  it('leaves out what no dial sets, even under the same label', () => {
    const bands = [band('U', 76e6, 108e6, { function: 'tunes' }), band('U', 20, 15_000, { function: 'passes' })]
    for (const points of [3, 7]) expect(suggest('dial', {}, { bands }, points).checkpoints.every(({ nominal }) => (nominal ?? 0) >= 76e6)).toBe(true)
    expect(suggest('dial', {}, { bands: [band('A', 5, 50e6, { function: 'measures' })] })).toMatchObject({ checkpoints: [], problems: [expect.stringContaining('dial')] })
  })
})

describe('suggestCheckpoints', () => {
  it.each<[SuggestionGroup, string, number, string[]]>([
    ['attenuator', '20 dB × 2', 2, ['Step, 0 dB: ±2 dB', 'Step, −20 dB: ±2 dB', 'Step, −40 dB: ±2 dB']],
    ['set_level', '1 V', 2, ['Output at the set line, 1 V: ±2 dB']],
    ['set_level', '0 dBm', 1, ['Output at the set line, 0 dBm: ±1 dB']],
    ['modulation', '30 %', 10, ['Depth, 30 %: ±10 %']],
    ['modulation_tone', '400 Hz', 10, ['Tone, 400 Hz: ±10 %']],
    ['meter', '3 V, AC 30 V', 3, ['3 V, Full scale, 3 V: ±3 % of full scale', '3 V, Half scale, 1.5 V: ±3 % of full scale', 'AC 30 V, Full scale, 30 V: ±3 % of full scale', 'AC 30 V, Half scale, 15 V: ±3 % of full scale']],
    ['timebase', '10, 1 ms', 3, ['Per division, 10 ms: ±3 %', 'Per division, 1 ms: ±3 %']],
    ['vertical', '50 mV', 3, ['Per division, 50 mV: ±3 %']],
    ['resistance', '4.7 k', 1, ['Standard resistor, 4.7 kΩ: ±1 %']],
    ['rail', 'HT 250 V ±10 %, heaters 6.3 V', 5, ['HT, 250 V: ±10 %', 'heaters, 6.3 V: ±5 %']],
    ['voltage_chart', 'V3 anode 180 V', 20, ['V3 anode, 180 V: ±20 %']],
  ])('makes %s of %j', (group, list, limit, words) => {
    const made = suggest(group, { list, limit })
    expect(made.problems).toEqual([])
    expect(inWords(made)).toEqual(words)
  })

  it('takes ± per cent of a meter’s range as of full scale', () => {
    expect(inWords(suggest('meter', { list: '3 V ±2 %' }))[1]).toBe('3 V, Half scale, 1.5 V: ±2 % of full scale')
  })

  it('reads the level of what gives one, at low, middle and high of each band', () => {
    const bands = [band('A', 1e5, 3e5), band('B', 5, 1e6, { function: 'measures' })]
    expect(suggest('output_level', {}, { bands }).checkpoints.map(({ bandLabel, atHz, nominal }) => [bandLabel, atHz, nominal])).toEqual([['A', 1e5, 0], ['A', 170_000, 0], ['A', 3e5, 0]])
    expect(suggest('output_level', {}, { bands: [] }).problems).toHaveLength(1)
  })

  it.each<[SuggestionGroup, string, string]>([
    ['rail', 'HT 250 V, heaters', '“heaters”'],
    ['voltage_chart', '180 V', 'Say where'],
    // A limit in per cent of nought is nought.
    ['rail', '0 V', 'nothing would lie within it'],
    ['meter', '0 V', 'nothing would lie within it'],
    ['attenuator', '20 V', '“20 V”'],
    ['resistance', '', 'list what is to be read'],
  ])('says what is wrong with %s of %j', (group, list, words) => {
    expect(suggest(group, { list }).problems).toEqual([expect.stringContaining(words)])
  })

  it.each([null, 0, -1, 101, Number.NaN, Number.POSITIVE_INFINITY])('refuses %s as a limit', (limit) => {
    expect(suggest('rail', { list: 'HT 250 V', limit })).toMatchObject({ checkpoints: [], problems: [expect.stringContaining('limit')] })
  })

  it('makes no setting twice, and nothing of what was not chosen', () => {
    expect(suggest('rail', { list: 'HT 250 V, HT 250 V, HT 0.25 kV' }).checkpoints).toHaveLength(1)
    expect(suggestCheckpoints(spec(), { groups: {}, dialPoints: 3 })).toEqual({ checkpoints: [], problems: [] })
  })

  it('makes only checkpoints with a setting of their own and room between their limits', () => {
    const lists = fc.array(fc.constantFrom('HT 250 V', '0 V', '-150 V ±1 dB', '3 V', 'V3 anode 180 V ±20 %', 'x', '1 k', '20 dB × 5', '30 %', '10 ms', '1 uF', '2 H', '400 Hz', '0 dBm', '20 mA'), { maxLength: 6 }).map(parts => parts.join(', '))
    const choices = fc.dictionary(fc.constantFrom(...proposeGroups(spec()).map(({ group }) => group)), fc.record({ list: lists, limit: fc.constantFrom(null, 0.1, 2, 100) }))
    const bands = fc.array(fc.tuple(fc.constantFrom('A', 'B'), fc.constantFrom('generates' as const, 'measures' as const, 'tunes' as const), fc.integer({ min: 1, max: 1e9 }), fc.integer({ min: 0, max: 1e9 }))
      .map(([label, does, lowerHz, width]) => band(label, lowerHz, lowerHz + width, { function: does })), { maxLength: 4 })
    fc.assert(fc.property(choices, bands, fc.constantFrom(null, 2), fc.integer({ min: 3, max: 9 }), (groups: SuggestionOptions['groups'], modelBands, dialTolerancePercent, dialPoints) => {
      const { checkpoints } = suggestCheckpoints(spec({ bands: modelBands, dialTolerancePercent }), { groups, dialPoints })
      expect(new Set(checkpoints.map(settingKey)).size).toBe(checkpoints.length)
      for (const point of checkpoints) {
        const limits = point.limit === null ? null : boundsOf(point.limit, point)
        expect(limits?.ok && (limits.bounds.lower ?? 0) < (limits.bounds.upper ?? 0)).toBe(true)
        if (point.section === 'dial') {
          expect(point.nominal).toBe(point.atHz)
          expect(modelBands.some(({ label, lowerHz, upperHz }) => label === point.bandLabel && lowerHz <= (point.nominal ?? 0) && (point.nominal ?? 0) <= upperHz)).toBe(true)
        }
      }
    }))
  })
})

describe('proposeGroups', () => {
  it.each(EQUIPMENT_KINDS)('offers for %s what can be made at once without a complaint', (kind) => {
    for (const said of [{}, { dialTolerancePercent: null }, { bands: [] }, { modulationHz: null }, { bands: [band('Y', 0, 30e6, { function: 'measures' as const })] }]) {
      const ready = proposeGroups(spec({ kind, ...said })).filter(({ isUsual, isReady }) => isUsual && isReady)
      const groups = Object.fromEntries(ready.map(({ group, list, limit }) => [group, { list, limit }]))
      expect(suggestCheckpoints(spec({ kind, ...said }), { groups, dialPoints: 3 }).problems).toEqual([])
    }
  })

  it.each(EQUIPMENT_KINDS)('gives %s an example of each list that can be read', (kind) => {
    for (const { group, plan, limit } of proposeGroups(spec({ kind }))) {
      const list = plan.example?.split(' or ')[0]?.replace(/,\s*$/u, '') ?? ''
      const made = suggest(group, { list, limit }, { kind })
      expect([made.problems, made.checkpoints.length > 0]).toEqual([[], true])
    }
  })

  it('starts from the limits of the kind', () => {
    const limitFor = (kind: PublishedSpecification['kind'], wanted: SuggestionGroup) => proposeGroups(spec({ kind })).find(({ group }) => group === wanted)?.limit
    // Makers’ house journals and handbooks, 1951 to 1961: flatness ±1 dB, sweep and vertical ±3 %; a bridge ±1 %.
    expect(limitFor('audio_oscillator', 'output_level')).toBe(1)
    expect(limitFor('oscilloscope', 'timebase')).toBe(3)
    expect(limitFor('oscilloscope', 'vertical')).toBe(3)
    expect(limitFor('bridge', 'capacitance')).toBe(1)
    // Common practice, no source.
    expect(limitFor('rf_generator', 'modulation')).toBe(10)
    expect(limitFor('domestic_receiver', 'voltage_chart')).toBe(20)
  })

  it('leaves every figure that the model does not hold to the technician', () => {
    const filled = EQUIPMENT_KINDS.flatMap(kind => proposeGroups(spec({ kind, modulationHz: null })).filter(({ list }) => list !== ''))
    expect(filled).toEqual([])
    expect(proposeGroups(spec({ modulationHz: 1000 })).find(({ group }) => group === 'modulation_tone')?.list).toBe('1 kHz')
  })
})
