import { beforeAll, describe, expect, it } from 'vitest'
import { addInstrument } from '../../../server/services/instruments'
import { saveProcedure } from '../../../server/services/procedures'
import { getTestSheet } from '../../../server/services/test-sheets'
import { suggestCheckpoints } from '../../../shared/domain/procedure-suggestions'
import { demoInstruments } from '../../../scripts/demo/shop'
import { readDemoSheet } from '../../../scripts/demo/readings'
import { makeTriage } from '../../support/bench'
import { runAxe, useBrowser, visit } from '../../support/browser'
import { focused, tabTo } from '../../support/keyboard'
import { readPdfText } from '../../support/pdf'
import { makeModel, makeShop, makeUnit } from '../../support/records'
import { useTestServer } from '../../support/server'
import { makeAccount, useSignedIn } from '../../support/sign-in'

describe('the demo generator through a full sheet', { timeout: 180_000 }, () => {
  const server = useTestServer()
  const openAs = useSignedIn(useBrowser(), () => server().url)
  let tag = ''

  beforeAll(async () => {
    const { db } = server().database
    await makeShop(db)
    const bench = await makeAccount(db, 'bench', 'Edith Marsh')
    const model = await makeModel(db)
    const { checkpoints } = suggestCheckpoints({
      kind: 'rf_generator', dialTolerancePercent: 2, modulationHz: 400,
      bands: [{ label: 'A', function: 'generates', lowerHz: 100_000, upperHz: 320_000, dialTolerancePercent: null }, { label: 'B', function: 'generates', lowerHz: 320_000, upperHz: 1_000_000, dialTolerancePercent: null }],
    }, { dialPoints: 5, groups: { dial: { list: '', limit: 0 }, output_level: { list: '', limit: 2 }, attenuator: { list: '0, -20, -40 dB', limit: 2 }, modulation: { list: '30 %', limit: 15 }, modulation_tone: { list: '400 Hz', limit: 10 }, rail: { list: 'HT 250 V', limit: 5 } } })
    await saveProcedure(db, bench, { modelId: model.id, seen: 0, origin: 'Handbook', why: '', warmUpMinutes: 30, supply: '240 V', decisionRule: 'guard_band', guardFactor: 1, checkpoints })
    const unit = await makeUnit(db, bench, { state: 'bench', modelId: model.id })
    tag = unit.tag
    await makeTriage(db, bench, unit.id)
    for (const instrument of demoInstruments(new Date())) await addInstrument(db, bench, instrument)
  })
  const sheet = () => getTestSheet(server().database.db, { tag, number: 1 })

  it('goes by keyboard alone: instruments, every reading by Enter, checks, signature, report', async () => {
    const page = await openAs('bench')
    await visit(page, `/units/${tag}/test`)
    await tabTo(page, /Start the sheet/)
    await page.keyboard.press('Enter')
    await page.waitForURL('**/test-sheets/1')

    await tabTo(page, /Choose the instruments used/)
    await page.keyboard.press('Enter')
    for (const name of [/Counter, 8 digits/, /Digital multimeter/, /RF millivoltmeter/, /Oscilloscope/]) {
      await tabTo(page, name)
      await page.keyboard.press('Space')
    }
    await page.reload()
    await expect.poll(async () => (await sheet()).instrumentList.length, { timeout: 10_000 }).toBe(4)

    const { readings } = await sheet()
    await tabTo(page, /A, 100.kHz: as found/)
    for (const { found } of readDemoSheet('keyboard', readings, { errors: { 4: -2.6 } })) {
      expect(await focused(page)).toMatch(/: as found/)
      await page.keyboard.type(found)
      await page.keyboard.press('Enter')
    }
    // From the last reading Enter goes on to the first check.
    expect(await focused(page)).toMatch(/Internal modulation present/)
    await expect.poll(async () => (await sheet()).tally, { timeout: 15_000 }).toMatchObject({ points: readings.length, read: readings.length, fail: 1 })
    await page.getByText(/reads .*: out/).first().waitFor()

    for (const { name } of (await sheet()).checks) {
      await tabTo(page, new RegExp(name))
      await page.keyboard.press('ArrowLeft')
      await page.keyboard.press('ArrowLeft')
    }
    expect(await runAxe(page)).toEqual([])
    await tabTo(page, /Sign the sheet/)
    await page.keyboard.press('Enter')
    await page.getByText('Test sheet 1 is signed').waitFor()
    expect(await sheet()).toMatchObject({ procedure: { number: 1 }, tally: { fail: 1 }, checksFailed: 0, signedBy: 'Edith Marsh' })

    await tabTo(page, /Test report \(PDF\)/)
    const address = await page.evaluate(() => document.activeElement instanceof HTMLAnchorElement ? document.activeElement.href : '')
    const report = readPdfText(await (await page.request.get(address)).body())
    expect(report).toContain('1 of 22 readings out')
    expect(report).toContain('Attenuator')
    page.expectClean()
  })
})
