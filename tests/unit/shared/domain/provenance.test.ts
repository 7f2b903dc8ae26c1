import { describe, expect, it } from 'vitest'
import { hintsFromRecord } from '../../../../shared/domain/disclosure-hints'
import { dialCheckpoint } from '../../../../shared/domain/dial-check'
import { DISCLOSURE_KEYS } from '../../../../shared/domain/disclosures'
import { evaluateReading } from '../../../../shared/domain/evaluation'
import { currentForm } from '../../../../shared/domain/frozen-provenance'
import type { ProvenanceFacts } from '../../../../shared/domain/provenance'
import { makeProvenanceSheet } from '../../../../shared/domain/provenance'
import { tallyOf } from '../../../../shared/domain/sheet-tally'
import type { ModificationView } from '../../../../shared/types/modification'
import type { ReadingView, SafetyCheckView, TestSheetView } from '../../../../shared/types/bench'

const modification: ModificationView = {
  id: 'm1', hand: 'done_by_us', place: 'C14', before: '0.1 µF wax-paper', after: '0.1 µF X2', reason: 'safety', reversibility: 're_solder', nature: null,
  disposition: 'kept_with_unit', dispositionNote: 'bag 1', fitted: [], parts: '0.1 µF X2 275 V AC', testedAfter: 'leakage 0.04 mA', minutes: 20,
  doneOn: '2024-03-11', ownerConsent: 'Consignor 3 agreed by telephone', loggedBy: 'Bram', loggedAt: '2024-03-11T10:00:00Z', corrected: false,
  touches: null, affectsNothingBecause: null, withdrawnBecause: null, photos: [], version: 1,
}
const reading = (settingHz: number, errorPercent: number | null): ReadingView => {
  const checkpoint = dialCheckpoint('A', settingHz, 2)
  const evaluated = errorPercent === null ? null : evaluateReading(`${settingHz * (1 + errorPercent / 100)} Hz`, checkpoint, [], null, { rule: 'simple', factor: 1 })
  const found = evaluated?.ok ? { text: 'typed', result: evaluated.result } : null
  return { id: 'r', position: 1, ...checkpoint, found, left: null, instrumentId: null, note: '', photoIds: [] }
}
const readings = [reading(100_000, -1.8), reading(300_000, -2.13), reading(200_000, null)]
const sheet = (over: Partial<TestSheetView> = {}): TestSheetView => ({
  unitTag: 'U0000016', hazardHold: null, unitName: 'Oxmarden 307-G', powerRefusal: null, earlier: [], number: 1, testedOn: '2024-11-09', testedBy: 'Bram', signedBy: 'Bram', signedAt: '2024-11-09T12:00:00Z',
  staleBecause: null, staleWork: null, tally: tallyOf(readings), checksFailed: 0, instruments: ['B 000003 T Counter'], instrumentWarnings: [], warmUpMinutes: 30, supply: '240 V', ambientCelsius: 20,
  note: '', procedure: null, deviations: '', decisionRule: { rule: 'simple', factor: 1 }, drift: { label: '', quantity: 'frequency', readings: [] }, instrumentList: [], readings,
  checks: [{ name: 'Internal modulation present', result: 'pass', note: '' }], safety: null, version: 1, ...over,
})
const safety: SafetyCheckView = {
  id: 's1', safetyClass: 'earthed', earthBondMilliohm: 60, insulationKilohm: null, insulationTestVolts: null, leakageMicroamp: 40, leadAndPlug: 'pass',
  fuse: 'pass', polarity: 'pass', visual: 'pass', fuseRating: '', reservoirMicrofarad: null, bleederKilohm: null, reservoirVolts: null, earthBondLimitMilliohm: 100,
  insulationLimitKilohm: 1000, leakageLimitMicroamp: 3500,
  limitsOrigin: 'the shop’s own', passed: true, reasons: [], sheetNumber: null, note: '', instrument: null, doneBy: 'Bram', doneAt: '2024-11-09T12:00:00Z', current: true,
}
const facts = (over: Partial<ProvenanceFacts> = {}): ProvenanceFacts => ({
  tag: 'U0000016', state: 'ready', shop: { name: 'Culverhythe Wireless', address: '' }, asOf: '2024-12-01T00:00:00Z',
  model: { maker: 'Oxmarden', designation: '307-G', kind: 'rf_generator', yearsFrom: 1951, yearsTo: 1959 },
  serial: { answer: 'not_looked', text: null }, supply: '200–250 V 50 Hz', supplyAsSet: '240 V',
  bands: [{ label: 'A', function: 'generates', lowerHz: 100_000, upperHz: 320_000, dialTolerancePercent: null }],
  hazards: ['selenium'], hazardHold: null, notEnergised: null, originality: { grade: 'reversible_supplied', words: 'Reversible changes, parts supplied', sentence: 'Every change can be undone.', cautions: [], groups: [] }, modifications: [modification], sheets: [sheet()], safety, keptWith: [],
  disclosures: DISCLOSURE_KEYS.map(key => ({ key, answer: key === 'terms' ? 'known' : key === 'behaviour' ? 'not_looked' : null, text: key === 'terms' ? 'As seen' : null, fromRecord: '', answeredBy: 'Odile', answeredAt: null, version: 0 })),
  photos: [], ...over,
})

