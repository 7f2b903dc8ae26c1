import { describe, expect, it } from 'vitest'
import { dialCheckpoint } from '../../../../shared/domain/dial-check'
import type { Checkpoint } from '../../../../shared/domain/checkpoint'
import { evaluateReading } from '../../../../shared/domain/evaluation'
import { alignmentFindings, coverageFindings, levelFindings } from '../../../../shared/domain/sheet-findings'
import type { ReadingView } from '../../../../shared/types/bench'

function read(checkpoint: Checkpoint, typed: string): ReadingView {
  const evaluated = evaluateReading(typed, checkpoint, [], null, { rule: 'simple', factor: 1 })
  if (!evaluated.ok) throw new Error(evaluated.sentence)
  return { id: '', position: 1, ...checkpoint, found: { text: typed, result: evaluated.result }, left: null, instrumentId: null, note: '', photoIds: [] }
}
const dial = (label: string, hz: number, typed: string) => read(dialCheckpoint(label, hz, 2), typed)
const level = (section: 'output_level' | 'attenuator', nominal: number, typed: string) =>
  read({ section, bandLabel: '', label: 'Level', quantity: 'level', atHz: null, nominal, span: null, limit: { kind: 'decibel', amount: 2 } }, typed)
const plain = (findings: { sentence: string, isFault: boolean }[]) => findings.map(({ sentence, isFault }) => `${isFault ? '! ' : ''}${sentence.replaceAll('\u202F', ' ')}`)

describe('what the readings say together', () => {
  it('tells a band that stops short from those that reach', () => {
    const findings = plain(coverageFindings([dial('A', 100_000, '100.1 kc'), dial('A', 320_000, '310.0 kc'), dial('B', 320_000, '319 kc'), dial('B', 1_000_000, '1000 kc')]))
    expect(findings[0]).toMatch(/^! Band A .*stops at 310 kHz, the plate says 320 kHz/)
    expect(findings[1]).toMatch(/^Band B/)
    expect(findings.some(finding => finding.startsWith('! '))).toBe(true)
  })
  it('says how level the output is, and what the attenuator adds up to', () => {
    expect(plain(levelFindings([level('output_level', 0, '0.4 dB'), level('output_level', 0, '-0.8 dB'), level('attenuator', 0, '0.1 dB'), level('attenuator', -20, '-19.6 dB'), level('attenuator', -40, '-39.7 dB')]))).toEqual([
      'The output level varies by 1.2 dB over what was read (highest less lowest).',
      'The worst step of the attenuator is off by 0.3 dB; down to −40.0 dB its errors add up to 0.2 dB.',
    ])
    expect(levelFindings([level('attenuator', 0, '0.1 dB')])).toEqual([])
  })
  it('asks for more points before anything is said of core and trimmer', () => {
    expect(alignmentFindings([dial('A', 100_000, '97 kc'), dial('A', 320_000, '310 kc')])).toEqual({ bands: [], hasTooFew: true })
    const five = [100, 130, 180, 240, 320].map(kc => dial('A', kc * 1000, `${(kc * 1.05).toFixed(2)} kc`))
    expect(alignmentFindings(five)).toMatchObject({ hasTooFew: false, bands: [{ label: 'A' }] })
  })
})
