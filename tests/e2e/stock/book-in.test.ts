import { eq } from 'drizzle-orm'
import sharp from 'sharp'
import { beforeAll, describe, expect, it } from 'vitest'
import { photos, units } from '../../../drizzle/schema'
import { addModel } from '../../../server/services/models'
import { writePerson } from '../../../server/services/people'
import { formatTag, makeTag } from '../../../shared/domain/tag'
import { newModel } from '../../../shared/schemas/model'
import { runAxe, signIn, useBrowser, visit } from '../../support/browser'
import { makePlace, makeShop } from '../../support/records'
import { useTestServer } from '../../support/server'

const PASSWORD = 'a-password-for-tests'

describe('booking in at the doorway', () => {
  const server = useTestServer()
  const open = useBrowser()

  beforeAll(async () => {
    const { db } = server().database
    await makeShop(db)
    await makePlace(db, 'Quarantine')
    const id = await writePerson(db, null, { email: 'owner@demo.invalid', name: 'Test owner', role: 'owner', password: PASSWORD, mustChangePassword: false })
    await writePerson(db, null, { email: 'floor@demo.invalid', name: 'Test floor', role: 'floor', password: PASSWORD, mustChangePassword: false })
    await addModel(db, { id }, newModel.parse({
      maker: 'Oxmarden', designation: '307-G', kind: 'rf_generator', bands: [{ label: 'A', function: 'generates', lower: '100 kc', upper: '320 kc' }],
      kit: [{ kind: 'lead', description: 'Output lead' }, { kind: 'manual', description: 'Handbook' }],
    }))
  })

  it('takes a phone less than a minute, survives a reload, and makes one unit of a double press', async () => {
    const page = await open(server().url, { viewport: 'phone' })
    await signIn(page, 'owner@demo.invalid', PASSWORD)
    await visit(page, '/stock/book-in')
    const begun = Date.now()
    await page.getByRole('button', { name: 'Book in', exact: true }).click()
    await expect.poll(() => page.getByRole('alert', { name: 'There is a problem' }).textContent(), { timeout: 20_000 }).toContain('Choose the model')
    expect(await runAxe(page)).toEqual([])

    await page.getByLabel('Model', { exact: true }).fill('oxmardn 307')
    await page.getByRole('option', { name: /Oxmarden 307-G/u }).click()
    await page.getByText('I can read it').click()
    await page.getByLabel('Serial as on the plate').fill('SN-\u{1F4FB}-4417')
    await page.getByRole('group', { name: 'Output lead' }).getByText('Here').click()
    await page.getByRole('group', { name: 'Handbook' }).getByText('Missing').click()
    await page.getByText('Bought', { exact: true }).click()
    await page.locator('#sourceKind').selectOption('club_sale')
    await page.getByLabel('What it cost').fill('£45')
    await page.locator('#placeTag').selectOption({ label: 'Quarantine' })

    await page.reload()
    await expect.poll(() => page.getByLabel('Serial as on the plate').inputValue(), { timeout: 20_000 }).toBe('SN-\u{1F4FB}-4417')
    const picture = async (name: string, background: string) =>
      ({ name, mimeType: 'image/jpeg', buffer: await sharp({ create: { width: 900, height: 600, channels: 3, background } }).jpeg().toBuffer() })
    await page.locator('#choose-photos').setInputFiles([await picture('box.jpg', '#a08a60'), await picture('front.jpg', '#6b7a6f')])
    await page.getByRole('button', { name: 'Book in', exact: true }).dblclick()

    const tag = makeTag('U', 1)
    await expect.poll(() => page.getByText(formatTag(tag), { exact: true }).isVisible(), { timeout: 20_000 }).toBe(true)
    await expect.poll(() => page.getByRole('status').first().textContent(), { timeout: 20_000 }).toContain('2 photos saved')
    expect(Date.now() - begun).toBeLessThan(60_000)
    expect(await runAxe(page)).toEqual([])
    page.expectClean()

    const { db } = server().database
    expect(await db.select({ tag: units.tag, serial: units.serial, costMinor: units.costMinor }).from(units)).toEqual([{ tag, serial: 'SN-\u{1F4FB}-4417', costMinor: 4500 }])
    expect(await db.$count(photos)).toBe(2)
    const receipt = await page.request.get(`/api/units/${tag}/receipt.pdf`)
    expect([receipt.status(), receipt.headers()['content-type']]).toEqual([200, 'application/pdf'])
    const label = await page.request.get(`/api/labels.pdf?tags=${tag}`)
    expect([label.status(), label.headers()['content-type']]).toEqual([200, 'application/pdf'])

    await page.getByRole('button', { name: 'Book in another' }).click()
    await expect.poll(() => page.locator('#sourceKind').inputValue(), { timeout: 20_000 }).toBe('club_sale')
    expect(await page.getByLabel('What it cost').inputValue()).toBe('')
  })

  it('lets the floor book in a model the shop has not had, and never shows it a cost', async () => {
    const page = await open(server().url, { viewport: 'phone' })
    await signIn(page, 'floor@demo.invalid', PASSWORD)
    await visit(page, '/stock/book-in')
    await page.getByLabel('Model', { exact: true }).fill('Kuremori FSG-711')
    await page.getByRole('option', { name: /as a new model/u }).click()
    await page.getByLabel('Kind of equipment').selectOption('stereo_generator')
    await page.getByText('Not looked', { exact: true }).first().click()
    await page.getByText('Bought', { exact: true }).click()
    await page.locator('#sourceKind').selectOption('auction')
    expect(await page.getByLabel('What it cost').count()).toBe(0)
    await page.getByRole('button', { name: 'Book in', exact: true }).click()
    await expect.poll(() => page.getByRole('heading', { name: 'Kuremori FSG-711' }).isVisible(), { timeout: 20_000 }).toBe(true)
    page.expectClean()
  })

  it('shows both versions when two people edit one record', async () => {
    const { db } = server().database
    const [unit] = await db.select({ tag: units.tag, version: units.version }).from(units).limit(1)
    const page = await open(server().url, { expectedStatuses: [409] })
    await signIn(page, 'owner@demo.invalid', PASSWORD)
    await visit(page, `/units/${unit?.tag}/edit`)
    await db.update(units).set({ supplyAsSet: '240 V, three-pin', version: (unit?.version ?? 0) + 1 }).where(eq(units.tag, unit?.tag ?? ''))
    await page.getByLabel('Supply as set').fill('115 V, two-pin')
    await page.getByRole('button', { name: 'Save record' }).click()
    await expect.poll(() => page.getByRole('row', { name: /Supply as set 240 V, three-pin 115 V, two-pin/u }).isVisible(), { timeout: 20_000 }).toBe(true)
    expect(await runAxe(page)).toEqual([])
    await page.getByRole('button', { name: 'Keep what I typed' }).click()
    await page.getByRole('button', { name: 'Save record' }).click()
    await expect.poll(() => page.getByText('Record saved').isVisible(), { timeout: 20_000 }).toBe(true)
    page.expectClean()
  })

  it('answers a 10 MB string and wrong types in words', async () => {
    const page = await open(server().url)
    await signIn(page, 'owner@demo.invalid', PASSWORD)
    const long = await page.request.post('/api/units', { data: { serial: 'x'.repeat(10_000_000) } })
    expect([long.status(), long.headers()['content-type']]).toEqual([413, expect.stringContaining('application/problem+json')])
    const wrong = await page.request.post('/api/units', { data: { modelId: 5, serial: {}, ownership: 7, kit: 'all' } })
    expect(wrong.status()).toBe(422)
    expect((await page.request.post('/api/units', { data: Buffer.from('{oops'), headers: { 'content-type': 'application/json' } })).status()).toBe(400)
    expect((await page.request.post('/api/units', { data: 'x', headers: { 'content-type': 'text/plain' } })).status()).toBe(415)
  })
})
