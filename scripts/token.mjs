import { execPath } from 'node:process'
import { Command } from './lib/command.mjs'
import { closeCluster, ensureDatabase, openCluster, runningCluster } from './lib/database.mjs'
import { appEnvironment, outsideDatabase, readEnvFile } from './lib/env.mjs'
import { readOptions } from './lib/options.mjs'
import { inRoot } from './lib/paths.mjs'
import { others, register } from './lib/registry.mjs'
import { attempt } from './lib/run.mjs'
import { Trouble, say } from './lib/steps.mjs'

const help = `npm run token -- EMAIL [options]

  --empty   in the shop of npm start -- --empty
  --help    this

Makes a personal access token for that person and prints it, once:

    curl -H "Authorization: Bearer TOKEN" http://127.0.0.1:3000/api/units`

const command = new Command()

/** The database that is being served now; else the demo shop's.
 * @param {boolean} wantsEmpty */
async function findDatabase(wantsEmpty) {
  const outside = outsideDatabase()
  if (outside) return outside
  const served = others().find(entry => entry.server)
  const name = wantsEmpty || served?.shop === 'empty' ? 'knurl_empty' : 'knurl'
  register({ command: 'token', usesCluster: true })
  command.onStop(closeCluster)
  const record = runningCluster() ?? (await openCluster()).record
  return ensureDatabase(record, name)
}

await command.run(async () => {
  const { values, positionals } = readOptions({ empty: { type: 'boolean' }, help: { type: 'boolean' } }, help, { positionals: true })
  if (values.help) {
    say(help)
    return 0
  }
  const [email] = positionals
  if (!email?.includes('@')) throw new Trouble('Say whose token it is to be.', { advice: help })
  readEnvFile()
  const databaseUrl = await findDatabase(values.empty === true)
  const { code } = await attempt(execPath, ['--import', 'tsx', inRoot('scripts/token.ts'), email], {
    env: appEnvironment({ databaseUrl }),
    show: true,
  })
  return code
})
