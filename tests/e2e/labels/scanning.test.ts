import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { eq } from 'drizzle-orm'
import type { Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { people, publications } from '../../../drizzle/schema'
import { sealPassword } from '../../../server/utils/password'
import { checkCharacter, formatTag } from '../../../shared/domain/tag'
import type { Person } from '../../../shared/types/person'
import { runAxe, signIn, useBrowser, visit, waitForHydration } from '../../support/browser'
import { writeCameraFilm } from '../../support/camera'
import { crop, decode, rasterise } from '../../support/raster'
import { makePerson, makePlace, makeShop, makeUnit } from '../../support/records'
import { useTestServer } from '../../support/server'

const PASSWORD = 'a lamp behind the dial'
let film = ''

/** Types as a hand scanner does: keys close together, then Enter. */
async function scanByHand(page: Page, text: string): Promise<void> {
  await page.evaluate(async (typed) => {
    const press = (key: string) => {
      const target = document.activeElement ?? document.body
      const goesOn = target.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true }))
      // What a browser does with a key that nobody stopped.
      if (goesOn && key.length === 1 && target instanceof HTMLInputElement) {
        target.value += key
        target.dispatchEvent(new Event('input', { bubbles: true }))
      }
      if (goesOn && key === 'Enter' && target instanceof HTMLInputElement) target.form?.requestSubmit()
    }
    for (const key of typed) {
      // Without a pause: on a busy machine a timer may wait longer than any scanner does between two keys.
      press(key)
    }
    press('Enter')
  }, text)
}

