import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { AUDIO_BAND, bandNamed, ITU_BANDS, NAMED_BANDS } from '../../../../shared/domain/band-names'
import {
  bandOfFrequency, formatFrequency, formatFrequencyRange, hzToMetres, metresToHz, parseFrequency,
} from '../../../../shared/domain/frequency'

/** What is shown, with plain spaces for the narrow ones. */
const plain = (text: string): string => text.replaceAll('\u202F', ' ')

describe('parseFrequency', () => {
  it.each([
    // Legacy unit names: c/s, kc, Mc and kMc are Hz, kHz, MHz and GHz (the SI replaced the cycle per second in 1960, 11th CGPM).
    ['455 kc', 455_000], ['10.7 Mc', 10_700_000], ['1.2 kMc', 1_200_000_000], ['60 ~', 60], ['60 cps', 60],
    ['455 kilocycles', 455_000], ['455 kilocycles per second', 455_000], ['455 kc/s', 455_000], ['455 Kc', 455_000], ['455KC', 455_000],
    ['400 c/s', 400], ['400 cycles', 400], ['50 c.p.s.', 50], ['400 Hz', 400], ['455 kHz', 455_000], ['10.7 MHz', 10_700_000],
    ['30 mc', 30_000_000], ['30 megs', 30_000_000], ['30 megacycles', 30_000_000], ['30 Mc/s', 30_000_000], ['1.2 GHz', 1_200_000_000],
    ['3 THz', 3e12], ['2.5k', 2500], ['2.5 K', 2500], ['10M', 10_000_000], ['10G', 10_000_000_000],
    ['10,7 Mc', 10_700_000], ['0,455 Mc', 455_000], ['1 250 kc', 1_250_000], ['1\u202F250,5 kc', 1_250_500], ['1,250,000 c/s', 1_250_000],
    ['.5 Mc', 500_000], ['5. kc', 5000], ['+5 kc', 5000], ['1e6 Hz', 1_000_000], ['2.5e-3 Mc', 2500], ['1.000001 Mc', 1_000_001], ['2999.999999999 GHz', 2_999_999_999_999],
  ])('reads %s as %i Hz', (text, hz) => {
    expect(parseFrequency(text)).toEqual({ ok: true, hz })
  })

  it.each([
    ['', 'empty'], ['   ', 'empty'], ['banana', 'not-a-frequency'], ['5 bananas', 'not-a-frequency'], ['kc', 'not-a-frequency'],
    ['1.2.3 Mc', 'not-a-frequency'], ['--5 kc', 'not-a-frequency'], ['1e99999 Hz', 'not-a-frequency'], ['NaN Hz', 'not-a-frequency'], ['Infinity', 'not-a-frequency'],
    ['0', 'zero'], ['0 kc', 'zero'], ['0.000 Mc', 'zero'], ['DC', 'zero'], ['-1', 'negative'], ['-455 kc', 'negative'], ['\u2212455 kc', 'negative'],
    ['1e30', 'too-high'], ['1e30 Hz', 'too-high'], ['3000.1 GHz', 'too-high'], ['3000000000001 Hz', 'too-high'],
    ['455', 'unit-missing'], ['7 m', 'ambiguous-unit'], ['7m', 'ambiguous-unit'], ['1,250 kc', 'ambiguous-comma'],
    ['1.5 c/s', 'finer-than-a-hertz'], ['455.0001 kc', 'finer-than-a-hertz'], ['5 V', 'not-a-frequency'], ['9'.repeat(5000), 'not-a-frequency'],
  ])('refuses %j as %s, with a sentence', (text, reason) => {
    const read = parseFrequency(text)
    expect(read).toMatchObject({ ok: false, reason })
    if (!read.ok) expect(read.sentence).toMatch(/^.{10,200}\.$/su)
  })

  it('asks about a lower-case m and offers both readings', () => {
    const read = parseFrequency('40 m')
    expect(read.ok ? '' : read.sentence).toMatch(/40 metres.*40 Mc/)
  })

  it('allows DC where told', () => {
    for (const text of ['DC', 'd.c.', '0', '0 Hz']) expect(parseFrequency(text, { allowDc: true })).toEqual({ ok: true, hz: 0 })
    expect(parseFrequency('-0.1 Hz', { allowDc: true })).toMatchObject({ ok: false, reason: 'negative' })
  })

  it('assumes a unit where told, and only for a number that has none', () => {
    expect(parseFrequency('455', { assume: 'kHz' })).toEqual({ ok: true, hz: 455_000 })
    expect(parseFrequency('455 Mc', { assume: 'kHz' })).toEqual({ ok: true, hz: 455_000_000 })
  })

  it('never throws, and never gives anything but whole hertz in range', () => {
    fc.assert(fc.property(fc.oneof(fc.string(), fc.string({ unit: fc.constantFrom(...'0123456789.,-+eEkKmMcCgG/s~ hHzZ') })), (text) => {
      const read = parseFrequency(text)
      if (read.ok) expect(Number.isSafeInteger(read.hz) && read.hz > 0 && read.hz <= 3e12).toBe(true)
      else expect(read.sentence).not.toBe('')
    }), { numRuns: 2000 })
  })

  it('stays quick on long nonsense', () => {
    const from = performance.now()
    for (const text of ['1'.repeat(80), '1,'.repeat(40), '1 '.repeat(40), '. '.repeat(40), `1${' '.repeat(78)}`]) parseFrequency(text)
    expect(performance.now() - from).toBeLessThan(200)
  })
})