describe('makeProvenanceSheet', () => {
  it('names nobody: neither who did the work, nor who tested, nor who agreed', () => {
    const text = JSON.stringify(makeProvenanceSheet(facts()))
    for (const name of ['Bram', 'Odile', 'Consignor 3']) expect(text).not.toContain(name)
  })

  it('takes an unsigned sheet and a withdrawn entry for no evidence', () => {
    const made = makeProvenanceSheet(facts({
      sheets: [sheet({ signedAt: null })], modifications: [{ ...modification, withdrawnBecause: 'logged on the wrong unit' }],
    }))
    expect(made.sheets).toEqual([])
    expect(made.work).toEqual([])
  })

  it('says which kind of not known, and that a topic is unanswered', () => {
    const made = makeProvenanceSheet(facts())
    const words = Object.fromEntries(made.disclosures.map(entry => [entry.key, entry.words]))
    expect(words).toMatchObject({ terms: 'As seen', behaviour: 'not looked', identity: 'not answered' })
  })

  it('says of each safety measurement its limit, or that it was not measured, and never "safe"', () => {
    const { safety: said } = makeProvenanceSheet(facts())
    expect(said?.lines).toContain('Protective earth: 60 mΩ (limit 100 mΩ or less)')
    expect(said?.lines).toContain('Insulation: not measured')
    expect(said?.lines.join(' ')).not.toMatch(/\bsafe\b/i)
  })

  it('leaves out photos that are not for the buyer', () => {
    const photo = { id: 'p', subject: 'front' as const, caption: 'Front', width: 4, height: 3, thumbnailUrl: '', url: '', webpSrcset: '', avifSrcset: null, modificationId: null, position: 0, version: 1 }
    const made = makeProvenanceSheet(facts({ photos: [{ ...photo, isPublic: true }, { ...photo, id: 'q', isPublic: false }] }))
    expect(made.photos.map(each => each.id)).toEqual(['p'])
  })

  it('dates our own work and leaves an earlier hand undated', () => {
    const found = { ...modification, hand: 'found_like_this' as const, doneOn: '2024-05-20' }
    const made = makeProvenanceSheet(facts({ modifications: [modification, found] }))
    expect(made.work.map(entry => entry.doneOn)).toEqual(['2024-03-11', null])
    expect(made.work[0]?.heading).toBe('C14: 0.1 µF wax-paper → 0.1 µF X2')
  })
})

describe('hintsFromRecord', () => {
  it('counts what was read, out and not read, with the instrument', () => {
    expect(hintsFromRecord(makeProvenanceSheet(facts()), 'As seen').tests)
      .toBe('Test sheet 1 of 2024-11-09: 1 of 2 readings out, 1 of 3 not read; 1 of 1 checks passed. Measured with B 000003 T Counter.')
  })

  it('claims no test where no sheet is signed', () => {
    expect(hintsFromRecord(makeProvenanceSheet(facts({ sheets: [] })), '').tests).toBe('')
  })

  it('names identity from the plate, with the serial’s own kind of not known', () => {
    expect(hintsFromRecord(makeProvenanceSheet(facts()), '').identity).toBe('Oxmarden 307-G, RF signal generator, made 1951–59. Serial not looked.')
  })
})

describe('a sheet frozen in the first form', () => {
  it('shows the same points, limits and verdicts in the present one', () => {
    const made = makeProvenanceSheet(facts())
    const { sheets: _sheets, form: _form, ...rest } = made
    const frozen = {
      ...rest, form: 1 as const,
      sheets: [{
        number: 1, testedOn: '2024-11-09', instruments: ['B 000003 T Counter'], conditions: '', staleBecause: null, checks: [],
        readings: [
          { band: 'A', settingHz: 100_000, readingText: '98.2 kc', readingHz: 98_200, errorPercent: -1.8, tolerancePercent: 2, within: true },
          { band: 'A', settingHz: 300_000, readingText: '293.6 kc', readingHz: 293_600, errorPercent: -2.133, tolerancePercent: 2, within: false },
          { band: 'A', settingHz: 320_000, readingText: null, readingHz: null, errorPercent: null, tolerancePercent: 2, within: null },
        ],
      }],
    }
    const [shown] = currentForm(frozen).sheets
    expect(shown).toMatchObject({ decisionRule: { rule: 'simple' }, instrumentWarnings: [] })
    expect(shown?.readings.map(({ nominal, found }) => [nominal, found?.text, found?.result.judgement?.verdict])).toEqual([[100_000, '98.2 kc', 'pass'], [300_000, '293.6 kc', 'fail'], [320_000, undefined, undefined]])
    expect(currentForm(made)).toBe(made)
  })
})
