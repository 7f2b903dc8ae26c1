import { execFileSync } from 'node:child_process'
import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { eq } from 'drizzle-orm'
import sharp from 'sharp'
import { describe, expect, it } from 'vitest'
import { units } from '../../drizzle/schema'
import { loadDemoShop } from '../../scripts/demo/load'
import { formatTag } from '../../shared/domain/tag'
import { signIn, signInByForm, useBrowser, visit } from '../support/browser'
import { useTestServer } from '../support/server'

/**
 * One piece of the demo shop through its life, as its people live it: found by what it covers, worked on, told to the
 * buyer, published, read by a stranger, and taken back. Booking in is in `stock/`, the label that is printed and scanned
 * with a camera in `labels/scanning.test.ts`.
 */
const PASSWORD = 'anode-vernier-brass-2207'
const server = useTestServer({ prepare: async ({ database }) => void await loadDemoShop(database.db, null, PASSWORD) })
const open = useBrowser()

describe('one piece, from the shelf to the buyer', { timeout: 240_000 }, () => {
  it('is found, worked on, disclosed, published, read and taken back', async () => {
    const page = await open(server().url, { viewport: 'phone' })
    await signInByForm(page, 'owner@demo.invalid', PASSWORD)

    // Found by what it covers, with the typing error forgiven.
    const { db } = server().database
    const [unit] = await db.select({ id: units.id, tag: units.tag }).from(units).where(eq(units.serial, '5102'))
    const tag = unit?.tag ?? ''
    await visit(page, '/stock')
    await page.getByRole('searchbox').fill('signal generater covers 455 kc')
    const hit = page.getByRole('link', { name: new RegExp(formatTag(tag)) }).filter({ visible: true })
    await hit.waitFor()
    expect(await page.getByRole('status').filter({ hasText: 'of' }).first().textContent()).toMatch(/\d+ pieces? covers? it|\d+ pieces cover it/)
    await page.waitForURL(/q=signal/)
    await hit.click()
    await page.waitForURL(`**/units/${tag}`)

    // Work is logged in one form, with a photo, from the phone.
    await page.getByRole('link', { name: 'Log modification' }).click()
    await page.waitForURL('**/log')
    await page.getByLabel('We did').check()
    await page.getByLabel('Before', { exact: true }).fill('Two-pin mains inlet')
    await page.getByLabel('After', { exact: true }).fill('Fused three-pin inlet')
    await page.getByText('Hole to fill').click()
    await page.getByText('Kept with the unit').click()
    await page.getByLabel(/What is in the bag/).fill('Old inlet')
    const photo = join(server().filesDir, 'inlet.jpg')
    writeFileSync(photo, await sharp({ create: { width: 640, height: 480, channels: 3, background: '#88665a' } }).jpeg().toBuffer())
    await page.locator('input[type=file]').setInputFiles(photo)
    await page.getByRole('button', { name: 'Save modification' }).click()
    await page.waitForURL(`**/units/${tag}`)
    await page.getByText(/Modification logged\. Tag the bag K/).waitFor()
    await page.locator('#work').getByText('Two-pin mains inlet').first().waitFor()
    expect(await page.getByText('Old inlet').count()).toBeGreaterThan(0)

    // Nothing is published while a buyer would still have to ask; "not known" is an answer.
    await visit(page, `/units/${tag}/provenance`)
    await page.getByRole('button', { name: 'Publish the sheet' }).click()
    await page.getByText(/A buyer must still be told/).waitFor()
    page.complaints.splice(0)
    await visit(page, `/units/${tag}/disclosures`)
    for (const group of await page.getByRole('group').all()) await group.getByText('Not known', { exact: true }).click()
    await page.getByRole('button', { name: 'Save the answers' }).click()
    await page.getByText('Everything a buyer must be told is answered').waitFor()
    await visit(page, `/units/${tag}/provenance`)
    await page.getByRole('button', { name: 'Publish the sheet' }).click()
    const link = await page.getByRole('link', { name: /\/p\// }).getAttribute('href') ?? ''
    expect(link).toMatch(/\/p\/[\w-]{32}$/)
    page.expectClean()

    // A stranger reads it: what was done, without cost, shelf or names; and the same as PDF.
    const stranger = await open(server().url, { viewport: 'phone' })
    await visit(stranger, new URL(link).pathname)
    await stranger.getByText('Two-pin mains inlet').first().waitFor()
    const text = await stranger.locator('body').innerText()
    for (const secret of ['£45', 'Bench room', 'Odile', 'Bram']) expect(text).not.toContain(secret)
    const pdf = await stranger.request.get(`/api/provenance/${link.split('/').at(-1)}/sheet.pdf`)
    expect(pdf.headers()['content-type']).toBe('application/pdf')
    const file = join(server().filesDir, 'sheet.pdf')
    writeFileSync(file, await pdf.body())
    expect(execFileSync('pdftotext', ['-layout', file, '-']).toString()).toContain('Fused three-pin inlet')
    stranger.expectClean()

    // The link is taken back: it leads nowhere.
    await page.getByRole('button', { name: 'Take the link back' }).click()
    await page.getByRole('dialog').getByLabel('Why').fill('Sold to somebody else')
    await page.getByRole('dialog').getByRole('button', { name: 'Take the link back' }).click()
    await page.getByText('Not published').waitFor()
    expect((await stranger.request.get(new URL(link).pathname)).status()).toBe(404)
  })

  it('keeps money from the floor and everything but reading from the reader', async () => {
    const floor = await open(server().url, { viewport: 'desk' })
    await signIn(floor, 'floor@demo.invalid', PASSWORD)
    const [bought] = await server().database.db.select({ tag: units.tag, costMinor: units.costMinor }).from(units).where(eq(units.serial, '4417'))
    expect(bought?.costMinor).toBe(6000)
    const seen = await (await floor.request.get(`/api/units/${bought?.tag}`)).text()
    expect(JSON.parse(seen)).toMatchObject({ tag: bought?.tag, costMinor: null, sourceName: null })
    const reader = await open(server().url, { expectedStatuses: [403] })
    await signIn(reader, 'reader@demo.invalid', PASSWORD)
    const refused = await reader.request.post('/api/units', { data: {} })
    expect(refused.status()).toBe(403)
    expect(refused.headers()['content-type']).toContain('application/problem+json')
  })
})
