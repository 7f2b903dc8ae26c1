import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { execPath } from 'node:process'
import { build, isBuilt } from './lib/build.mjs'
import { ensurePostgres } from './lib/cluster.mjs'
import { Command } from './lib/command.mjs'
import { migrate, withClient } from './lib/database.mjs'
import { appEnvironment, readEnvFile } from './lib/env.mjs'
import { readOptions } from './lib/options.mjs'
import { inRoot, root } from './lib/paths.mjs'
import { freePort } from './lib/ports.mjs'
import { attempt, run } from './lib/run.mjs'
import { launch, waitUntilServing } from './lib/serve.mjs'
import { ensureGround, loadDemo } from './lib/shop.mjs'
import { Trouble, say, step } from './lib/steps.mjs'
import { makeThrowawayCluster } from './lib/throwaway.mjs'

const help = `npm run bench [-- --only NAME]

Measures the built application on the demo shop, in a database of its own, each figure beside a bare baseline measured
in the same run. Prints a table and writes bench-results.json.

  --only NAME   only one file of scripts/bench/rows: labels, pages, sheets, trace, units`

const command = new Command()

/** A database with the demo shop, in a cluster that is removed at the end. */
async function openBenchShop() {
  const cluster = await step('Database', async (note) => {
    await ensurePostgres()
    const made = await makeThrowawayCluster()
    command.onStop(made.remove)
    await withClient(made.url, client => client.query('create database knurl_bench'))
    note(`its own, port ${made.port}`)
    return made
  })
  const url = new URL(cluster.url)
  url.pathname = '/knurl_bench'
  const folder = mkdtempSync(join(tmpdir(), 'knurl-bench-'))
  command.onStop(async () => rmSync(folder, { recursive: true, force: true }))
  const filesDir = join(folder, 'files')
  const settings = { databaseUrl: url.href, filesDir }
  await step('Schema', () => migrate(appEnvironment(settings)))
  await step('Demo shop', note => loadDemo(appEnvironment(settings), '--if-empty', note))
  // The demo leaves its password beside its files.
  const passwordFile = join(folder, 'demo-password')
  if (!existsSync(passwordFile)) throw new Trouble('The demo shop was loaded, but left no password.')
  return { cluster, settings, password: readFileSync(passwordFile, 'utf8').trim() }
}

/** @param {string} label @param {string[]} args for Node @param {NodeJS.ProcessEnv} environment @param {string} url */
async function start(label, args, environment, url) {
  let output = ''
  const served = launch(execPath, args, {
    cwd: root,
    env: { ...environment, NODE_ENV: 'production' },
    onOutput: (text) => {
      output += text
    },
  })
  command.onStop(served.stop)
  await step(label, () => waitUntilServing(url, served, () => output))
}

await command.run(async () => {
  const { values } = readOptions({ only: { type: 'string' }, help: { type: 'boolean' } }, help)
  if (values.help) {
    say(help)
    return 0
  }
  readEnvFile()
  say('\n  Knurl, measured\n')
  await ensureGround()
  const { cluster, settings, password } = await openBenchShop()
  if (!isBuilt()) await step('Build', build)
  const appPort = await freePort()
  const app = `http://127.0.0.1:${appPort}`
  await start('Application', [inRoot('.output/server/index.mjs')], appEnvironment({ ...settings, port: appPort }), app)
  const barePort = await freePort()
  const bare = `http://127.0.0.1:${barePort}`
  await start('Bare baselines', ['--import', 'tsx', inRoot('scripts/bench/bare.ts')], appEnvironment({ ...settings, port: barePort }), bare)
  const token = (await run(execPath, ['--import', 'tsx', inRoot('scripts/token.ts'), 'owner@demo.invalid'], { env: appEnvironment(settings) })).trim()
  const { code } = await attempt(execPath, ['--import', 'tsx', inRoot('scripts/bench/run.ts')], {
    show: true,
    env: {
      ...appEnvironment(settings),
      BENCH_APP: app,
      BENCH_BARE: bare,
      BENCH_TOKEN: token,
      BENCH_PASSWORD: password,
      BENCH_ADMIN_URL: cluster.adminUrl,
      BENCH_LOG: cluster.log,
      BENCH_ONLY: values.only ?? '',
    },
  })
  return code
})
