import { line } from 'd3-shape'
import { chromium } from 'playwright-core'
import type { Page } from 'playwright-core'
import { dialCheckpoint } from '../../../shared/domain/dial-check'
import { layErrorChart } from '../../../shared/domain/error-chart'
import { evaluateReading } from '../../../shared/domain/evaluation'
import type { EarlierSheet, ReadingView } from '../../../shared/types/bench'
import { get, send } from '../context'
import type { BenchContext, BenchRow, BenchRows } from '../context'

const POINTS = 500
const SHEETS = 20
const SIZE = { width: 1000, height: 330 }
const hertz = (index: number) => Math.round(100_000 * 300 ** (index / (POINTS - 1)))

interface ListedUnit { tag: string, state: string, model: { id: string } }
interface Sheet { number: number, version: number }

/** A sheet of 500 readings, made through the same routes as a technician's. Gives its address. */
async function makeLongSheet({ app, script }: BenchContext): Promise<string> {
  const { items } = await send<{ items: ListedUnit[] }>('GET', `${app}/api/units?state=ready&limit=50`, script)
  for (const { tag, model } of items) {
    const { items: versions } = await send<{ items: unknown[] }>('GET', `${app}/api/models/${model.id}/procedures`, script)
    if (versions.length > 0) continue
    await send('POST', `${app}/api/models/${model.id}/procedure`, script, {
      seen: 0, origin: 'Bench', decisionRule: 'guard_band', guardFactor: '1',
      checkpoints: Array.from({ length: POINTS }, (_, index) => ({ section: 'dial', bandLabel: String(Math.floor(index / 50)), quantity: 'frequency', nominal: `${hertz(index)} Hz`, limit: { kind: 'percent_of_setting', amount: '2' } })),
    })
    const { number, version } = await send<Sheet>('POST', `${app}/api/units/${tag}/test-sheets`, script, { energised: true })
    const instruments = await send<{ items: { id: string }[] }>('GET', `${app}/api/instruments`, script)
    const address = `${app}/api/units/${tag}/test-sheets/${number}`
    await send('PATCH', address, script, {
      version, instrumentIds: instruments.items.slice(0, 1).map(({ id }) => id),
      readings: Array.from({ length: POINTS }, (_, index) => ({ position: index + 1, found: `${Math.round(hertz(index) * 1.004)} Hz` })),
    })
    return address
  }
  throw new Error('The demo shop has no ready unit of a model without a procedure')
}

function reading(index: number, off: number): ReadingView {
  const checkpoint = dialCheckpoint(String(Math.floor(index / 50)), hertz(index), 2)
  const evaluated = evaluateReading(`${Math.round(hertz(index) * off)} Hz`, checkpoint, [], null, { rule: 'guard_band', factor: 1 })
  return { id: '', position: index + 1, ...checkpoint, found: evaluated.ok ? { text: '', result: evaluated.result } : null, left: null, instrumentId: null, note: '', photoIds: [] }
}

/** Types one more digit into a reading in the page and waits until its verdict has been written; in the page's own time, one task. */
async function typeOne(page: Page, field: string, verdict: string): Promise<void> {
  await page.evaluate(async ([field, verdict]) => {
    const [input, cell] = [document.querySelector(field ?? ''), document.querySelector(verdict ?? '')]
    if (!(input instanceof HTMLInputElement) || !cell) throw new Error('The field is not there')
    const written = new Promise<void>(resolve => new MutationObserver((_, observer) => {
      observer.disconnect()
      resolve()
    }).observe(cell, { childList: true, subtree: true, characterData: true }))
    input.value = input.value.endsWith('1 Hz') ? input.value.replace('1 Hz', '9 Hz') : input.value.replace(/. Hz$/, '1 Hz')
    input.dispatchEvent(new Event('input', { bubbles: true }))
    await written
  }, [field, verdict])
}

async function keystrokes(context: BenchContext, address: string): Promise<BenchRow> {
  const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: ['--no-sandbox', '--disable-gpu', '--disable-background-networking'] })
  context.onStop(() => browser.close())
  const { hostname } = new URL(context.app)
  const signedIn = await browser.newContext()
  await signedIn.addCookies((context.browser.cookie ?? '').split('; ').map((pair) => {
    const [name = '', ...value] = pair.split('=')
    return { name, value: value.join('='), domain: hostname, path: '/' }
  }))
  const page = await signedIn.newPage()
  await page.goto(address.replace('/api/', '/'), { waitUntil: 'networkidle' })
  const bare = await browser.newPage()
  await bare.setContent('<input id="typed" value="100 Hz"><output id="said"></output><script>typed.oninput = () => said.textContent = parseFloat(typed.value) + " Hz"</script>')
  return {
    name: `A keystroke's verdict, ${POINTS} readings`,
    against: 'bare input and output, same browser',
    subject: () => typeOne(page, '#readings-250-found', '#readings tr:has(#readings-250-found)'),
    baseline: () => typeOne(bare, '#typed', '#said'),
  }
}

/** The bench at its largest: opening a sheet of 500 readings, typing into it, and drawing it before twenty others. */
export const rows: BenchRows = async (context) => {
  const address = await makeLongSheet(context)
  const open = () => get(address, context.script)
  await context.replaySql('sheet', open)
  const now = Array.from({ length: POINTS }, (_, index) => reading(index, 1.004))
  const earlier: EarlierSheet[] = Array.from({ length: SHEETS - 1 }, (_, sheet) => ({
    number: sheet + 1, testedOn: '2026-01-01',
    readings: now.map(({ section, bandLabel, label, atHz, nominal }) => ({ section, bandLabel, label, atHz, nominal, value: (nominal ?? 1) * (1 + sheet / 2000), within: true })),
  }))
  const path = line<EarlierSheet['readings'][number]>(({ atHz }) => Math.log(atHz ?? 1), ({ value }) => value)
  return [
    { name: `GET a test sheet of ${POINTS} readings`, against: 'bare h3 and pg, same SQL', subject: open, baseline: () => get(`${context.bare}/sql?name=sheet`) },
    await keystrokes(context, address),
    {
      name: `Lay out ${SHEETS} sheets × ${POINTS} points`,
      against: 'bare d3 lines of as many points',
      subject: async () => void layErrorChart('dial', now, earlier, SIZE),
      baseline: async () => void [...earlier, { readings: earlier[0]?.readings ?? [] }].map(({ readings }) => path(readings)),
    },
  ]
}
