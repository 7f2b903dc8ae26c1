import { beforeAll, describe, expect, it } from 'vitest'
import { useBrowser, visit } from '../../support/browser'
import { tabTo } from '../../support/keyboard'
import { makeShop } from '../../support/records'
import { useTestServer } from '../../support/server'
import { expectSound, makeAccount, useSignedIn } from '../../support/sign-in'

describe('reading a part’s markings', { timeout: 120_000 }, () => {
  const server = useTestServer()
  const openAs = useSignedIn(useBrowser(), () => server().url)

  beforeAll(async () => {
    const { db } = server().database
    await makeShop(db)
    await makeAccount(db, 'bench', 'Edith Marsh')
    await makeAccount(db, 'reader', 'Ruth Sayle')
  })

  it('reads picked colours by keyboard alone, and says which band can’t be', async () => {
    const page = await openAs('bench')
    await visit(page, '/parts/markings')
    expect(await page.title()).toBe('Read a part’s markings · Knurl')
    await tabTo(page, /How it is marked/)
    await page.keyboard.press('ArrowRight')
    const value = page.locator('#value [aria-live]')
    await value.getByText('Choose every colour').waitFor()
    // Letters pick by name in a native list: gold, red, violet, yellow.
    await page.getByLabel('Band 1: figure').focus()
    for (const key of ['Go', 'R', 'V', 'Y']) {
      await page.keyboard.type(key)
      await page.keyboard.press('Tab')
    }
    await value.getByText('Band 1 can’t be gold', { exact: false }).waitFor()
    await tabTo(page, /Turn it round/)
    await page.keyboard.press('Enter')
    await value.getByText(/^4\.7\skΩ ±5\s%$/).first().waitFor()
    await value.getByText('is a preferred value of E24', { exact: false }).waitFor()
    await page.getByRole('img', { name: 'Resistor: yellow, violet, red, gold' }).waitFor()
    await expectSound(page)
    page.expectClean()
  })

  it('reads what is typed and the date of a part, for those who only read, on a phone in the dark', async () => {
    const page = await openAs('reader', { viewport: 'phone', colorScheme: 'dark' })
    await visit(page, '/parts/markings')
    await page.getByLabel('Marking on the part').fill('104K')
    await page.locator('#value').getByText('Old circuits write it', { exact: false }).first().waitFor()
    await page.getByLabel('Date code on the part').fill('190-7215')
    await page.getByLabel('Set made to').fill('1959')
    await page.getByText('This part is newer than the set', { exact: false }).waitFor()
    await page.getByLabel('Date code on the part').fill('190-9015')
    await page.getByText('31 years after', { exact: false }).waitFor()
    await expectSound(page)
    page.expectClean()
  })
})
