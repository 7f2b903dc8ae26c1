import { existsSync, readFileSync } from 'node:fs'
import { execPath } from 'node:process'
import { ensurePostgres } from './cluster.mjs'
import { checkConnection, closeCluster, ensureDatabase, migrate, openCluster, withClient, withoutPassword } from './database.mjs'
import { appEnvironment, outsideDatabase } from './env.mjs'
import { ensureModules, requireNode } from './modules.mjs'
import { inData, inRoot } from './paths.mjs'
import { endOrphans, register, unregister } from './registry.mjs'
import { run } from './run.mjs'
import { say, step } from './steps.mjs'

const demoScript = inRoot('scripts/demo-shop.ts')
const demoPassword = inData('demo-password')

/**
 * @typedef {object} ShopOptions
 * @property {import('./registry.mjs').Entry['command']} command who asks
 * @property {number} [port] that it is going to serve on
 * @property {boolean} [empty] the shop without demo data, in a database of its own
 * @property {boolean} [fresh] with `empty`: drop what that database holds
 * @property {boolean} [demo] load the demo shop into an outside database too
 * @property {(close: () => Promise<void>) => void} onStop is given what stops the database if nothing else uses it
 */

/**
 * @typedef {object} Shop a migrated database, ready to be served
 * @property {string} name `demo`, `empty` or `outside`
 * @property {string} databaseUrl
 * @property {string} [filesDir] where not the usual one
 * @property {boolean} hasDemo
 */

/** Installs what is missing, with one line for each step. Nothing before this may import a package. */
export async function ensureGround() {
  requireNode()
  await step('Packages', async (note) => {
    note(await ensureModules() ? 'installed' : '')
  })
}

/** Ends and says so: servers of this checkout whose `npm start` was killed. */
export async function clearOrphans() {
  const ended = await endOrphans()
  if (ended > 0) say(`  Ended ${ended === 1 ? 'a server' : `${ended} servers`} that an earlier, killed start had left behind.\n`)
}

/**
 * From nothing to a migrated database.
 *
 * @param {ShopOptions} options
 * @returns {Promise<Shop>}
 */
export async function openShop(options) {
  const outside = outsideDatabase()
  const name = outside ? 'outside' : options.empty ? 'empty' : 'demo'
  await clearOrphans()
  register({ command: options.command, port: options.port, shop: name, usesCluster: !outside })
  options.onStop(outside ? async () => unregister() : closeCluster)
  const databaseUrl = outside ? await useOutside(outside) : await useCluster(options)
  const filesDir = name === 'empty' ? inData('files-empty') : undefined
  const environment = appEnvironment({ databaseUrl, filesDir })
  await step('Schema', async note => note((await migrate(environment)).trim().split('\n').at(-1) ?? ''))
  const wantsDemo = name === 'demo' || (name === 'outside' && options.demo === true)
  if (wantsDemo && existsSync(demoScript)) await step('Demo shop', note => loadDemo(environment, '--if-empty', note))
  return { name, databaseUrl, filesDir, hasDemo: wantsDemo }
}

/** @param {string} url */
async function useOutside(url) {
  await step('Database', async (note) => {
    await checkConnection(url)
    note(`${withoutPassword(url)}, as DATABASE_URL says`)
  })
  return url
}

/** @param {ShopOptions} options */
async function useCluster(options) {
  await step('PostgreSQL', async (note) => {
    note(await ensurePostgres() ? 'installed' : '')
  })
  return step('Database', async (note) => {
    const { record, note: words } = await openCluster()
    note(words)
    return options.empty
      ? ensureDatabase(record, 'knurl_empty', { anew: options.fresh })
      : ensureDatabase(record, 'knurl')
  })
}

/**
 * @param {NodeJS.ProcessEnv} environment
 * @param {'--if-empty' | '--reload'} mode
 * @param {(words: string) => void} note
 */
export async function loadDemo(environment, mode, note) {
  const output = await run(execPath, ['--import', 'tsx', demoScript, mode], { env: environment, failure: 'The demo shop could not be loaded.' })
  note(output.trim().split('\n').at(-1) ?? '')
}

/** Prints the four people of the demo shop and their password. */
export function sayDemoSignIns() {
  if (!existsSync(demoPassword)) return
  const password = readFileSync(demoPassword, 'utf8').trim()
  say(`  Sign in with one of these, password  ${password}\n`)
  const people = [
    ['owner@demo.invalid', 'buys, prices, sells, sees everything'],
    ['bench@demo.invalid', 'repairs and tests'],
    ['floor@demo.invalid', 'receives, shelves, packs; sees no cost'],
    ['reader@demo.invalid', 'reads, writes nothing'],
  ]
  for (const [email = '', who] of people) say(`    ${email.padEnd(22)} ${who}`)
}

/** Whether the shop has nobody in it yet, so that it opens on its first-run page.
 * @param {string} databaseUrl */
export async function hasNobody(databaseUrl) {
  return withClient(databaseUrl, async (client) => {
    const { rows: [table] } = await client.query('select to_regclass(\'public.people\') as name')
    if (!table?.name) return true
    const { rows } = await client.query('select 1 from people limit 1')
    return rows.length === 0
  })
}
