import { beforeAll, describe, expect, it } from 'vitest'
import { saveTestSheet, signTestSheet, startTestSheet } from '../../../server/services/test-sheets'
import { makeInstrument, makeTriage } from '../../support/bench'
import { runAxe, useBrowser, visit } from '../../support/browser'
import { makePdf } from '../../support/pictures'
import { makeShop, makeUnit } from '../../support/records'
import { useTestServer } from '../../support/server'
import { makeAccount, useSignedIn } from '../../support/sign-in'

describe('the bench’s own instruments', { timeout: 120_000 }, () => {
  const server = useTestServer()
  const openAs = useSignedIn(useBrowser(), () => server().url)
  let meterTag = ''

  beforeAll(async () => {
    const { db } = server().database
    await makeShop(db)
    const bench = await makeAccount(db, 'bench', 'Edith Marsh')
    const unit = await makeUnit(db, bench, { state: 'bench' })
    await makeTriage(db, bench, unit.id)
    const meter = await makeInstrument(db, bench)
    meterTag = meter.tag
    const { version } = await startTestSheet(db, bench, { tag: unit.tag, energised: true })
    const read = await saveTestSheet(db, bench, { tag: unit.tag, number: 1, version, instrumentIds: [meter.id], readings: [{ position: 1, found: '98.2 kc' }] })
    await signTestSheet(db, bench, { tag: unit.tag, number: 1, version: read.version })
  })

  it('enters an instrument with what it measures and its certificate as PDF', async () => {
    const page = await openAs('bench')
    await visit(page, '/instruments/new')
    await page.getByLabel('What it is').fill('Step attenuator')
    await page.getByRole('button', { name: 'Add a range' }).click()
    await page.getByLabel('Measures', { exact: true }).selectOption('level')
    await page.getByLabel('From', { exact: true }).fill('0 dB')
    await page.getByLabel('To, full scale').fill('100')
    await page.getByLabel('± dB').fill('0,3')
    await page.getByText('±0.3 dB', { exact: true }).waitFor()
    await page.getByRole('button', { name: 'Enter the instrument' }).click()
    await page.waitForURL(/\/instruments\/B\w+$/)
    await page.getByText('No calibration recorded').first().waitFor()

    await page.getByRole('button', { name: 'Enter a certificate' }).click()
    const dialog = page.getByRole('dialog')
    await dialog.getByLabel('Calibrated on').fill('2026-03-02')
    await dialog.getByLabel('Next due').fill('2026-03-01')
    await dialog.getByRole('button', { name: 'Enter the certificate' }).click()
    await dialog.getByRole('link', { name: /must be due after/ }).waitFor()
    await dialog.getByLabel('Next due').fill('2099-03-02')
    await dialog.getByLabel('Certificate number').fill('WCL 301')
    await dialog.getByLabel('The certificate itself, as PDF').setInputFiles({ name: 'wcl-301.pdf', mimeType: 'application/pdf', buffer: makePdf('certificate') })
    await dialog.getByRole('button', { name: 'Enter the certificate' }).click()
    const link = page.getByRole('link', { name: 'The certificate (PDF)' })
    await link.waitFor()
    const kept = await page.request.get(new URL(await link.getAttribute('href') ?? '', server().url).href)
    expect([kept.status(), kept.headers()['content-type'], kept.headers()['content-disposition']]).toEqual([200, 'application/pdf', expect.stringContaining('wcl-301.pdf')])
    await page.getByText('in force').waitFor()
    expect(await runAxe(page)).toEqual([])
    page.expectClean()
  })

  it('recalls what it measured once it is found wrong, and works the list off', async () => {
    const page = await openAs('bench', { viewport: 'phone' })
    await visit(page, `/instruments/${meterTag}/recall`)
    await page.getByLabel('What was found').fill('Reads 1 % high')
    await page.getByLabel('How far out it was').selectOption('percent')
    await page.getByLabel('By how much it reads too high').fill('1 %')
    await page.getByRole('button', { name: 'List what is in question' }).click()
    await page.waitForURL('**/recalls/1')
    await page.getByText('1 of 1 readings change').waitFor()
    await page.locator('summary', { hasText: 'The readings' }).click()
    await page.getByText(/it was a pass and is a fail/).waitFor()
    expect(await runAxe(page)).toEqual([])
    await page.getByLabel('What follows').selectOption('measure_again')
    await page.getByRole('button', { name: 'Decide' }).click()
    await page.getByText('1 of 1 sheet decided').waitFor()
    await page.getByRole('button', { name: 'Close the recall' }).click()
    await page.getByText('Recall 1 is closed').waitFor()
    page.expectClean()
  })
})
