import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DECISION_RULES } from '../../../../shared/domain/decision'
import type { TestReport } from '../../../../shared/domain/test-report'
import { makeTestReport, reportNumber } from '../../../../shared/domain/test-report'
import type { TestSheetView } from '../../../../shared/types/bench'
import type { Typed } from '../../../support/signed-sheet'
import { COUNTER, makeReportFacts, makeSignedSheet, METER, THIRTY } from '../../../support/signed-sheet'

const plain = (text: string) => text.replaceAll(/[\u202F\u00A0]/g, ' ')
const wordsIn = (value: unknown): string[] =>
  typeof value === 'string' ? [plain(value)] : typeof value === 'object' && value !== null ? Object.values(value).flatMap(wordsIn) : []
const report = (sheet: TestSheetView = makeSignedSheet(), said: Parameters<typeof makeReportFacts>[1] = {}) => makeTestReport(makeReportFacts(sheet, said), iso => iso)
const term = ({ terms, conditions }: TestReport, name: string) => plain([...terms, ...conditions].find(each => each.term === name)?.words ?? 'missing')
const dialAt = (nominal: number, found: string, left?: string): Typed => ({ section: 'dial', quantity: 'frequency', bandLabel: 'A', atHz: nominal, nominal, limit: { kind: 'percent_of_setting', amount: 2 }, found, left })

