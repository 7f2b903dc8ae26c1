import { beforeAll, describe, expect, it } from 'vitest'
import { safetyChecks, triages, unitDisclosures } from '../../../drizzle/schema'
import { addKeptWith } from '../../../server/services/kept-with'
import { writePerson } from '../../../server/services/people'
import { DISCLOSURE_KEYS } from '../../../shared/domain/disclosures'
import type { Role } from '../../../shared/domain/roles'
import { ROLES } from '../../../shared/domain/roles'
import { formatTag, makeTag } from '../../../shared/domain/tag'
import { runAxe, signIn, useBrowser, visit } from '../../support/browser'
import type { PageOptions, WatchedPage } from '../../support/browser'
import { makePlace, makeShop, makeUnit } from '../../support/records'
import { useTestServer } from '../../support/server'

const PASSWORD = 'a-password-for-tests'

describe('the page of one unit', () => {
  const server = useTestServer()
  const open = useBrowser()
  const people = new Map<Role, string>()
  const states = new Map<Role, NonNullable<PageOptions['storageState']>>()
  let tag = ''
  let id = ''
  let hazardous = ''

  beforeAll(async () => {
    const { db } = server().database
    await makeShop(db)
    for (const role of ROLES) {
      people.set(role, await writePerson(db, null, { email: `${role}@demo.invalid`, name: `Test ${role}`, role, password: PASSWORD, mustChangePassword: false }))
    }
    const owner = { id: people.get('owner') ?? '', name: 'Test owner', email: 'owner@demo.invalid', role: 'owner' as const, mustChangePassword: false }
    const place = await makePlace(db, 'Long store')
    const unit = await makeUnit(db, owner, { locationId: place.id, costMinor: 4500, costCurrency: 'GBP', askingMinor: 14_500, askingCurrency: 'GBP', conditionNotes: 'Case sound.' })
    tag = unit.tag
    id = unit.id
    await addKeptWith(db, owner, { tag, kind: 'lead', description: 'Terminated output lead', originality: 'original', condition: '', whereabouts: 'with_unit', placeTag: null, absenceDisclosed: '' })
    const held = await makeUnit(db, owner, { hazardHold: 'Asbestos pad behind the lamp' })
    hazardous = held.tag
    await db.insert(triages).values({ unitId: held.id, safetyClass: 'earthed', lead: 'sound', plug: 'sound', fuse: 'sound', hazards: ['asbestos'], verdict: 'hazard_hold', doneBy: owner.id })
  })

  /** Signs a role in once, then opens pages already signed in. */
  async function openAs(role: Role, options: PageOptions = {}): Promise<WatchedPage> {
    let storageState = states.get(role)
    if (!storageState) {
      const door = await open(server().url)
      await signIn(door, `${role}@demo.invalid`, PASSWORD)
      storageState = await door.context().storageState()
      states.set(role, storageState)
    }
    return open(server().url, { ...options, storageState })
  }

  it.each([
    ['desk', 'light'], ['desk', 'dark'], ['phone', 'light'], ['phone', 'dark'],
  ] as const)('reads as a rating plate, and axe finds nothing serious (%s, %s)', async (viewport, colorScheme) => {
    const page = await openAs('owner', { viewport, colorScheme })
    for (const each of [tag, hazardous]) {
      await visit(page, `/units/${each}`)
      await expect.poll(() => page.getByRole('heading', { level: 1 }).textContent()).toMatch(/Oxmarden\s*307-/)
      expect(await page.getByText(formatTag(each), { exact: true }).first().isVisible()).toBe(true)
      expect(await runAxe(page)).toEqual([])
      expect(await page.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth)).toBe(true)
    }
    expect(await page.getByRole('heading', { name: 'Hazard hold' }).isVisible()).toBe(true)
    page.expectClean()
  })

  it('is reached by a tag typed any way, and led to the compact one', async () => {
    const page = await openAs('bench')
    await visit(page, `/units/${tag.slice(0, 4).toLowerCase()}-${tag.slice(4).toLowerCase()}`)
    expect(new URL(page.url()).pathname).toBe(`/units/${tag}`)
    page.expectClean()
  })

  it('says what is wrong with a tag that names nothing', async () => {
    const page = await openAs('bench', { expectedStatuses: [404] })
    const wrong = tag.slice(0, -1) + (tag.endsWith('A') ? 'B' : 'A')
    await visit(page, `/units/${wrong}`)
    expect(await page.getByText('One character is off').isVisible()).toBe(true)
    const unknown = makeTag('U', 999)
    await visit(page, `/units/${unknown}`)
    expect(await page.getByText(`No unit has the tag ${formatTag(unknown)}.`).isVisible()).toBe(true)
    expect(await runAxe(page)).toEqual([])
  })

  it('shows a reader neither money nor a deed', async () => {
    const page = await openAs('reader')
    await visit(page, `/units/${tag}`)
    const text = await page.locator('main').textContent()
    expect(text).not.toContain('£')
    expect(text).not.toContain('Log modification')
    expect(await page.getByRole('heading', { name: 'What it can do next' }).count()).toBe(0)
  })

  it('lets the floor add a kept-with item, telling what is missing and losing nothing typed', async () => {
    const page = await openAs('floor', { viewport: 'phone' })
    await visit(page, `/units/${tag}`)
    await page.getByRole('link', { name: 'Add an item' }).click()
    await page.getByLabel('What it is').fill('Dummy aerial')
    await page.getByRole('button', { name: 'Add item' }).click()
    await page.getByRole('link', { name: 'Choose what kind of thing it is' }).click()
    expect(await page.getByLabel('Kind').evaluate(field => field === document.activeElement)).toBe(true)
    await page.getByLabel('Kind').selectOption({ label: 'Lead' })
    await page.getByText('Original', { exact: true }).click()
    await page.getByText('Missing', { exact: true }).click()
    await page.getByLabel(/What the buyer is told/).fill('Sold without its dummy aerial')
    expect(await runAxe(page)).toEqual([])
    await page.getByRole('button', { name: 'Add item' }).click()
    await page.waitForURL(`**/units/${tag}`)
    await page.getByText(/missing since .*, disclosed/).waitFor()
    await page.getByText(/Noted Dummy aerial/).waitFor()
    page.expectClean()
  })

  it('goes from intake to the buyer’s door, saying at each refusal what would satisfy it', async () => {
    const { db } = server().database
    const page = await openAs('owner')
    await visit(page, `/units/${tag}`)
    const move = (name: string) => page.locator('#moves').getByRole('button', { name, exact: true }).click()
    const isNow = (state: string) => page.locator('header').getByText(state, { exact: true }).waitFor()

    await move('Send to the bench')
    await isNow('On the bench')
    await page.locator('#moves').getByText('It has had no triage').first().waitFor()
    const doneBy = people.get('bench') ?? ''
    await db.insert(triages).values({ unitId: id, safetyClass: 'earthed', lead: 'sound', plug: 'sound', fuse: 'sound', verdict: 'may_be_powered', doneBy })
    await db.insert(safetyChecks).values({
      unitId: id, safetyClass: 'earthed', leadAndPlug: 'pass', fuse: 'pass', polarity: 'pass', visual: 'pass', earthBondLimitMilliohm: 100,
      insulationLimitKilohm: 1000, leakageLimitMicroamp: 3500, limitsOrigin: 'invented', passed: true, doneBy,
    })
    await visit(page, `/units/${tag}`)
    await move('Mark as ready')
    await isNow('Ready')
    await page.locator('#moves').getByText('The buyer is not yet told about').waitFor()
    await db.insert(unitDisclosures).values(DISCLOSURE_KEYS.map(key => ({ unitId: id, key, answer: 'not_looked' as const, answeredBy: doneBy })))
    await visit(page, `/units/${tag}`)
    await move('Offer for sale')
    await isNow('Offered')

    await page.locator('#moves').getByRole('link', { name: 'Record the sale' }).click()
    await page.getByLabel('Who bought it').fill('Mr Pell')
    await page.getByRole('button', { name: 'Record the sale' }).click()
    await page.waitForURL(`**/units/${tag}`)
    await isNow('Sold')

    await page.getByRole('link', { name: 'Pack it' }).click()
    await page.getByText('Not packed and not disclosed as absent').waitFor()
    await page.getByRole('checkbox', { name: /Terminated output lead/ }).check()
    await page.getByText(/^(\d) of \1 packed or disclosed$/).waitFor()
    await page.getByRole('button', { name: 'Dispatch it' }).click()
    await page.waitForURL(`**/units/${tag}`)
    await isNow('Dispatched')
    await page.getByText('Went from “Sold” to “Dispatched”').waitFor()
    page.expectClean()
  })
})
