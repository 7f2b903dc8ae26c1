import { appEnvironment, outsideDatabase, readEnvFile } from './lib/env.mjs'
import { Command } from './lib/command.mjs'
import { readOptions } from './lib/options.mjs'
import { ensureGround, loadDemo, openShop, sayDemoSignIns } from './lib/shop.mjs'
import { Trouble, say, step } from './lib/steps.mjs'

const help = `npm run demo -- [options]

  --demo    with DATABASE_URL: yes, throw away what that database holds
  --help    this

Throws away what the demo shop holds and loads it anew.`

const command = new Command()

await command.run(async () => {
  const { values } = readOptions({ demo: { type: 'boolean' }, help: { type: 'boolean' } }, help)
  if (values.help) {
    say(help)
    return 0
  }
  readEnvFile()
  if (outsideDatabase() && !values.demo) {
    throw new Trouble('DATABASE_URL is set, and loading the demo shop throws away what that database holds.', {
      advice: 'If that is what you want:\n\n    npm run demo -- --demo',
    })
  }
  say('\n  The demo shop, loaded anew\n')
  await ensureGround()
  const shop = await openShop({ command: 'demo', onStop: close => command.onStop(close) })
  await step('Demo shop', note => loadDemo(appEnvironment({ databaseUrl: shop.databaseUrl }), '--reload', note))
  say()
  sayDemoSignIns()
  say()
  return 0
})
