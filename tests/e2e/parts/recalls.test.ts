import { beforeAll, describe, expect, it } from 'vitest'
import { formatTag } from '../../../shared/domain/tag'
import { useBrowser, visit } from '../../support/browser'
import { insertFitting, insertPartLot, insertParty, insertSale } from '../../support/parts'
import { makePerson, makeShop, makeUnit } from '../../support/records'
import { useTestServer } from '../../support/server'
import { expectSound, makeAccount, useSignedIn } from '../../support/sign-in'

describe('parts that may be bad', { timeout: 120_000 }, () => {
  const server = useTestServer()
  const open = useBrowser()
  const openAs = useSignedIn(open, () => server().url)
  let lot: Awaited<ReturnType<typeof insertPartLot>>
  let stands: Awaited<ReturnType<typeof makeUnit>>
  let sold: Awaited<ReturnType<typeof makeUnit>>
  let next: Awaited<ReturnType<typeof makeUnit>>

  beforeAll(async () => {
    const { db } = server().database
    await makeShop(db)
    await makeAccount(db, 'bench')
    await makeAccount(db, 'floor')
    const owner = await makePerson(db, 'owner')
    lot = await insertPartLot(db, owner, { maker: 'Dielmark', dateCode: '2308' })
    stands = await makeUnit(db, owner, { state: 'bench' })
    sold = await makeUnit(db, owner, { state: 'bench' })
    next = await makeUnit(db, owner, { state: 'offered' })
    await insertFitting(db, owner, stands.id, lot.id, { circuitReference: 'C14' })
    await insertFitting(db, owner, sold.id, lot.id, { circuitReference: 'C2' })
    await insertSale(db, owner, sold, await insertParty(db, 'Mr Aldous Pell', '14 Quarry Lane, Fenwold'))
    const pulled = await insertPartLot(db, owner, { sourceKind: 'donor', donorUnitId: stands.id, condition: 'pulled', acquiredOn: '2026-05-01' })
    await insertFitting(db, owner, next.id, pulled.id, { circuitReference: 'C7' })
  })

  it('are recalled from their lot, with what that reaches seen before', async () => {
    const page = await openAs('bench', { viewport: 'phone', colorScheme: 'dark' })
    await visit(page, `/parts/recalls/new?lot=${lot.tag}`)
    expect(await page.getByLabel('Tag of the lot').inputValue()).toBe(formatTag(lot.tag))
    await page.getByText('It reaches 2 lots and 3 units, 1 of them sold.').waitFor()
    await expectSound(page)
    await page.getByRole('radio', { name: /^A maker and a value/ }).check()
    await page.getByLabel('Maker as marked').fill('Dielmark')
    await page.getByLabel('Value', { exact: true }).fill('3 H')
    await page.getByText('No lot is marked with this maker and has this value').waitFor()
    await page.getByLabel('Value', { exact: true }).fill('100 nF')
    await page.getByText('It reaches 2 lots and 3 units, 1 of them sold.').waitFor()
    await page.getByRole('radio', { name: /^One lot/ }).check()
    await page.getByRole('button', { name: 'Raise the recall' }).click()
    await page.getByRole('link', { name: 'Enter why they may be bad' }).click()
    await page.keyboard.type('The case cracks and lets damp in')
    await page.getByRole('button', { name: 'Raise the recall' }).press('Enter')
    await page.waitForURL('**/parts/recalls/1')
    await page.getByRole('heading', { name: 'Recall of parts 1: The case cracks and lets damp in' }).waitFor()
    await page.getByText('8 in the drawer, in quarantine').waitFor()
    await expectSound(page)
    page.expectClean()
  })

  it('are said on the unit’s page until they are decided', async () => {
    const page = await openAs('floor', { viewport: 'phone' })
    await visit(page, `/units/${stands.tag}`)
    await page.getByText('A part in it may be bad: The case cracks and lets damp in').waitFor()
    await expectSound(page)
    await page.getByRole('link', { name: 'Recall of parts 1' }).click()
    await page.getByText('0 of 3 units decided').waitFor()
    expect(await page.getByText('Pell').count()).toBe(0)
    expect(await page.getByRole('button', { name: /^Decide/ }).count()).toBe(0)
    page.expectClean()
  })

  it('are worked off by the keyboard, and only then closed', async () => {
    const page = await openAs('bench', { expectedStatuses: [409] })
    await visit(page, '/parts/recalls')
    await page.getByText('0 of 3 decided').waitFor()
    await expectSound(page)
    await page.getByRole('link', { name: /The case cracks/ }).click()
    await page.getByText('to Mr Aldous Pell, 14 Quarry Lane, Fenwold').first().waitFor()
    await page.getByRole('button', { name: 'Close the recall' }).click()
    await page.getByText('3 units are still undecided. Say of each what was done before the recall is closed.').waitFor()
    await expectSound(page)
    const decide = async (tag: string, answer: string, note: string) => {
      const unit = page.getByRole('listitem').filter({ has: page.getByRole('button', { name: `Decide for ${formatTag(tag)}` }) })
      await unit.getByLabel(answer).focus()
      await page.keyboard.press('Space')
      await unit.getByLabel('Note').fill(note)
      await page.keyboard.press('Enter')
      await page.getByRole('status').filter({ hasText: note }).waitFor()
    }
    await decide(stands.tag, 'Replaced', 'New one of another maker')
    expect(await page.evaluate(() => document.activeElement?.tagName), 'stays where it was').toBe('INPUT')
    await decide(sold.tag, 'Accepted as it is', 'The buyer was told')
    await page.getByText('Undecided (1)', { exact: true }).click()
    await decide(next.tag, 'Checked: sound', 'Another make')
    await page.getByText('3 of 3 units decided').waitFor()
    await page.getByRole('button', { name: 'Close the recall' }).click()
    await page.getByText('Recall 1 is closed').waitFor()
    expect(await page.getByRole('button', { name: 'Close the recall' }).count()).toBe(0)
    await expectSound(page)
    page.expectClean()
  })

  it('are printed with the buyers’ contacts', async () => {
    const page = await openAs('bench')
    await visit(page, '/parts/recalls/1')
    await page.emulateMedia({ media: 'print' })
    const row = page.getByRole('row').filter({ hasText: formatTag(sold.tag) })
    await row.getByText('14 Quarry Lane, Fenwold').waitFor()
    await row.getByText('Accepted as it is. The buyer was told').waitFor()
    expect(await page.getByRole('button', { name: 'Print the list' }).isVisible()).toBe(false)
    page.expectClean()
  })
})