describe('the content of a test report', () => {
  const full = report()

  // ISO/IEC 17025:2017, 7.8.2.1, a to p (VERIFIED-P).
  it.each([
    ['a title', full.title, /^Test report$/], ['b laboratory, name and address', term(full, 'Laboratory'), /Halloran & Pike, 4 Cutler’s Row/], ['c where it was done', term(full, 'Where tested'), /above address/],
    ['d unique identification', plain(full.number), /^U 000001 6 \/ T2$/], ['e for whom', term(full, 'For'), /own stock/], ['f method', term(full, 'Method'), /version 3; limits from the maker’s handbook, 1957/],
    ['g item', term(full, 'Item'), /Oxmarden 307-G, signal generator/], ['g its identity', term(full, 'Serial'), /30714/], ['g its condition', term(full, 'Condition'), /chipped/], ['h day received', term(full, 'Received'), /2026-10-02/],
    ['i day performed', term(full, 'Tested'), /2026-11-09/], ['j day of issue', term(full, 'Issued'), /2026-11-10/], ['k sampling', term(full, 'Sampling'), /^None/], ['l relates only to the item', full.statements.join(' '), /relate only to the item/],
    ['m results with units', plain(full.tables[0]?.rows[1]?.read ?? ''), /^99\.912 kHz$/], ['n deviations', term(full, 'Deviations'), /crystal check points were not read/], ['o who authorised it', full.statements.join(' '), /Authorised by Edith Marsh, 2026-11-10/],
    ['p outside providers', full.statements.join(' '), /No result comes from an outside provider/],
  ])('%s', (_item, words, expected) => {
    expect(words).toMatch(expected)
  })

  it('claims no accreditation, is never called a calibration certificate, and calls nothing safe', () => {
    expect(full.standing).toContain('No accreditation is claimed')
    const words = wordsIn(full).join(' ')
    expect(words).not.toMatch(/calibration certificate/i)
    expect(words).not.toMatch(/\bsafe\b/i)
  })

  // 7.8.4.1: results before and after an adjustment, where there are both (VERIFIED-S).
  it('gives the result before and after wherever a reading was adjusted, each with its own uncertainty and verdict', () => {
    const adjusted = THIRTY.filter(({ left }) => left !== undefined)
    const rows = full.tables.flatMap(table => table.rows)
    expect(rows).toHaveLength(THIRTY.length + adjusted.length)
    const [found, left] = rows
    expect([found, left].map(row => row && [row.phase, row.read, row.error, row.uncertainty, row.verdict].map(each => plain(each ?? '')))).toEqual([
      ['as found', '96.914 kHz', '−3.09 %', '±0.98 Hz', 'fail'], ['as left', '99.912 kHz', '−0.09 %', '±0.98 Hz', 'pass'],
    ])
    for (const table of full.tables) expect(table.isAdjusted).toBe(table.section === 'dial' || table.section === 'modulation')
  })
  it('has both wherever a reading was adjusted, whatever was read', () => {
    const kilocycles = fc.integer({ min: 90_000, max: 110_000 }).map(hertz => `${(hertz / 1000).toFixed(3)} kc`)
    fc.assert(fc.property(fc.array(fc.record({ found: kilocycles, left: fc.option(kilocycles, { nil: undefined }) }), { minLength: 1, maxLength: 8 }), (typed) => {
      const rows = report(makeSignedSheet({}, typed.map(({ found, left }, index) => dialAt(100_000 + index, found, left)))).tables.flatMap(table => table.rows)
      const phases = typed.flatMap(({ left }) => left === undefined ? [''] : ['as found', 'as left'])
      expect(rows.map(({ phase }) => phase)).toEqual(phases)
      expect(rows.every(({ uncertainty, factor, verdict }) => uncertainty !== '' && Number(factor) > 1.6 && verdict !== null)).toBe(true)
    }), { numRuns: 40 })
  })

  // 7.8.6 (VERIFIED-P): the decision rule and its risk stand with the verdicts.
  it.each(DECISION_RULES)('states the rule %s with its risk', (rule) => {
    const { rule: words } = report(makeSignedSheet({ decisionRule: { rule, factor: 1 } }))
    expect(plain(words)).toMatch(rule === 'simple' ? /one time in two/ : /less than 2\.3 times in a hundred/)
  })

  it('says which points were not read, and does not claim that all were', () => {
    const partly = report(makeSignedSheet({ deviations: '' }, [dialAt(100_000, '99.9 kc'), { ...dialAt(180_000, ''), found: undefined }]))
    expect(term(partly, 'Deviations')).toBe('1 point was not read: A, 180 kHz')
    expect(term(partly, 'Sampling')).toMatch(/1 of the 2 points listed was not read/)
    expect(partly.tables[0]?.rows[1]?.read).toBe('not read')
    expect(term(report(makeSignedSheet({ deviations: '' })), 'Deviations')).toBe('No addition, deviation or exclusion is recorded')
  })

  it('says "calibrated" only of an instrument with a traceable reference', () => {
    const [counter, meter] = full.instruments
    expect(counter?.certificate).toBe('Calibrated on 2026-01-10 by The county laboratory, C 2041, traceable to the national standard; due 2027-01-10')
    expect(meter?.certificate).toBe('Checked on 2026-03-02 against the shop’s own standard cell; no traceable reference is recorded')
    expect(counter?.state).toBe('Calibration in date')
    expect(report(makeSignedSheet({ instrumentList: [{ ...COUNTER, certificate: null, calibration: 'not_recorded' }, METER] })).instruments[0]?.certificate).toBe('No calibration is recorded')
  })

  it('warns at its head when later work has overtaken it, or an instrument was found wrong', () => {
    expect(report(makeSignedSheet({ staleBecause: 'C14 was replaced on 12 November.', instrumentWarnings: ['The counter was found wrong.'] })).warnings).toEqual([
      'This report no longer holds for the piece as it stands. C14 was replaced on 12 November.', 'The counter was found wrong.',
    ])
    expect(full.warnings).toEqual([])
  })

  // 7.8.8: a report that replaces another is identified by itself and refers to it (clause title VERIFIED-S, text FROM MEMORY).
  it('tells a second issue from the first, names it and says why', () => {
    expect(reportNumber('U0000016', 2)).not.toBe(reportNumber('U0000016', 2, 2))
    const again = report(makeSignedSheet(), { issue: { number: 2, because: 'Band C was read on the wrong scale' } })
    expect(plain(again.number)).toBe('U 000001 6 / T2, issue 2')
    expect(term(again, 'Replaces')).toBe('U 000001 6 / T2. Why: Band C was read on the wrong scale')
    expect(term(full, 'Replaces')).toBe('missing')
  })

  it('names no owner of a consigned piece, and no address that is not known', () => {
    const theirs = report(makeSignedSheet(), { ownership: 'consigned', shop: { name: 'Halloran & Pike', address: '' } })
    expect(term(theirs, 'For')).toBe('Its owner, for whom the shop sells it')
    expect(term(theirs, 'Laboratory')).toBe('Halloran & Pike, address not recorded')
    expect(term(theirs, 'Where tested')).not.toContain('above')
  })
})
