import { beforeAll, describe, expect, it } from 'vitest'
import { findCurrentProcedure } from '../../../server/services/procedures'
import { useBrowser, visit } from '../../support/browser'
import type { PageOptions, WatchedPage } from '../../support/browser'
import { makeModel, makeShop } from '../../support/records'
import { useTestServer } from '../../support/server'
import { expectSound, makeAccount, useSignedIn } from '../../support/sign-in'

describe('a model’s procedure', { timeout: 120_000 }, () => {
  const server = useTestServer()
  const open = useBrowser()
  const openAs = useSignedIn(open, () => server().url)
  let model: Awaited<ReturnType<typeof makeModel>>
  let other: Awaited<ReturnType<typeof makeModel>>

  beforeAll(async () => {
    const { db } = server().database
    await makeShop(db)
    for (const role of ['bench', 'reader'] as const) await makeAccount(db, role)
    model = await makeModel(db, { modulationHz: 400 })
    other = await makeModel(db, { designation: '307-shorter' }, [{ label: 'A', lowerHz: 100_000, upperHz: 320_000 }])
  })

  const current = () => findCurrentProcedure(server().database.db, model.id)
  const openEditor = async (options: PageOptions = {}) => {
    const page = await openAs('bench', options)
    await visit(page, `/models/${model.id}/procedure`)
    return page
  }
  const focused = (page: WatchedPage) => page.evaluate(() => document.activeElement?.id ?? '')
  const saveAs = async (page: WatchedPage, number: number) => {
    await page.getByRole('button', { name: `Save as version ${number}` }).click()
    await page.waitForURL(`**/models/${model.id}`)
  }

  it('is made from the specification, each list that can’t be read named', async () => {
    const page = await openAs('bench')
    await visit(page, `/models/${model.id}`)
    await page.getByRole('link', { name: 'Make the procedure' }).click()
    await page.getByRole('heading', { name: 'Make it from the specification' }).waitFor()
    await expectSound(page)
    expect(await page.getByLabel('What is read, parted by commas').evaluateAll(fields => fields.map(field => field instanceof HTMLInputElement ? field.value : ''))).toEqual(['30 %', '400 Hz'])
    await page.getByLabel('Supply rails').check()
    await page.locator('#list-rail').fill('HT 250 V ±10 %, 1,5 V')
    await page.getByRole('button', { name: 'Make the checkpoints' }).click()
    await page.getByRole('alert').filter({ hasText: 'Supply rails: “1,5 V”' }).waitFor()
    await page.locator('#list-rail').fill('HT 250 V ±10 %, heaters 6.3 V')
    await page.getByLabel('Attenuator steps').check()
    await page.locator('#list-attenuator').fill('20 dB × 4')
    await page.getByRole('button', { name: 'Make the checkpoints' }).click()
    // Five bands at low, middle and high: 15 dial points and 15 levels; 5 steps, depth, tone and two rails.
    await page.getByRole('heading', { name: 'Checkpoints (39)' }).waitFor()
    await expectSound(page)
    await page.getByLabel('Where the limits come from').fill('Handbook, table 5')
    await saveAs(page, 1)
    await page.getByText('Version 1, 39 checkpoints, limits from Handbook, table 5').waitFor()
    const saved = await current()
    expect(saved?.checkpoints.filter(({ section }) => section === 'dial').map(({ nominal }) => nominal).slice(0, 3)).toEqual([100_000, 180_000, 320_000])
    expect(saved?.checkpoints.find(({ label }) => label === 'HT')?.limit).toEqual({ kind: 'percent_of_setting', amount: 10 })
    page.expectClean()
  })

  it('is edited by keyboard, refused at the field, and saved as the next version', async () => {
    const page = await openEditor()
    const rails = page.getByRole('region', { name: /^Supply rails/ })
    const heaters = rails.getByRole('group', { name: /^heaters/ })
    await heaters.getByLabel('Amount').press('Enter')
    expect(await focused(page)).toBe('checkpoints-39-label')
    await page.keyboard.type('bias')
    await page.keyboard.press('Tab')
    await page.keyboard.press('Tab')
    await page.keyboard.type('-12')
    await page.getByRole('button', { name: 'Save as version 2' }).click()
    await page.getByRole('link', { name: 'Say what -12 is in: V, mV or µV.' }).click()
    expect(await focused(page)).toBe('checkpoints-39-nominal')
    await expectSound(page)
    await page.keyboard.press('End')
    await page.keyboard.type(' V')
    await rails.getByRole('button', { name: 'Move bias -12 V up' }).click()
    expect(await focused(page)).toBe('checkpoints-38-up')
    await page.getByLabel('What was changed').fill('The bias is read too')
    await saveAs(page, 2)
    const saved = await current()
    expect(saved).toMatchObject({ number: 2, why: 'The bias is read too' })
    expect(saved?.checkpoints.slice(-3).map(({ label, nominal }) => [label, nominal])).toEqual([['HT', 250], ['bias', -12], ['heaters', 6.3]])
    page.expectClean()
  })

  it('takes more dial points, in their place and none twice', async () => {
    const page = await openEditor()
    await page.getByText('Make more from the specification').click()
    await page.getByLabel('Dial, every band').check()
    await page.getByLabel('Points of each band').selectOption('5 points')
    await page.getByRole('button', { name: 'Add these checkpoints' }).click()
    await page.getByRole('heading', { name: 'Checkpoints (50)' }).waitFor()
    await page.getByLabel('What was changed').fill('Five points of each band')
    await saveAs(page, 3)
    const dial = (await current())?.checkpoints.filter(({ section, bandLabel }) => section === 'dial' && bandLabel === 'A') ?? []
    expect(dial.map(({ nominal }) => nominal)).toEqual([100_000, 130_000, 180_000, 240_000, 320_000])
    page.expectClean()
  })

  it('shows both when somebody else saved first, and keeps what was typed', async () => {
    const [mine, theirs] = [await openEditor({ expectedStatuses: [409] }), await openEditor()]
    await theirs.getByLabel('Warm-up, minutes').fill('45')
    await theirs.getByLabel('What was changed').fill('Warms up longer')
    await saveAs(theirs, 4)
    const ht = mine.getByRole('group', { name: /^HT/ })
    await ht.getByLabel('Amount').fill('7')
    await mine.getByLabel('What was changed').fill('HT is tighter')
    await mine.getByRole('button', { name: 'Save as version 4' }).click()
    const both = mine.getByRole('table', { name: 'What stands now beside what you typed' })
    await both.waitFor()
    expect(await both.getByRole('row').allInnerTexts()).toEqual([
      expect.stringContaining('Stands now'), expect.stringMatching(/Warm-up\s+45\s+empty/u), expect.stringMatching(/Checkpoints\s+Supply rails: HT, 250 V, .* 10\s+Supply rails: HT, 250 V, .* 7/u),
    ])
    await expectSound(mine)
    await mine.getByRole('button', { name: 'Keep what I typed' }).click()
    expect(await ht.getByLabel('Amount').inputValue()).toBe('7')
    await saveAs(mine, 5)
    expect(await current()).toMatchObject({ number: 5, warmUpMinutes: null, why: 'HT is tighter' })
    mine.expectClean()
  })

  it('shows an old version as it was without losing what is typed', async () => {
    const page = await openEditor()
    await page.locator('#supply').fill('115 V 60 Hz')
    await page.getByRole('link', { name: 'Version 1' }).click()
    await page.getByText('Version 1 as it was').waitFor()
    await page.getByText(/heaters, 6\.3.V/).waitFor()
    expect(await page.getByText(/bias, /).count()).toBe(0)
    await expectSound(page)
    await page.getByRole('link', { name: 'Go to version 5' }).click()
    expect(await page.locator('#supply').inputValue()).toBe('115 V 60 Hz')
    page.expectClean()
  })

  it('is copied to another model, what lies in none of its bands left out and named', async () => {
    const page = await openAs('bench')
    await visit(page, `/models/${other.id}/procedure`)
    await page.getByLabel('Or copy another model’s procedure').fill(model.designation)
    await page.getByRole('option', { name: model.designation }).click()
    await page.getByText('Left out in copying').waitFor()
    await page.getByText(/^B, \d+.kHz; B, /u).waitFor()
    await page.getByText('Copied under a band that this model has not').waitFor()
    await page.getByText(/^Output level: B, \d+.kHz/u).waitFor()
    await expectSound(page)
    await page.getByRole('button', { name: 'Save as version 1' }).click()
    await page.waitForURL(`**/models/${other.id}`)
    const copied = await findCurrentProcedure(server().database.db, other.id)
    expect(copied?.checkpoints.filter(({ section }) => section === 'dial').every(({ bandLabel, nominal }) => bandLabel === 'A' && (nominal ?? 0) <= 320_000)).toBe(true)
    page.expectClean()
  })

  it.each([['desk', 'dark'], ['phone', 'light']] as const)('can be used at every size and in both lights (%s, %s)', async (viewport, colorScheme) => {
    const page = await openEditor({ viewport, colorScheme })
    await expectSound(page)
    await visit(page, `/models/${model.id}/procedure?version=1`)
    await page.getByText('Version 1 as it was').waitFor()
    await expectSound(page)
    page.expectClean()
  })

  it('is read, not written, by a reader', async () => {
    const page = await openAs('reader')
    await visit(page, `/models/${model.id}/procedure`)
    await page.getByText('Limits from', { exact: true }).waitFor()
    expect(await page.getByRole('button', { name: /^Save as version/ }).count()).toBe(0)
    await expectSound(page)
    page.expectClean()
  })
})
