import { beforeAll, describe, expect, it } from 'vitest'
import { bands } from '../../../drizzle/schema'
import { writePerson } from '../../../server/services/people'
import type { Person } from '../../../shared/types/person'
import { runAxe, signIn, useBrowser, visit } from '../../support/browser'
import type { PageOptions, WatchedPage } from '../../support/browser'
import { makeModel, makePlace, makeShop, makeUnit } from '../../support/records'
import { useTestServer } from '../../support/server'

const PASSWORD = 'a-password-for-tests'

describe('finding stock', () => {
  const server = useTestServer()
  const open = useBrowser()
  let storageState: PageOptions['storageState']

  beforeAll(async () => {
    const { db } = server().database
    await makeShop(db)
    const id = await writePerson(db, null, { email: 'owner@demo.invalid', name: 'Test owner', role: 'owner', password: PASSWORD, mustChangePassword: false })
    const owner: Person = { id, name: 'Test owner', email: 'owner@demo.invalid', role: 'owner', mustChangePassword: false }
    const place = await makePlace(db, 'Long store')
    const service = await makeModel(db, { maker: 'Oxmarden', designation: '307-G' })
    const standard = await makeModel(db, { maker: 'Haldraven', designation: '6120-B' })
    const plain = await makeModel(db, { maker: 'Tarnwick', designation: 'PS 12', kind: 'power_supply' }, [])
    const short = await makeModel(db, { maker: 'Dornquell', designation: 'MS 5' }, [{ label: '1', lowerHz: 400_000, upperHz: 22_000_000 }])
    await makeUnit(db, owner, { modelId: service.id, locationId: place.id, state: 'ready', askingMinor: 18_500, askingCurrency: 'GBP' })
    await makeUnit(db, owner, { modelId: standard.id, locationId: place.id, state: 'offered', askingMinor: 34_000, askingCurrency: 'GBP' })
    await makeUnit(db, owner, { modelId: plain.id })
    await makeUnit(db, owner, { modelId: short.id, hazardHold: 'Asbestos pad behind the lamp' })
    expect(await db.$count(bands)).toBe(11)
  })

  async function openSignedIn(options: PageOptions = {}): Promise<WatchedPage> {
    if (!storageState) {
      const door = await open(server().url)
      await signIn(door, 'owner@demo.invalid', PASSWORD)
      storageState = await door.context().storageState()
    }
    return open(server().url, { ...options, storageState })
  }

  const names = (page: WatchedPage) => page.locator('tbody th[scope=row] .block.font-semibold:visible, main li a p.font-semibold:visible').allTextContents()

  it('staff find every piece that reaches a frequency range, and what nearly does', async () => {
    const page = await openSignedIn()
    await visit(page, '/stock')
    await page.getByRole('searchbox').fill('sig gen covers 455 kc and past 30 megs')
    await expect.poll(() => page.getByText('2 pieces cover it, 1 nearly · of 4 in stock').count()).toBe(1)
    const [first, second, nearly, ...others] = await names(page)
    expect([first, second].sort()).toEqual(['Haldraven 6120-B', 'Oxmarden 307-G'])
    expect(nearly).toContain('Dornquell MS 5')
    expect(others).toEqual([])
    expect(await page.getByText(/stops at 22.MHz/).filter({ visible: true }).count()).toBe(1)
    expect(await page.getByText('Hazard hold').filter({ visible: true }).count()).toBe(1)
    page.expectClean()
  })

  it('the search is in the address: a reload shows the same', async () => {
    const page = await openSignedIn()
    await visit(page, '/stock')
    await page.getByRole('searchbox').fill('oxmardon')
    await expect.poll(() => new URL(page.url()).searchParams.get('q')).toBe('oxmardon')
    await page.reload()
    await expect.poll(() => names(page)).toEqual(['Oxmarden 307-G'])
    await visit(page, '/stock?window=150000-20000000')
    await expect.poll(async () => (await names(page)).sort().slice(-2)).toEqual(['Haldraven 6120-B', 'Oxmarden 307-G'])
    expect(await page.getByText('must cover').filter({ visible: true }).count()).toBe(1)
    page.expectClean()
  })

  it('the table sorts, and says so', async () => {
    const page = await openSignedIn()
    await visit(page, '/stock')
    await page.getByRole('button', { name: 'Asking' }).click()
    await expect.poll(() => new URL(page.url()).searchParams.get('sort')).toMatch(/asking/)
    const heading = page.getByRole('columnheader', { name: 'Asking' })
    await expect.poll(() => heading.getAttribute('aria-sort')).toMatch(/ascending|descending/)
    const descending = await heading.getAttribute('aria-sort') === 'descending'
    const order = (await names(page)).filter(name => name.startsWith('Oxmarden') || name.startsWith('Haldraven'))
    expect(order).toEqual(descending ? ['Haldraven 6120-B', 'Oxmarden 307-G'] : ['Oxmarden 307-G', 'Haldraven 6120-B'])
    page.expectClean()
  })

  it('the ruler is set by keyboard and by two clicks', async () => {
    const page = await openSignedIn()
    await visit(page, '/stock')
    const low = page.getByRole('slider', { name: 'Lowest frequency' }).filter({ visible: true })
    await low.press('ArrowRight')
    await expect.poll(() => page.url()).toContain('window=')
    await low.press('Escape')
    await expect.poll(() => page.url()).not.toContain('window=')
    const box = await page.locator('thead .ruler').boundingBox()
    if (!box) throw new Error('The ruler is not on the page')
    await page.mouse.click(box.x + box.width * 0.3, box.y + 30)
    await expect.poll(() => page.getByText('must cover').filter({ visible: true }).count()).toBe(1)
    await page.mouse.click(box.x + box.width * 0.6, box.y + 30)
    await expect.poll(() => /window=(\d+)-(\d+)/.exec(page.url())?.slice(1).map(Number)).toSatisfy(([lower, upper]: number[]) => (lower ?? 0) < (upper ?? 0))
    page.expectClean()
  })

  it('on a phone the pieces are cards, which sort and can be picked for labels', async () => {
    const page = await openSignedIn({ viewport: 'phone' })
    await visit(page, '/stock')
    await page.getByLabel('Sort by').selectOption('Piece')
    await expect.poll(() => names(page)).toEqual(['Dornquell MS 5', 'Haldraven 6120-B', 'Oxmarden 307-G', 'Tarnwick PS 12'])
    await page.getByLabel('Pick for labels: Haldraven 6120-B').check()
    await expect.poll(() => page.getByText('1 picked for labels').count()).toBe(1)
    page.expectClean()
  })

  it.each([['phone', 'light'], ['phone', 'dark'], ['desk', 'light'], ['desk', 'dark']] as const)('axe finds nothing serious, and nothing runs over the edge (%s, %s)', async (viewport, colorScheme) => {
    const page = await openSignedIn({ viewport, colorScheme })
    for (const path of ['/stock?q=covers%20455%20kc', '/stock', '/stock?needs=triage', '/']) {
      await visit(page, path)
      expect(await runAxe(page), path).toEqual([])
      expect(await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth), path).toBe(0)
    }
    await visit(page, '/stock')
    expect(await page.getByRole('table').filter({ visible: true }).count()).toBe(viewport === 'phone' ? 0 : 1)
    page.expectClean()
  })
})
