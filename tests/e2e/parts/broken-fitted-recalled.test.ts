import { beforeAll, describe, expect, it } from 'vitest'
import { formatTag } from '../../../shared/domain/tag'
import type { FittingView, DonorView, PartLotView } from '../../../shared/types/part'
import type { Person } from '../../../shared/types/person'
import type { UnitView } from '../../../shared/types/unit'
import { getLotView } from '../../../server/services/lot-view'
import { listFittingsOf } from '../../../server/services/fittings'
import { getDonor } from '../../../server/services/pulled-lots'
import { undoSale } from '../../../server/services/sales'
import { getUnitView } from '../../../server/services/unit-view'
import { makeTriage } from '../../support/bench'
import type { WatchedPage } from '../../support/browser'
import { useBrowser, visit } from '../../support/browser'
import { makeShop, makeUnit } from '../../support/records'
import { useTestServer } from '../../support/server'
import { expectSound, makeAccount, useSignedIn } from '../../support/sign-in'

/** What the donor cost, minor units: a number that no even share divides. */
const COST = 10_001

describe('a donor broken, its parts fitted, one set sold, the lot recalled', { timeout: 240_000 }, () => {
  const server = useTestServer()
  const open = useBrowser()
  const openAs = useSignedIn(open, () => server().url)
  const db = () => server().database.db
  let owner: Person
  let donor: { tag: string }
  let sets: { tag: string }[]
  let lotTag = ''

  beforeAll(async () => {
    await makeShop(db())
    owner = await makeAccount(db(), 'owner')
    const made = await makeUnit(db(), owner, { state: 'bench', costMinor: COST, costCurrency: 'GBP' })
    await makeTriage(db(), owner, made.id)
    donor = made
    const forSale = { state: 'offered' as const, askingMinor: 20_000, askingCurrency: 'GBP', notEnergisedDisclosure: 'Untested, not to be energised' }
    sets = [await makeUnit(db(), owner, forSale), await makeUnit(db(), owner, forSale)]
    for (const { tag } of sets) await makeTriage(db(), owner, (await getUnitView(db(), owner, tag)).id)
  })

  /** The donor's cost is all there, to the penny: in the carcass, in the drawer, in the sets; and so are the parts. */
  async function expectBalance(expected: { drawer: number, fitted: number }): Promise<void> {
    const whole: DonorView = await getDonor(db(), owner, donor.tag)
    const lot: PartLotView = await getLotView(db(), owner, lotTag)
    const fitted: FittingView[] = (await Promise.all(sets.map(({ tag }) => listFittingsOf(db(), owner, tag)))).flat().filter(({ undoneBecause }) => undoneBecause === null)
    expect(lot.balance).toMatchObject({ inDrawer: expected.drawer, fitted: expected.fitted, cameIn: expected.drawer + expected.fitted })
    expect(fitted).toHaveLength(expected.fitted)
    expect((whole.costLeftMinor ?? 0) + (lot.costMinor ?? 0) + fitted.reduce((sum, { costMinor }) => sum + (costMinor ?? 0), 0)).toBe(COST)
  }

  async function fit(page: WatchedPage, { tag }: { tag: string }, reference: string): Promise<void> {
    await visit(page, `/units/${tag}/log`)
    await page.getByRole('radio', { name: 'We did', exact: true }).check()
    await page.getByLabel('Before', { exact: true }).fill('Mains transformer, open')
    await page.getByLabel('After', { exact: true }).fill('Mains transformer from a donor')
    await page.getByRole('radio', { name: 'Re-solder', exact: true }).check({ force: true })
    await page.getByRole('radio', { name: 'Discarded', exact: true }).check({ force: true })
    await page.getByRole('button', { name: 'Add a part from the drawers' }).click()
    await page.getByLabel('Lot', { exact: true }).fill('mains transf')
    await page.getByRole('option', { name: /^Mains transformer/ }).click()
    await page.getByRole('group', { name: 'Part 1' }).getByLabel('Circuit reference').fill(reference)
    await page.getByRole('button', { name: 'Save modification' }).click()
    await page.waitForURL(`**/units/${tag}`)
  }

  it('breaks the donor in the browser, with the shares told as they will stand', async () => {
    const page = await openAs('owner')
    await visit(page, `/units/${donor.tag}/break`)
    await page.getByLabel('Kind of part').selectOption('transformer')
    await page.getByLabel('What it is').fill('Mains transformer')
    await page.getByLabel('How many', { exact: true }).fill('2')
    await page.getByLabel('Worth together').fill('30')
    await page.getByLabel('Worth of what is left').fill('15')
    await page.getByText('Of £100.01, £66.67 go with the parts and £33.34 stay with what is left.').waitFor()
    await page.getByLabel('Why it is broken for parts').fill('Cabinet crushed')
    await expectSound(page)
    await page.getByRole('button', { name: 'Break it for parts' }).click()
    await page.waitForURL(`**/units/${donor.tag}`)
    await page.getByRole('heading', { name: 'Pulled from it' }).waitFor()
    lotTag = (await getDonor(db(), owner, donor.tag)).pulled[0]?.lot.tag ?? ''
    await expectBalance({ drawer: 2, fitted: 0 })
    page.expectClean()
  })

  it('fits its parts into two sets as the work is logged, and finds none left for a third', async () => {
    const page = await openAs('owner', { viewport: 'phone', colorScheme: 'dark', expectedStatuses: [409] })
    for (const [index, set] of sets.entries()) {
      await fit(page, set, `T${index + 1}`)
      await expectBalance({ drawer: 1 - index, fitted: index + 1 })
    }
    await expectSound(page)
    await visit(page, `/parts/${lotTag}`)
    await page.getByText('2 came in: 2 fitted, none in the drawer').waitFor()
    await expectSound(page)
    page.expectClean()
  })

  it('sells one, and traces the lot to the donor, to both sets and to the buyer', async () => {
    const page = await openAs('owner')
    const [, second] = sets
    await visit(page, `/units/${second?.tag}/sell`)
    await page.getByLabel('Who bought it').fill('Mr Aldous Pell')
    await page.getByLabel('Price').fill('195')
    await page.getByRole('button', { name: 'Record the sale' }).click()
    await page.waitForURL(`**/units/${second?.tag}`)
    await expectBalance({ drawer: 0, fitted: 2 })
    await visit(page, `/parts/${lotTag}/trace`)
    const went = page.locator('#forwards')
    for (const { tag } of sets) await went.getByText(formatTag(tag)).waitFor()
    await went.getByText('Mr Aldous Pell').waitFor()
    await page.locator('#backwards').getByText(formatTag(donor.tag)).waitFor()
    await expectSound(page)
    await page.getByRole('link', { name: 'Show it as a table' }).click()
    await page.getByRole('cell', { name: 'sold to' }).waitFor()
    await expectSound(page)
    page.expectClean()
  })

  it('recalls the lot, and sees both sets and who has the sold one', async () => {
    const page = await openAs('owner')
    await visit(page, `/parts/recalls/new?lot=${lotTag}`)
    await page.getByText('It reaches one lot and 2 units, 1 of them sold.').waitFor()
    await page.getByLabel('Why they may be bad').fill('Insulation fails when warm')
    await page.getByRole('button', { name: 'Raise the recall' }).click()
    await page.waitForURL('**/parts/recalls/1')
    for (const { tag } of sets) await page.getByText(formatTag(tag)).first().waitFor()
    await page.getByText('Mr Aldous Pell').first().waitFor()
    await expectBalance({ drawer: 0, fitted: 2 })
    page.expectClean()
  })

  it('balances to the penny after undoing each step, until the donor is whole again', async () => {
    const page = await openAs('owner', { expectedStatuses: [409] })
    const [first, second] = sets
    const sold: UnitView = await getUnitView(db(), owner, second?.tag ?? '')
    await undoSale(db(), owner, { tag: sold.tag, to: 'offered', why: 'The buyer drew back', version: sold.version })
    await expectBalance({ drawer: 0, fitted: 2 })
    for (const [index, set] of [first, second].entries()) {
      const { modifications: [entry] } = await getUnitView(db(), owner, set?.tag ?? '')
      await visit(page, `/units/${set?.tag}/modifications/${entry?.id}`)
      await page.getByRole('button', { name: 'Withdraw the entry' }).click()
      const asked = page.getByRole('dialog')
      await asked.getByLabel('Why it is withdrawn').fill('It was never fitted')
      await asked.getByRole('button', { name: 'Withdraw the entry' }).click()
      await page.waitForURL(`**/units/${set?.tag}`)
      await expectBalance({ drawer: index + 1, fitted: 1 - index })
    }
    await visit(page, `/parts/${lotTag}`)
    await page.getByRole('button', { name: 'Put back into the donor' }).click()
    await page.getByRole('dialog').getByLabel('Why', { exact: true }).fill('The cabinet can be mended')
    await page.getByRole('dialog').getByRole('button', { name: 'Put them back' }).click()
    await page.getByText('0 came in: none in the drawer').waitFor()
    await expectBalance({ drawer: 0, fitted: 0 })
    expect((await getDonor(db(), owner, donor.tag)).costLeftMinor).toBe(COST)
    await visit(page, `/units/${donor.tag}`)
    await page.getByRole('button', { name: 'Undo the breaking: send to the bench' }).click()
    await page.getByRole('dialog').getByLabel('Why').fill('The cabinet can be mended')
    await page.getByRole('dialog').getByRole('button', { name: 'Undo the breaking: send to the bench' }).click()
    await expect.poll(async () => (await getUnitView(db(), owner, donor.tag)).state).toBe('bench')
    page.expectClean()
  })
})