describe('scanning and labels', () => {
  let folder = ''
  let owner: Person
  let unit: { tag: string, id: string }
  let place: { tag: string }
  const server = useTestServer({
    prepare: async ({ database: { db } }) => {
      await makeShop(db)
      owner = await makePerson(db, 'owner', 'Odile')
      await db.update(people).set({ passwordHash: await sealPassword(PASSWORD) }).where(eq(people.id, owner.id))
      unit = await makeUnit(db, owner)
      place = await makePlace(db, 'Long store')
    },
  })
  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'knurl-film-'))
  })
  afterAll(() => rm(folder, { recursive: true, force: true }))
  // Chromium reads the film when the camera is opened, so that it can be made once the label has been printed.
  film = join(tmpdir(), `knurl-camera-${process.pid}.y4m`)
  afterAll(() => rm(film, { force: true }))
  const open = useBrowser({ camera: film })

  async function signedIn(viewport: 'phone' | 'desk' = 'phone', colorScheme: 'light' | 'dark' = 'light', expectedStatuses: number[] = []) {
    const page = await open(server().url, { viewport, colorScheme, expectedStatuses })
    await signIn(page, owner.email, PASSWORD)
    return page
  }

  /** The label of a tag as the product prints it, cut out of its sheet at 300 dpi. */
  async function printedLabel(page: Page, tag: string) {
    const bytes = await (await page.context().request.get(`/api/labels.pdf?tags=${tag}`)).body()
    const [sheet] = await rasterise(new Uint8Array(bytes), 300)
    if (!sheet) throw new Error('The PDF has no page')
    return crop(sheet, Math.round(7.21 / 25.4 * 300), Math.round(12.9 / 25.4 * 300), Math.round(63.5 / 25.4 * 300), Math.round(33.9 / 25.4 * 300))
  }

  it('opens the right record when the phone’s camera sees a label that the product printed', async () => {
    const page = await signedIn('phone', 'dark')
    const label = await printedLabel(page, unit.tag)
    expect((await decode(label)).map(({ text }) => text).sort()).toEqual([`${server().url.toUpperCase()}/S/${unit.tag}`, unit.tag].sort())
    await writeCameraFilm(film, label)
    await visit(page, '/scan')
    await page.waitForURL(url => url.pathname === `/units/${unit.tag}`)
    await expect.poll(() => page.getByText(formatTag(unit.tag)).count()).toBeGreaterThan(0)
    page.expectClean()
  })

  it('says that one character is off, and opens what is typed right, any way', async () => {
    const page = await signedIn('phone', 'light', [404])
    // This browser's camera sees a label of its own and would open that first.
    await page.addInitScript(() => Object.defineProperty(navigator, 'mediaDevices', { value: undefined }))
    await visit(page, '/scan')
    const body = unit.tag.slice(0, -1)
    const wrong = `${body}${checkCharacter(body) === '7' ? '8' : '7'}`
    await page.getByLabel('Or type the tag').fill(wrong)
    await page.getByRole('button', { name: 'Open the record' }).click()
    await page.getByText('One character is off', { exact: false }).first().waitFor()
    await page.getByLabel('Or type the tag').fill('  ' + formatTag(place.tag).toLowerCase().replaceAll(' ', '-'))
    await page.getByRole('button', { name: 'Open the record' }).click()
    await page.waitForURL(url => url.pathname === `/locations/${place.tag}`)
  })

  it('opens the record when a hand scanner types in the middle of a form, and leaves the form as it was', async () => {
    const page = await signedIn('desk', 'light', [404])
    await visit(page, '/labels')
    // On the labels page a scan goes into the batch.
    await page.getByLabel('Tag').fill('half a wo')
    await scanByHand(page, unit.tag)
    await page.getByText('To label: 1').waitFor()
    expect(await page.getByLabel('Tag').inputValue()).toBe('half a wo')
    // On any other page it opens the record.
    await visit(page, `/units/${unit.tag}/kept-with/new`)
    const field = page.getByLabel('What it is', { exact: false }).or(page.getByRole('textbox')).first()
    await field.fill('Terminated out')
    await field.focus()
    await scanByHand(page, place.tag)
    await page.waitForURL(url => url.pathname === `/locations/${place.tag}`)
    // Something that is no tag stays where it was typed.
    await visit(page, '/labels')
    await page.getByLabel('Tag').focus()
    await scanByHand(page, '4006381333931')
    expect(await page.getByLabel('Tag').inputValue()).toBe('4006381333931')
  })

  it('shows the sheet as it will print, from the place pressed on, and notes the printing', async () => {
    const page = await signedIn('desk')
    await visit(page, `/labels?tags=${unit.tag},${place.tag}`)
    await page.getByText('2 labels on 1 sheet', { exact: false }).waitFor()
    await page.getByLabel('Start at label').fill('24')
    await page.getByText('2 labels on 2 sheets', { exact: false }).waitFor()
    const [popup] = await Promise.all([page.waitForEvent('popup'), page.getByRole('link', { name: 'Print labels' }).click()])
    expect(popup.url()).toContain('/api/labels.pdf?tags=')
    await page.getByText('story says that its label was printed', { exact: false }).waitFor()
    page.expectClean()
  })

  it('leads from a label’s code to the record, the public sheet or the door, and says what is wrong with a wrong one', async () => {
    const staff = await signedIn('phone', 'light', [404])
    await staff.goto(`/S/${unit.tag}`)
    expect(new URL(staff.url()).pathname).toBe(`/units/${unit.tag}`)
    await staff.goto(`/S/${place.tag}`)
    expect(new URL(staff.url()).pathname).toBe(`/locations/${place.tag}`)

    const visitor = await open(server().url, { viewport: 'phone', expectedStatuses: [404] })
    await visitor.goto(`/S/${unit.tag}`)
    expect(new URL(visitor.url()).pathname).toBe('/sign-in')
    expect(new URL(visitor.url()).searchParams.get('next')).toBe(`/s/${unit.tag}`)
    await waitForHydration(visitor)
    await visitor.getByLabel('E-mail', { exact: true }).fill(owner.email)
    await visitor.getByLabel('Password', { exact: true }).fill(PASSWORD)
    await visitor.getByRole('button', { name: 'Sign in', exact: true }).click()
    await visitor.waitForURL(url => url.pathname === `/units/${unit.tag}`)

    const buyer = await open(server().url, { viewport: 'phone', expectedStatuses: [404] })
    await server().database.db.insert(publications).values({ unitId: unit.id, token: 'a'.repeat(32), publishedBy: owner.id })
    await buyer.goto(`/s/${unit.tag}`)
    expect(new URL(buyer.url()).pathname).toBe(`/p/${'a'.repeat(32)}`)
    const response = await buyer.goto('/s/U0000017')
    expect(response?.status()).toBe(404)
    await buyer.getByText('One character is off', { exact: false }).waitFor()
  })

  it.each(['light', 'dark'] as const)('has nothing serious for axe, %s', async (scheme) => {
    for (const viewport of ['phone', 'desk'] as const) {
      const page = await signedIn(viewport, scheme)
      await visit(page, `/labels?tags=${unit.tag}`)
      await page.getByText('1 label on 1 sheet', { exact: false }).waitFor()
      expect(await runAxe(page)).toEqual([])
      await page.context().clearPermissions()
      await visit(page, '/scan')
      expect(await runAxe(page)).toEqual([])
    }
  })
})
