import { readFileSync } from 'node:fs'
import { execPath, stdout } from 'node:process'
import { build, isBuilt } from './lib/build.mjs'
import { Command } from './lib/command.mjs'
import { appEnvironment, outsideDatabase, readEnvFile } from './lib/env.mjs'
import { askedPort, readOptions } from './lib/options.mjs'
import { inRoot, root } from './lib/paths.mjs'
import { nextFree, whyNot } from './lib/ports.mjs'
import { others, register } from './lib/registry.mjs'
import { launch, waitUntilServing } from './lib/serve.mjs'
import { clearOrphans, ensureGround, hasNobody, openShop, sayDemoSignIns } from './lib/shop.mjs'
import { Trouble, formatDuration, say, step } from './lib/steps.mjs'

const help = `npm start -- [options]

  --port N    serve on 127.0.0.1:N (or set PORT); 3000 unless said
  --empty     a shop of its own without demo data: opens on the page that makes the owner's account
  --fresh     with --empty: throw away what that shop holds and begin anew
  --demo      with DATABASE_URL: load the demo shop if that database is empty
  --help      this

With DATABASE_URL set, Knurl uses that PostgreSQL and starts none.`

const command = new Command()

/** Says so where this checkout serves already, or the port is another program's.
 * @param {number | undefined} asked @param {string} shop @returns {Promise<boolean>} whether there is nothing left to do */
async function isSettled(asked, shop) {
  const running = others().filter(entry => entry.command === 'start' && entry.server)
  const same = running.find(entry => (asked === undefined || entry.port === asked) && entry.shop === shop)
  if (same) {
    say(`  Knurl is already running here: http://127.0.0.1:${same.port}  (process ${same.launcher.pid})\n`)
    if (shop === 'demo') sayDemoSignIns()
    say('\n  To stop it, press Ctrl-C where it was started; for a second one beside it, say --port N.\n')
    return true
  }
  const port = asked ?? 3000
  const trouble = await whyNot(port)
  if (trouble) {
    const free = await nextFree(port)
    const mine = running.find(entry => entry.port === port)
    throw new Trouble(mine ? `Port ${port} already serves this copy's ${mine.shop === 'empty' ? 'empty shop' : 'other shop'}.` : trouble, {
      advice: `${free} is free:\n\n    npm start -- --port ${free}${shop === 'empty' ? ' --empty' : ''}`,
    })
  }
  return false
}

async function main() {
  const { values } = readOptions({
    port: { type: 'string' }, empty: { type: 'boolean' }, fresh: { type: 'boolean' }, demo: { type: 'boolean' }, help: { type: 'boolean' },
  }, help)
  if (values.help) {
    say(help)
    return 0
  }
  readEnvFile()
  const outside = outsideDatabase() !== undefined
  if (values.empty && outside) {
    throw new Trouble('--empty makes a database of its own, but DATABASE_URL names one.', { advice: 'Unset DATABASE_URL, or make an empty database and let DATABASE_URL name it.' })
  }
  if (values.fresh && !values.empty) throw new Trouble('--fresh goes with --empty.', { advice: 'To reload the demo shop: npm run demo' })
  const asked = askedPort(values.port)
  const shopName = outside ? 'outside' : values.empty ? 'empty' : 'demo'

  const { version } = JSON.parse(readFileSync(inRoot('package.json'), 'utf8'))
  say(`\n  Knurl ${version}\n`)
  const began = performance.now()
  await clearOrphans()
  if (values.fresh && others().some(entry => entry.shop === 'empty')) {
    throw new Trouble('The shop that --fresh would throw away is being served now.', { advice: 'Stop that one first, with Ctrl-C where it was started.' })
  }
  if (await isSettled(asked, shopName)) return 0

  const port = asked ?? 3000
  await ensureGround()
  const shop = await openShop({ command: 'start', port, empty: values.empty, fresh: values.fresh, demo: values.demo, onStop: close => command.onStop(close) })
  if (!isBuilt()) {
    const running = others().filter(entry => entry.command === 'start' && entry.server)
    await step('Build', async (note) => {
      await build()
      if (running.length > 0) note(`restart the one on port ${running.map(entry => entry.port).join(', ')} too`)
    })
  } else {
    await step('Build', note => note('up to date'))
  }
  await serve(shop, port)
  say(`\n  Ready after ${formatDuration(performance.now() - began)}:  http://127.0.0.1:${port}\n`)
  if (await hasNobody(shop.databaseUrl)) say('  Nobody has an account yet: the first page makes the owner\'s.')
  else if (shop.hasDemo) sayDemoSignIns()
  else if (shop.name === 'empty') say('  This shop has its people already. To begin anew: npm start -- --empty --fresh')
  say('\n  Ctrl-C stops it.\n')
  return undefined
}

/** @param {import('./lib/shop.mjs').Shop} shop @param {number} port */
async function serve(shop, port) {
  let output = ''
  const served = launch(execPath, [inRoot('.output/server/index.mjs')], {
    cwd: root,
    env: { ...appEnvironment({ databaseUrl: shop.databaseUrl, filesDir: shop.filesDir, port }), NODE_ENV: 'production' },
    onOutput: (text) => {
      const kept = text.split('\n').filter(line => !line.startsWith('Listening on ')).join('\n')
      if (command.isServing) stdout.write(kept)
      else output += kept
    },
  })
  command.onStop(served.stop)
  register({ command: 'start', port, shop: shop.name, usesCluster: shop.name !== 'outside', server: served.identity })
  await step('Server', () => waitUntilServing(`http://127.0.0.1:${port}`, served, () => output))
  if (output.trim()) say(output.trimEnd())
  command.isServing = true
  void served.ended.then(async (code) => {
    if (command.isStopping) return
    say(`\n  The application ended by itself (code ${code}).`)
    await command.stop(1)
  })
}

await command.run(main)
