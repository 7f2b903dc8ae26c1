import { eq } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import { modifications, readings, safetyChecks, testSheets, triages } from '../../../drizzle/schema'
import { useBrowser, visit } from '../../support/browser'
import { makePerson, makeShop, makeUnit } from '../../support/records'
import { useTestServer } from '../../support/server'
import { expectSound, makeAccount, useSignedIn } from '../../support/sign-in'

describe('work after a test sheet', { timeout: 120_000 }, () => {
  const server = useTestServer()
  const open = useBrowser()
  const openAs = useSignedIn(open, () => server().url)
  let unit: Awaited<ReturnType<typeof makeUnit>>

  beforeAll(async () => {
    const { db } = server().database
    await makeShop(db)
    await makeAccount(db, 'owner')
    await makeAccount(db, 'bench')
    const bench = await makePerson(db, 'bench', 'Edith Marsh')
    const { id } = bench
    unit = await makeUnit(db, bench, { state: 'bench' })
    await db.insert(triages).values({ unitId: unit.id, safetyClass: 'earthed', lead: 'sound', plug: 'sound', fuse: 'sound', fuseRating: 'T 500 mA', verdict: 'may_be_powered', doneBy: id })
    const [sheet] = await db.insert(testSheets).values({ unitId: unit.id, number: 1, testedOn: '2026-01-09', testedBy: id, signedAt: new Date('2026-01-09T16:00:00Z'), signedBy: id }).returning()
    await db.insert(readings).values({
      sheetId: sheet?.id ?? '', position: 1, section: 'dial', quantity: 'frequency', bandLabel: 'A', atHz: 100_000, nominal: 100_000,
      foundText: '98.2 kc', foundValue: 98_200, signedResults: { found: null, left: null },
    })
  })

  const logged = () => server().database.db.select().from(modifications).where(eq(modifications.unitId, unit.id)).orderBy(modifications.createdAt)

  it('is logged without being asked what it changed, or with it', async () => {
    const page = await openAs('bench', { viewport: 'phone' })
    await visit(page, `/units/${unit.tag}/log`)
    await page.getByText('We did', { exact: true }).click()
    await page.getByLabel('Before', { exact: true }).fill('Selenium stack')
    await page.getByLabel('After', { exact: true }).fill('Silicon rectifier')
    await page.getByText('Re-solder', { exact: true }).click()
    await page.getByText('Discarded', { exact: true }).click()
    await page.getByText('Could it have changed what was measured? Yes, or not sure').click()
    await page.getByLabel('No, because …').check()
    await page.getByRole('button', { name: 'Save modification' }).click()
    await page.getByRole('link', { name: 'Enter why it could not have changed what was measured' }).click()
    expect(await page.getByLabel('Why it could not').evaluate(field => field === document.activeElement)).toBe(true)
    await expectSound(page)
    await page.getByLabel('Yes, or not sure').check()
    await page.getByLabel('Supply rails and rectifier').check()
    await expectSound(page)
    await page.getByRole('button', { name: 'Save modification' }).click()
    await page.waitForURL(`**/units/${unit.tag}`)
    await page.getByText('could have changed only: supply rails and rectifier').waitFor()
    expect(await logged()).toMatchObject([{ touches: ['supply'], affectsNothingBecause: null }])
    page.expectClean()
  })

  it.each([['desk', 'light'], ['phone', 'dark']] as const)('says on the sheet why it is stale (%s, %s)', async (viewport, colorScheme) => {
    const page = await openAs('bench', { viewport, colorScheme })
    await visit(page, `/units/${unit.tag}/test-sheets/1`)
    await page.getByText('A rectifier was changed after it was signed (Selenium stack, now Silicon rectifier): the HT may have shifted, and with it the dial. Dial no longer holds.').waitFor()
    await expectSound(page)
    await page.getByRole('button', { name: 'It does not affect this sheet…' }).click()
    await expectSound(page)
    page.expectClean()
  })

  it('is judged, from the sheet, not to affect it, and what it changed can be corrected later', async () => {
    const page = await openAs('bench')
    await visit(page, `/units/${unit.tag}/test-sheets/1`)
    await page.getByRole('button', { name: 'It does not affect this sheet…' }).press('Enter')
    await page.getByRole('button', { name: 'It does not affect it' }).press('Enter')
    await page.getByRole('link', { name: 'Enter why it does not affect what was measured' }).press('Enter')
    await page.keyboard.type('HT set to the same 248 V')
    await page.getByRole('button', { name: 'It does not affect it' }).press('Enter')
    await page.getByText('A rectifier was changed after').first().waitFor({ state: 'detached' })
    expect(await page.evaluate(() => document.activeElement?.id)).toBe('main')
    await visit(page, `/units/${unit.tag}`)
    await page.getByText('does not affect what was measured: HT set to the same 248 V').waitFor()
    await page.getByText('Judged that work changed nothing that was measured').waitFor()
    await page.getByRole('link', { name: /^Correct/ }).click()
    await page.getByText('Could it have changed what was measured? No').waitFor()
    expect(await page.getByLabel('Why it could not').inputValue()).toBe('HT set to the same 248 V')
    await expectSound(page)
    await page.getByLabel('Yes, or not sure').check()
    await page.getByLabel('Why it is corrected').fill('The dial was read again and had moved')
    await page.getByRole('button', { name: 'Save the correction' }).click()
    await page.waitForURL(`**/units/${unit.tag}`)
    expect(await logged()).toMatchObject([{ touches: null, affectsNothingBecause: null, version: 3 }])
    page.expectClean()
  })

  it.each([['desk', 'light'], ['phone', 'dark']] as const)('leaves a safety check to be made, with its fuse and its stored charge (%s, %s)', async (viewport, colorScheme) => {
    const page = await openAs('bench', { viewport, colorScheme })
    await visit(page, `/units/${unit.tag}/safety`)
    expect(await page.getByLabel('Fuse rating as fitted').inputValue()).toBe('T 500 mA')
    await page.getByText('Stored charge', { exact: true }).click()
    await page.getByLabel('Reservoir capacitor, µF').fill('32')
    await page.getByLabel('What stands on it in work, V DC').fill('350')
    await page.getByText('no bleeder entered. Without a bleeder it can stay charged for days').waitFor()
    await page.getByLabel('Bleeder across it, kΩ').fill('470')
    // Computed: 470 kΩ × 32 µF × ln(350/60) = 26.5 s.
    await page.getByRole('status').filter({ hasText: /bleeder 470.kΩ. It falls from 350.V to 60.V in about 27.seconds/ }).waitFor()
    await expectSound(page)
    await page.getByRole('button', { name: 'Record the safety check' }).click()
    await page.getByRole('link', { name: 'Choose how the fuse came out' }).waitFor()
    // What is typed after a refusal goes where it is typed.
    await page.getByLabel('Note').focus()
    await page.keyboard.type('Two pieces')
    expect(await page.getByLabel('Note').inputValue()).toBe('Two pieces')
    for (const legend of ['Visual inspection', 'Lead and plug', 'Fuse', 'Polarity']) {
      await page.getByRole('group', { name: legend, exact: true }).getByText('Pass', { exact: true }).click()
    }
    await page.getByRole('button', { name: 'Record the safety check' }).click()
    await page.waitForURL(`**/units/${unit.tag}`)
    await page.getByText('Fuse fitted: T 500 mA').waitFor()
    await page.locator('#safety-check').getByText(/It falls from 350.V to 60.V in about 27.seconds/).waitFor()
    const [check] = await server().database.db.select().from(safetyChecks).where(eq(safetyChecks.unitId, unit.id))
    expect(check).toMatchObject({ fuseRating: 'T 500 mA', reservoirMicrofarad: 32, bleederKilohm: 470, reservoirVolts: 350, passed: false })
    page.expectClean()
  })

  it.each([['desk', 'light'], ['phone', 'dark']] as const)('is judged by the rule that the shop has chosen (%s, %s)', async (viewport, colorScheme) => {
    const page = await openAs('owner', { viewport, colorScheme })
    await visit(page, '/settings')
    await page.getByText('Guard band (ILAC-G8:09/2019').waitFor()
    const factor = page.getByLabel('Guard band, times the expanded uncertainty U')
    await factor.fill('5')
    await page.getByRole('button', { name: 'Save settings' }).click()
    await page.getByRole('link', { name: 'The factor of the guard band is 3 at most, usually 1' }).click()
    expect(await factor.evaluate(field => field === document.activeElement)).toBe(true)
    await factor.fill('0.83')
    await page.getByText('w = 0.83 U').waitFor()
    await page.getByText('Simple acceptance', { exact: true }).click()
    await page.getByText('guard band w = 0').waitFor()
    await expectSound(page)
    await page.getByText('Guard band', { exact: true }).click()
    await page.getByRole('button', { name: 'Save settings' }).click()
    await page.waitForURL('**/shop')
    await visit(page, '/settings')
    expect(await factor.inputValue()).toBe('0.83')
    page.expectClean()
  })
})
