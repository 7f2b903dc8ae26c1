import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { parseReading, QUANTITIES, suspicionOf } from '../../../../shared/domain/reading'
import type { Quantity } from '../../../../shared/domain/reading'

describe('parseReading', () => {
  it.each<[string, Quantity, number, number, number]>([
    ['98.2 kc', 'frequency', 98_200, 1, 100], ['1.703 Mc', 'frequency', 1_703_000, 3, 1000], ['98.2k', 'frequency', 98_200, 1, 100], ['400 c/s', 'frequency', 400, 0, 1],
    ['98,20 kHz', 'frequency', 98_200, 2, 10], ['1093.4 kc', 'frequency', 1_093_400, 1, 100], ['400.25 Hz', 'frequency', 400.25, 2, 0.01], ['10.77 M', 'frequency', 10_770_000, 2, 10_000],
    ['0.22 V', 'voltage', 0.22, 2, 0.01], ['220 mV', 'voltage', 0.22, 0, 0.001], ['50 uV', 'voltage', 50e-6, 0, 1e-6], ['50 µV', 'voltage', 50e-6, 0, 1e-6], ['1.2 kV', 'voltage', 1200, 1, 100],
    ['-3.2 dB', 'level', -3.2, 1, 0.1], ['\u22123.2 dB', 'level', -3.2, 1, 0.1], ['-3.2', 'level', -3.2, 1, 0.1], ['30 %', 'percent', 30, 0, 1], ['30', 'percent', 30, 0, 1],
    ['35 mA', 'current', 0.035, 0, 0.001], ['4.7k', 'resistance', 4700, 1, 100], ['4.7 kΩ', 'resistance', 4700, 1, 100], ['470 ohms', 'resistance', 470, 0, 1], ['2.2 meg', 'resistance', 2.2e6, 1, 1e5],
    ['100 pF', 'capacitance', 100e-12, 0, 1e-12], ['0.1 uF', 'capacitance', 0.1e-6, 1, 1e-7], ['1.5 W', 'power', 1.5, 1, 0.1], ['10 ms', 'duration', 0.01, 0, 0.001], ['0 V', 'voltage', 0, 0, 1],
  ])('reads %j of %s', (text, quantity, value, decimals, resolution) => {
    const read = parseReading(text, quantity)
    expect(read).toMatchObject({ ok: true, quantity, value, decimals, suspicious: null })
    if (read.ok) expect(read.resolution).toBeCloseTo(resolution, 15)
  })

  it('keeps the decimals as typed', () => {
    expect(parseReading('98.20 kc', 'frequency')).toMatchObject({ typed: '98.20', typedUnit: 'kc', decimals: 2, resolution: 10 })
    expect(parseReading('98,2 kc', 'frequency')).toMatchObject({ typed: '98.2' })
  })

  it.each<[string, Quantity, string]>([
    ['', 'frequency', 'empty'], ['banana', 'frequency', 'not-a-reading'], ['98.2', 'frequency', 'unit-missing'], ['1.703 m', 'frequency', 'unit-missing'], ['0.22', 'voltage', 'unit-missing'], ['470', 'resistance', 'unit-missing'],
    ['98.2 V', 'frequency', 'unit-unknown'], ['40 metres', 'frequency', 'unit-unknown'], ['5 kc', 'voltage', 'unit-unknown'], ['5 k', 'voltage', 'unit-unknown'], ['3 mdB', 'level', 'unit-unknown'], ['-5 kc', 'frequency', 'negative'], ['-1 ohm', 'resistance', 'negative'],
    ['1,250 kc', 'frequency', 'ambiguous-comma'], ['9'.repeat(500), 'frequency', 'not-a-reading'], ['1.2.3 V', 'voltage', 'not-a-reading'],
  ])('refuses %j of %s as %s, with a sentence', (text, quantity, reason) => {
    const read = parseReading(text, quantity)
    expect(read).toMatchObject({ ok: false, reason })
    if (!read.ok) expect(read.sentence).toMatch(/\.$/)
  })

  it('takes the one unit that comes near the nominal, and says so', () => {
    expect(parseReading('98.2', 'frequency', { nominal: 100_000 })).toMatchObject({ ok: true, value: 98_200, typedUnit: 'kHz', unitAssumed: true })
    expect(parseReading('5', 'frequency', { nominal: 100_000 })).toMatchObject({ ok: false, reason: 'unit-missing' })
  })

  it('questions, and keeps, a reading about ten or a thousand times off', () => {
    expect(parseReading('9.82 kc', 'frequency', { nominal: 100_000 })).toMatchObject({ ok: true, value: 9820, suspicious: { kind: 'ten-times' } })
    expect(parseReading('982 kc', 'frequency', { nominal: 100_000 })).toMatchObject({ ok: true, value: 982_000, suspicious: { kind: 'ten-times' } })
    expect(parseReading('98.2 Mc', 'frequency', { nominal: 100_000 })).toMatchObject({ ok: true, suspicious: { kind: 'thousand-times' } })
    expect(parseReading('90 kc', 'frequency', { nominal: 100_000 })).toMatchObject({ ok: true, suspicious: null })
    expect(suspicionOf(-30, -3, 'level')).toBeNull()
    expect(suspicionOf(9820, 100_000, 'frequency')?.sentence.replaceAll('\u202F', ' ')).toBe('9.82 kHz is about ten times below 100 kHz. Check the decimal point and the unit.')
  })

  it('never throws', () => {
    fc.assert(fc.property(fc.string(), fc.constantFrom(...QUANTITIES), fc.option(fc.double(), { nil: undefined }), (text, quantity, nominal) => {
      const read = parseReading(text, quantity, { nominal })
      if (read.ok) expect(Number.isFinite(read.value)).toBe(true)
      else expect(read.sentence).not.toBe('')
    }), { numRuns: 1000 })
  })
})