describe('wavelengths', () => {
  it.each([
    // λ = c / f with c = 299 792 458 m/s, exact by the SI's definition of the metre.
    [60_000, 4996.541], [198_000, 1514.103], [455_000, 658.885], [1_000_000, 299.792], [10_700_000, 28.018], [100_000_000, 2.997925],
  ])('%i Hz is %f m', (hz, metres) => {
    expect(hzToMetres(hz)).toBeCloseTo(metres, 3)
    expect(metresToHz(hzToMetres(hz))).toBe(hz)
  })

  it('reads a dial in metres: 1500 m is 199 862 Hz', () => {
    expect(parseFrequency('1500 metres')).toEqual({ ok: true, hz: 199_862 })
    expect(parseFrequency('70 cm')).toEqual({ ok: true, hz: 428_274_940 })
    expect(parseFrequency('0 metres')).toMatchObject({ ok: false })
    expect(parseFrequency('1e12 metres')).toMatchObject({ ok: false, reason: 'finer-than-a-hertz' })
  })
})

describe('formatFrequency', () => {
  it.each([
    // ITU Radio Regulations 2.1: kHz up to and including 3 000 kHz, MHz above 3 MHz up to and including 3 000 MHz, GHz above.
    [3000, '3 kHz'], [3001, '3.001 kHz'], [30_000, '30 kHz'], [300_000, '300 kHz'], [455_000, '455 kHz'], [3_000_000, '3 000 kHz'],
    [3_000_001, '3.000001 MHz'], [30_000_000, '30 MHz'], [300_000_000, '300 MHz'], [3_000_000_000, '3 000 MHz'], [3_000_000_001, '3.000000001 GHz'],
    [3e12, '3 000 GHz'],
    [0, 'DC'], [1, '1 Hz'], [60, '60 Hz'], [999, '999 Hz'], [1000, '1 kHz'], [1_703_000, '1 703 kHz'], [10_700_000, '10.7 MHz'], [98_200.5, '98.2005 kHz'],
  ])('shows %d Hz as %s', (hz, shown) => {
    expect(plain(formatFrequency(hz))).toBe(shown)
  })

  it.each([[400, '400 c/s'], [455_000, '455 kc'], [10_700_000, '10.7 Mc'], [3_500_000_000, '3.5 kMc']])('shows %d Hz as %s in period style', (hz, shown) => {
    expect(plain(formatFrequency(hz, 'period'))).toBe(shown)
  })

  it('never wraps inside itself and reads back exactly, in both styles', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 3e12 }), fc.constantFrom('si' as const, 'period' as const), (hz, style) => {
      const shown = formatFrequency(hz, style)
      expect(shown).not.toMatch(/[ \n]/)
      expect(parseFrequency(shown)).toEqual({ ok: true, hz })
    }), { numRuns: 1000 })
  })

  it.each([
    [88_000_000, 108_000_000, '88–108 MHz'], [540_000, 1_600_000, '540–1 600 kHz'], [20, 20_000, '20 Hz – 20 kHz'], [0, 10_000_000, 'DC – 10 MHz'],
    [2_000_000, 4_000_000, '2–4 MHz'], [455_000, 455_000, '455 kHz'], [100_000, 32_000_000, '100 kHz – 32 MHz'],
  ])('shows the range %d–%d Hz as %s', (lower, upper, shown) => {
    expect(plain(formatFrequencyRange(lower, upper))).toBe(shown)
  })
})

describe('band names, ITU RR 2.1 and Rec. ITU-R V.431', () => {
  it('has bands 4 to 12, each from 0.3 × 10^N (exclusive) to 3 × 10^N (inclusive)', () => {
    expect(ITU_BANDS.map(band => band.number)).toEqual([4, 5, 6, 7, 8, 9, 10, 11, 12])
    for (const band of ITU_BANDS) {
      expect(band.aboveHz).toBe(Number(`3e${band.number - 1}`))
      expect(band.toHz).toBe(Number(`3e${band.number}`))
    }
    expect(ITU_BANDS.map(band => band.symbol)).toEqual(['VLF', 'LF', 'MF', 'HF', 'VHF', 'UHF', 'SHF', 'EHF', null])
  })

  it.each([
    [3000, null], [3001, 'VLF'], [30_000, 'VLF'], [300_000, 'LF'], [455_000, 'MF'], [3_000_000, 'MF'], [3_000_001, 'HF'],
    [30_000_000, 'HF'], [300_000_000, 'VHF'], [3_000_000_000, 'UHF'], [30_000_000_000, 'SHF'], [300_000_000_000, 'EHF'],
  ])('%d Hz is in %s', (hz, symbol) => {
    expect(bandOfFrequency(hz)?.symbol ?? null).toBe(symbol)
  })

  it('puts every frequency in at most one band', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 4e12 }), (hz) => {
      const inside = ITU_BANDS.filter(band => hz > band.aboveHz && hz <= band.toHz)
      expect(inside.length).toBe(hz > 3000 && hz <= 3e12 ? 1 : 0)
    }))
  })

  it('finds a band by name, audio included (common practice, no source)', () => {
    expect(bandNamed('vhf')).toEqual({ name: 'VHF', lowerHz: 30_000_001, upperHz: 300_000_000 })
    expect(bandNamed('Very high frequency')?.name).toBe('VHF')
    expect(bandNamed(' audio ')).toEqual(AUDIO_BAND)
    expect(bandNamed('ELF')).toBeNull()
    expect(NAMED_BANDS).toHaveLength(9)
  })
})
