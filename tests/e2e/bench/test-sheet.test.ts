import { eq } from 'drizzle-orm'
import type { Page } from 'playwright-core'
import { beforeAll, describe, expect, it } from 'vitest'
import { safetyChecks } from '../../../drizzle/schema'
import { getTestSheet } from '../../../server/services/test-sheets'
import { makeInstrument, makeTriage } from '../../support/bench'
import { focused, tabTo } from '../../support/keyboard'
import { runAxe, useBrowser, visit } from '../../support/browser'
import { makeShop, makeUnit } from '../../support/records'
import { useTestServer } from '../../support/server'
import { makeAccount, useSignedIn } from '../../support/sign-in'

describe('a test sheet, by keyboard alone', { timeout: 120_000 }, () => {
  const server = useTestServer()
  const openAs = useSignedIn(useBrowser(), () => server().url)
  let unit: Awaited<ReturnType<typeof makeUnit>>

  beforeAll(async () => {
    const { db } = server().database
    await makeShop(db)
    const bench = await makeAccount(db, 'bench', 'Edith Marsh')
    unit = await makeUnit(db, bench, { state: 'bench' })
    await makeTriage(db, bench, unit.id)
    await makeInstrument(db, bench)
  })

  const sheet = () => getTestSheet(server().database.db, { tag: unit.tag, number: 1 })

  /** The point that was out is put right, and read three times over, still by keyboard alone. */
  async function adjust(page: Page): Promise<void> {
    await tabTo(page, /A, 320.kHz: as left/)
    await page.keyboard.type('319.6; 319.8; 319.7 kc')
    await page.keyboard.press('Enter')
    await expect.poll(async () => (await sheet()).readings[2]?.left?.text, { timeout: 10_000 }).toBe('319.6; 319.8; 319.7 kc')
  }

  it('starts, takes a reading for each Enter, and loses nothing when the server is out of reach', async () => {
    const page = await openAs('bench')
    await visit(page, `/units/${unit.tag}/test`)
    await tabTo(page, /Start the sheet/)
    await page.keyboard.press('Enter')
    await page.waitForURL('**/test-sheets/1')
    await page.getByText('Before anything is powered or measured').waitFor()

    await tabTo(page, /A, 100.kHz: as found/)
    await page.keyboard.type('98.2')
    await page.getByText('−1.80').first().waitFor()
    await page.keyboard.press('Enter')
    expect(await focused(page)).toMatch(/A, 180.kHz: as found/)
    await page.keyboard.type('banana')
    await page.keyboard.press('Enter')
    await page.getByText('"banana" is not a reading').waitFor()
    // 320 kHz: 313.0 is 2.19 % low, beyond the usual 2 % (common practice, no source).
    await page.keyboard.type('313.0 kc')
    await page.keyboard.press('Enter')
    // No instrument is chosen yet, so nothing is more than conditional.
    await page.getByText('Conditional fail', { exact: true }).waitFor()
    await expect.poll(async () => (await sheet()).tally.read, { timeout: 10_000 }).toBe(2)
    expect((await sheet()).readings.slice(0, 3).map(point => point.found?.text)).toEqual(['98.2', undefined, '313.0 kc'])
    expect(await page.getByRole('img', { name: /Dial against frequency\. 1 of 2 readings out, 1 in but too near the limit to be certain, 13 of 15 not read/ }).count()).toBe(1)

    // The lid is closed while the server is out of reach: what was typed is back, and is saved once it answers.
    await page.route('**/test-sheets/1', (route, request) => request.method() === 'PATCH' ? route.abort() : route.continue())
    await page.keyboard.type('321 kc')
    await page.keyboard.press('Enter')
    await page.getByText('can’t be reached').first().waitFor()
    page.complaints.splice(0)
    await page.unroute('**/test-sheets/1')
    await visit(page, `/units/${unit.tag}/test-sheets/1`)
    await page.getByText('What you had typed on this device').waitFor()
    expect(await page.getByLabel(/A, 180.kHz: as found/).inputValue()).toBe('banana')
    await expect.poll(async () => (await sheet()).readings[3]?.found?.text, { timeout: 10_000 }).toBe('321 kc')
    page.expectClean()
  })

  it('brings in what a second person saves, and signs only what can be read', async () => {
    const page = await openAs('bench', { expectedStatuses: [409, 422] })
    const other = await openAs('bench')
    await visit(page, `/units/${unit.tag}/test-sheets/1`)
    await visit(other, `/units/${unit.tag}/test-sheets/1`)
    await other.getByLabel('Supply').fill('240 V through an isolating transformer')
    await expect.poll(async () => (await sheet()).supply, { timeout: 10_000 }).toContain('isolating')
    await tabTo(page, /A, 180.kHz: as found/)
    await page.keyboard.press('Control+A')
    await page.keyboard.type('180.7 kc')
    await page.keyboard.press('Enter')
    await page.getByText('Somebody else saved this sheet too').waitFor()
    await expect.poll(async () => (await sheet()).readings[1]?.found?.text, { timeout: 10_000 }).toBe('180.7 kc')
    expect(await page.getByLabel('Supply').inputValue()).toContain('isolating')

    await tabTo(page, /Internal modulation present/)
    await page.keyboard.press('ArrowRight')
    await page.keyboard.press('ArrowRight')
    await tabTo(page, /Sign the sheet/)
    await page.keyboard.press('Enter')
    await page.getByRole('alert').getByText('Choose the instrument that took the readings').waitFor()
    expect(await runAxe(page)).toEqual([])

    await tabTo(page, /Frequency meter/)
    await page.keyboard.press('Space')
    await page.getByText('Pass', { exact: true }).first().waitFor()
    await adjust(page)
    await tabTo(page, /Sign the sheet/)
    await page.keyboard.press('Enter')
    await page.getByText('Test sheet 1 is signed').waitFor()
    const signed = await sheet()
    expect(signed.signedAt).not.toBeNull()
    expect(signed).toMatchObject({ tally: { read: 4, pass: 4, fail: 0 } })
    expect(signed.readings[2]).toMatchObject({ found: { text: '313.0 kc', result: { judgement: { verdict: 'fail' } } }, left: { text: '319.6; 319.8; 319.7 kc', result: { count: 3 } } })
    expect(signed.checks[0]?.result).not.toBe('not_done')
    await page.getByRole('region', { name: 'Readings of test sheet 1: Dial' }).waitFor()
    expect(await runAxe(page)).toEqual([])
    page.expectClean()
  })

  it('records a safety check against stated limits, and says what is missing', async () => {
    const page = await openAs('bench', { viewport: 'phone' })
    await visit(page, `/units/${unit.tag}/safety`)
    await page.getByText('Before anything is powered or measured').waitFor()
    await page.getByText('The earth bond was not measured').waitFor()
    await page.getByRole('button', { name: 'Record the safety check' }).click()
    await page.getByRole('alert').getByRole('link', { name: 'Choose how the lead and plug came out' }).waitFor()
    for (const look of ['Visual inspection', 'Lead and plug', 'Fuse', 'Polarity']) await page.getByRole('group', { name: look }).getByText('Pass', { exact: true }).click()
    await page.getByLabel('Earth bond, Ω').fill('0.12')
    await page.getByText(/Earth bond 0\.12.Ω against a limit of 0\.1.Ω at most: beyond it/).waitFor()
    await page.getByLabel('Earth bond, Ω').fill('0.06')
    await page.getByLabel('Insulation, MΩ').fill('> 200')
    await page.getByLabel('Instrument').selectOption({ index: 1 })
    expect(await runAxe(page)).toEqual([])
    await page.getByRole('button', { name: 'Record the safety check' }).click()
    await page.waitForURL(`**/units/${unit.tag}`)
    await page.getByText('Checked as earthed (Class I): all within the limits stated').first().waitFor()
    const [check] = await server().database.db.select().from(safetyChecks).where(eq(safetyChecks.unitId, unit.id))
    expect(check).toMatchObject({ passed: true, earthBondMilliohm: 60, insulationKilohm: 200_000 })
    page.expectClean()
  })
})
