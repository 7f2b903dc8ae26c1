/**
 * Takes the README's pictures of a running demo shop: tsx scripts/screenshots.ts [http://127.0.0.1:3000]
 */
import { mkdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { argv } from 'node:process'
import { chromium } from 'playwright-core'
import sharp from 'sharp'
import { findProgram } from './lib/run.mjs'

const root = join(import.meta.dirname, '..')
const base = argv[2] ?? 'http://127.0.0.1:3000'
const password = readFileSync(join(root, '.data/demo-password'), 'utf8').trim()
const folder = join(root, 'assets/readme')
const executablePath = findProgram('chromium')
if (!executablePath) throw new Error('Chromium is missing: apt-get install chromium')

const PICTURES = [
  { name: 'unit', path: '/units/U000009P', width: 1440, height: 960, scheme: 'light' as const },
  { name: 'stock', path: '/stock?q=covers%20455%20kc', width: 1440, height: 900, scheme: 'light' as const },
]

mkdirSync(folder, { recursive: true })
const browser = await chromium.launch({ executablePath, args: ['--no-sandbox', '--disable-gpu', '--disable-background-networking', '--disable-component-update', '--disable-sync', '--no-first-run'] })
for (const { name, path, width, height, scheme } of PICTURES) {
  const context = await browser.newContext({ baseURL: base, viewport: { width, height }, colorScheme: scheme })
  const signedIn = await context.request.post('/api/session', { data: { email: 'bench@demo.invalid', password } })
  if (!signedIn.ok()) throw new Error(`Signing in at ${base} answered ${signedIn.status()}`)
  const page = await context.newPage()
  await page.goto(path, { waitUntil: 'networkidle' })
  await sharp(await page.screenshot()).png({ palette: true, quality: 90 }).toFile(join(folder, `${name}.png`))
  console.log(`assets/readme/${name}.png`)
  await context.close()
}
await browser.close()
