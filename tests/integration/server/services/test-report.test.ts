import { beforeAll, describe, expect, it } from 'vitest'
import { makeCorrectionCardPdf, makeTestReportPdf } from '../../../../server/services/test-report'
import { reopenTestSheet, saveTestSheet, signTestSheet, startTestSheet } from '../../../../server/services/test-sheets'
import type { Person } from '../../../../shared/types/person'
import { makeInstrument, makeTriage } from '../../../support/bench'
import { useTestDatabase } from '../../../support/database'
import { readPdfText } from '../../../support/pdf'
import { makePerson, makeShop, makeUnit } from '../../../support/records'

describe('the papers of a signed sheet', () => {
  const database = useTestDatabase()
  let bench: Person
  let address: { tag: string, number: number }
  let report = ''

  beforeAll(async () => {
    const { db } = database
    await makeShop(db)
    bench = await makePerson(db, 'bench', 'Edith Marsh')
    const meter = await makeInstrument(db, bench)
    const unit = await makeUnit(db, bench)
    await makeTriage(db, bench, unit.id)
    const { version } = await startTestSheet(db, bench, { tag: unit.tag, energised: true, testedOn: '2026-11-09' })
    address = { tag: unit.tag, number: 1 }
    await expect(makeTestReportPdf(db, address)).rejects.toMatchObject({ statusCode: 409, data: { code: 'sheet-open' } })
    const read = await saveTestSheet(db, bench, {
      ...address, version, instrumentIds: [meter.id], warmUpMinutes: 30, supply: '240 V 50 Hz', ambientCelsius: 20, deviations: 'Band E was not read',
      readings: [{ position: 1, found: '97.1 kc', left: '99.9 kc' }, { position: 2, found: '180.9 kc' }, { position: 3, found: '313.0 kc' }],
    })
    await signTestSheet(db, bench, { ...address, version: read.version })
    report = readPdfText((await makeTestReportPdf(db, address)).bytes)
  }, 60_000)

  // ISO/IEC 17025:2017, 7.8.2.1, a to p: what every report shows.
  it.each([
    ['a title', 'Test report'], ['b name of the laboratory', 'Laboratory'], ['c where the work was done', 'Where tested'], ['d unique identification, and on every page', '/ T1'], ['d a clear end', 'End of test report U'],
    ['e for whom', 'The shop’s own stock'], ['f method', 'Dial points of the model’s published bands'], ['g item and condition', 'Condition'], ['h date received', 'Received'], ['i date performed', '9 November 2026'],
    ['j date of issue', 'Issued'], ['k sampling', 'Sampling'], ['l relates only to the item', 'These results relate only to the item described'], ['m results with units', '97.1 kHz'], ['n deviations', 'Band E was not read'],
    ['o who authorised it', 'Authorised by Edith Marsh'], ['p outside providers', 'No result comes from an outside provider'],
  ])('shows %s', (_item, words) => {
    expect(report).toContain(words)
  })
  // 7.8.6: the decision rule with its risk; 7.8.4.1: results before and after an adjustment; uncertainty with its factor.
  it('states the rule, the uncertainty and what an adjustment did', () => {
    for (const words of ['Guard band (ILAC-G8:09/2019', 'expanded uncertainty U', 'as found', 'as left', '99.9 kHz', 'Type B, rectangular', 'k = ', 'TUR']) expect(report).toContain(words)
  })
  it('never says that what was not read was', () => {
    expect(report).toContain('12 of the 15 points listed were not read')
    expect(report).not.toContain('every point listed was read')
  })
  it('claims no accreditation, and is never called a calibration certificate', () => {
    expect(report).toContain('No accreditation is claimed')
    expect(report).not.toMatch(/calibration certificate/i)
    expect(report).not.toMatch(/\bsafe\b/i)
  })
  it('is named for saving by the unit and the sheet alone', async () => {
    const { name } = await makeTestReportPdf(database.db, address)
    expect(name).toBe(`test-report-${address.tag}-T1.pdf`)
    expect(report).not.toContain('issue 2')
  })
  it('gives the buyer a card of what the dial really gives, between the points read', async () => {
    const card = readPdfText((await makeCorrectionCardPdf(database.db, address)).bytes)
    for (const words of ['Dial corrections', 'Band A', 'really gives', '99.9', 'beyond them nothing is said']) expect(card).toContain(words)
    // Band B was not read, so nothing is said of it.
    expect(card).not.toContain('Band B')
  })
  it('has no card where no dial was read', async () => {
    const unit = await makeUnit(database.db, bench)
    const { version } = await startTestSheet(database.db, bench, { tag: unit.tag, energised: false })
    const checked = await saveTestSheet(database.db, bench, { tag: unit.tag, number: 1, version, checks: [{ name: 'Looked', result: 'pass', note: '' }] })
    await signTestSheet(database.db, bench, { tag: unit.tag, number: 1, version: checked.version })
    await expect(makeCorrectionCardPdf(database.db, { tag: unit.tag, number: 1 })).rejects.toMatchObject({ data: { code: 'no-dial' } })
  })
  // ISO/IEC 17025:2017, 7.8.8 (text FROM MEMORY): what is given out anew is identified as such, and names what it replaces.
  it('is a new issue once its sheet was opened again and signed anew, and says why', async () => {
    const unit = await makeUnit(database.db, bench)
    const at = { tag: unit.tag, number: 1 }
    const { version } = await startTestSheet(database.db, bench, { tag: unit.tag, energised: false })
    const checked = await saveTestSheet(database.db, bench, { ...at, version, checks: [{ name: 'Looked', result: 'pass', note: '' }] })
    const signed = await signTestSheet(database.db, bench, { ...at, version: checked.version })
    const open = await reopenTestSheet(database.db, bench, { ...at, version: signed.version, why: 'Looked at the wrong piece' })
    await expect(makeTestReportPdf(database.db, at)).rejects.toMatchObject({ statusCode: 409, data: { code: 'sheet-open' } })
    await signTestSheet(database.db, bench, { ...at, version: open.version })
    const { bytes, name } = await makeTestReportPdf(database.db, at)
    const words = readPdfText(bytes)
    for (const each of ['/ T1, issue 2', 'Replaces', 'Looked at the wrong piece', 'Nothing was measured']) expect(words).toContain(each)
    expect(name).toBe(`test-report-${unit.tag}-T1-issue-2.pdf`)
  })
})
