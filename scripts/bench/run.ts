import { readdir, writeFile } from 'node:fs/promises'
import { cpus, totalmem } from 'node:os'
import { dirname, join, resolve } from 'node:path'
import { env, stdout, versions } from 'node:process'
import { fileURLToPath } from 'node:url'
import type { BenchContext, BenchRow, BenchRows } from './context'
import { recordSql } from './sql-log'

/** Each row: so many times, or as long as this allows, whichever comes first. */
const most = 200
const longest = 12_000
const warmUp = 10

interface Figures { p50: number, p95: number, count: number }
interface Result { name: string, against: string, subject: Figures, baseline: Figures, ratio: number }

const here = dirname(fileURLToPath(import.meta.url))

function read(name: string): string {
  const value = env[name]
  if (!value) throw new Error(`${name} is not set: run this by npm run bench`)
  return value
}

async function signIn(app: string, password: string): Promise<string> {
  const response = await fetch(`${app}/api/session`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ email: 'owner@demo.invalid', password }),
  })
  if (!response.ok) throw new Error(`Signing in answered ${response.status}: ${await response.text()}`)
  return response.headers.getSetCookie().map(cookie => cookie.split(';')[0]).join('; ')
}

const stops: (() => Promise<void>)[] = []

async function makeContext(): Promise<BenchContext> {
  const app = read('BENCH_APP')
  const bare = read('BENCH_BARE')
  const script = { authorization: `Bearer ${read('BENCH_TOKEN')}` }
  const response = await fetch(`${app}/api/units?limit=50`, { headers: script })
  const list: { items: { tag: string }[] } = await response.json()
  return {
    app,
    bare,
    script,
    browser: { cookie: await signIn(app, read('BENCH_PASSWORD')) },
    tags: list.items.map(({ tag }) => tag),
    onStop: work => stops.push(work),
    replaySql: async (name, work) => {
      // Once before, so that what is done only at the first request is not replayed at every one.
      await work()
      const statements = await recordSql(read('BENCH_ADMIN_URL'), read('BENCH_LOG'), work)
      if (statements.length === 0) throw new Error('The database was asked nothing that its log shows')
      await fetch(`${bare}/sql`, { method: 'POST', headers: { 'content-type': 'application/json' }, body: JSON.stringify({ name, statements }) })
    },
  }
}

/** Subject and baseline take turns, so that whatever else the machine does touches both alike. */
async function measure(row: BenchRow): Promise<Result> {
  const times = { subject: [] as number[], baseline: [] as number[] }
  for (let round = 0; round < warmUp; round++) {
    await row.subject()
    await row.baseline()
  }
  for (const began = performance.now(); times.subject.length < most && performance.now() - began < longest;) {
    for (const side of ['subject', 'baseline'] as const) {
      const start = performance.now()
      await row[side]()
      times[side].push(performance.now() - start)
    }
  }
  const subject = figures(times.subject)
  const baseline = figures(times.baseline)
  return { name: row.name, against: row.against, subject, baseline, ratio: round(subject.p50 / baseline.p50) }
}

function figures(times: number[]): Figures {
  const sorted = times.toSorted((a, b) => a - b)
  const at = (share: number) => sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * share))] ?? Number.NaN
  return { p50: round(at(0.5)), p95: round(at(0.95)), count: sorted.length }
}

const round = (value: number) => Math.round(value * 1000) / 1000
const ms = (value: number) => `${value.toFixed(value < 10 ? 2 : 1)} ms`.padStart(11)

function print(result: Result): void {
  stdout.write(`  ${result.name.padEnd(38)}${ms(result.subject.p50)}${ms(result.subject.p95)}   ${ms(result.baseline.p50)}${ms(result.baseline.p95)}   ${`${result.ratio.toFixed(1)} ×`.padStart(8)}   ${result.against}\n`)
}

const context = await makeContext()
const results: Result[] = []
const failures: { name: string, message: string }[] = []
stdout.write(`\n  ${''.padEnd(38)}${'Knurl p50'.padStart(11)}${'p95'.padStart(11)}   ${'bare p50'.padStart(11)}${'p95'.padStart(11)}   ${'ratio'.padStart(8)}   against\n`)
const only = env.BENCH_ONLY ?? ''
for (const file of (await readdir(join(here, 'rows'))).filter(name => only === '' || name === `${only}.ts`).sort()) {
  try {
    const { rows }: { rows: BenchRows } = await import(join(here, 'rows', file))
    for (const row of await rows(context)) {
      const result = await measure(row)
      results.push(result)
      print(result)
    }
  } catch (error) {
    const message = error instanceof Error ? error.message : String(error)
    failures.push({ name: file, message })
    stdout.write(`  ${file}: FAILED, ${message}\n`)
  }
}
for (const stop of stops) await stop()
await writeFile(resolve(here, '../../bench-results.json'), `${JSON.stringify({
  at: new Date().toISOString(),
  machine: { processor: cpus()[0]?.model ?? '', cores: cpus().length, memoryMiB: Math.round(totalmem() / 2 ** 20), node: versions.node },
  unit: 'ms',
  results,
  failures,
}, undefined, 2)}\n`)
stdout.write('\n  Written to bench-results.json\n')
if (failures.length > 0 || results.length === 0) process.exitCode = 1
