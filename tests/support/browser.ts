import axe from 'axe-core'
import { chromium } from 'playwright-core'
import type { Browser, BrowserContext, Page } from 'playwright-core'
import { afterAll, afterEach, beforeAll, expect } from 'vitest'
import { findProgram } from '../../scripts/lib/run.mjs'

/** The two sizes at which every page is looked at. */
export const viewports = {
  phone: { width: 390, height: 844 },
  desk: { width: 1440, height: 900 },
} as const

export interface PageOptions {
  viewport?: keyof typeof viewports
  colorScheme?: 'light' | 'dark'
  /** The signed-in state of an earlier page: `await page.context().storageState()`. */
  storageState?: Awaited<ReturnType<BrowserContext['storageState']>>
  /** A status that the test provokes, so that the browser's own line about it is no complaint: `[404, 409]`. */
  expectedStatuses?: number[]
}

export interface WatchedPage extends Page {
  /** What the page complained of: errors, refused resources, hydration mismatches. */
  complaints: string[]
  /** Fails the test if the page complained of anything. */
  expectClean: () => void
}

/** Opens Chromium. `camera` is a Y4M file that it shows as what its camera sees. */
export async function openBrowser(options: { camera?: string } = {}): Promise<Browser> {
  const executablePath = findProgram('chromium')
  if (!executablePath) throw new Error('Chromium is missing: npm test installs it, or apt-get install chromium')
  return chromium.launch({
    executablePath,
    args: [
      '--no-sandbox', '--disable-gpu', '--disable-dev-shm-usage', '--disable-background-networking', '--disable-component-update',
      '--disable-sync', '--no-first-run',
      ...options.camera
        ? ['--use-fake-device-for-media-stream', '--use-fake-ui-for-media-stream', `--use-file-for-fake-video-capture=${options.camera}`]
        : [],
    ],
  })
}

/** A page in a context of its own, watched from its first byte. */
export async function newPage(browser: Browser, baseURL: string, options: PageOptions = {}): Promise<WatchedPage> {
  const context = await browser.newContext({
    baseURL,
    viewport: viewports[options.viewport ?? 'desk'],
    hasTouch: options.viewport === 'phone',
    colorScheme: options.colorScheme ?? 'light',
    reducedMotion: 'reduce',
    locale: 'en-GB',
    timezoneId: 'Europe/London',
    ...options.storageState ? { storageState: options.storageState } : {},
    permissions: ['camera'],
  })
  const page = await context.newPage()
  page.setDefaultTimeout(15_000)
  const complaints: string[] = []
  const expected = new Set((options.expectedStatuses ?? []).map(String))
  page.on('console', (message) => {
    const text = message.text()
    const status = /the server responded with a status of (\d+)/.exec(text)?.[1]
    if (status && expected.has(status)) return
    const isMismatch = /hydration/i.test(text)
    const isRefused = /content.security.policy/i.test(text)
    if (message.type() === 'error' || isMismatch || isRefused || (message.type() === 'warning' && text.startsWith('[Vue warn]'))) {
      complaints.push(`${message.type()}: ${text} (${message.location().url})`)
    }
  })
  page.on('pageerror', error => complaints.push(`uncaught: ${error.stack ?? error.message}`))
  return Object.assign(page, {
    complaints,
    expectClean: () => expect(complaints, 'what the browser complained of').toEqual([]),
  })
}

/**
 * One Chromium for a test file; each page that the file opens is closed after its test.
 *
 * @returns opens a page at an address of `baseURL`
 */
export function useBrowser(options: { camera?: string } = {}): (baseURL: string, page?: PageOptions) => Promise<WatchedPage> {
  let browser: Browser | undefined
  const opened: WatchedPage[] = []
  beforeAll(async () => {
    browser = await openBrowser(options)
  })
  afterEach(async () => {
    for (const page of opened.splice(0)) await page.context().close()
  })
  afterAll(async () => {
    await browser?.close()
  })
  return async (baseURL, pageOptions) => {
    if (!browser) throw new Error('The browser is open only while tests run')
    const page = await newPage(browser, baseURL, pageOptions)
    opened.push(page)
    return page
  }
}

/** Waits until Vue has taken over what the server rendered, so that a click reaches its handler. */
export async function waitForHydration(page: Page): Promise<void> {
  await page.waitForFunction(() => {
    const root: (Element & { __vue_app__?: { config: { globalProperties: { $nuxt?: { isHydrating?: boolean } } } } }) | null = document.querySelector('#__nuxt')
    const nuxt = root?.__vue_app__?.config.globalProperties.$nuxt
    return nuxt !== undefined && nuxt.isHydrating !== true
  })
}

/** Goes to a path and waits until the page can be used. */
export async function visit(page: Page, path: string): Promise<void> {
  await page.goto(path)
  await waitForHydration(page)
}

/** Signs in without the page, for tests of something else: the same route, a few seconds sooner. */
export async function signIn(page: Page, email: string, password: string): Promise<void> {
  const answer = await page.context().request.post('/api/session', { data: { email, password } })
  if (!answer.ok()) throw new Error(`Signing in as ${email} answered ${answer.status()}: ${await answer.text()}`)
}

/** Signs in by the sign-in page, as a person does. */
export async function signInByForm(page: Page, email: string, password: string): Promise<void> {
  await visit(page, '/sign-in')
  await page.getByLabel('E-mail', { exact: true }).fill(email)
  await page.getByLabel('Password', { exact: true }).fill(password)
  await page.getByRole('button', { name: 'Sign in', exact: true }).click()
  await page.waitForURL(url => url.pathname !== '/sign-in')
}

export interface Violation {
  rule: string
  impact: string
  help: string
  /** Where: at most five places. */
  targets: string[]
}

/** What axe finds on the page as it stands that is serious or critical (WCAG 2.2 AA and its best practices). */
export async function runAxe(page: Page): Promise<Violation[]> {
  await page.evaluate(axe.source)
  const results = await page.evaluate(async () => {
    const { axe: engine } = globalThis as typeof globalThis & { axe: typeof import('axe-core') }
    return engine.run(document, { resultTypes: ['violations'] })
  })
  return results.violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .map(({ id, impact, help, nodes }) => ({
      rule: id,
      impact: impact ?? '',
      help,
      targets: nodes.slice(0, 5).map(node => `${node.target.join(' ')}: ${node.failureSummary ?? ''}`),
    }))
}
