import { execPath, stdout } from 'node:process'
import { Command } from './lib/command.mjs'
import { appEnvironment, readEnvFile } from './lib/env.mjs'
import { askedPort, readOptions } from './lib/options.mjs'
import { inRoot, root } from './lib/paths.mjs'
import { nextFree, whyNot } from './lib/ports.mjs'
import { register } from './lib/registry.mjs'
import { launch } from './lib/serve.mjs'
import { ensureGround, openShop, sayDemoSignIns } from './lib/shop.mjs'
import { Trouble, say } from './lib/steps.mjs'

const help = `npm run dev -- [options]

  --port N    serve on 127.0.0.1:N (or set PORT); 3000 unless said
  --empty     the shop without demo data
  --help      this

The same database as npm start, with the application rebuilt as its files change.`

const command = new Command()

await command.run(async () => {
  const { values } = readOptions({ port: { type: 'string' }, empty: { type: 'boolean' }, help: { type: 'boolean' } }, help)
  if (values.help) {
    say(help)
    return 0
  }
  readEnvFile()
  const port = askedPort(values.port) ?? 3000
  say('\n  Knurl, for development\n')
  const trouble = await whyNot(port)
  if (trouble) {
    throw new Trouble(trouble, { advice: `A free one:\n\n    npm run dev -- --port ${await nextFree(port)}` })
  }
  await ensureGround()
  const shop = await openShop({ command: 'dev', port, empty: values.empty, onStop: close => command.onStop(close) })
  say()
  if (shop.hasDemo) sayDemoSignIns()
  say()
  const served = launch(execPath, [inRoot('node_modules/nuxt/bin/nuxt.mjs'), 'dev', '--host', '127.0.0.1', '--port', String(port)], {
    cwd: root,
    env: { ...appEnvironment({ databaseUrl: shop.databaseUrl, filesDir: shop.filesDir, port }), NODE_ENV: 'development' },
    onOutput: text => stdout.write(text),
  })
  command.onStop(served.stop)
  command.isServing = true
  register({ command: 'dev', port, shop: shop.name, usesCluster: shop.name !== 'outside', server: served.identity })
  void served.ended.then(code => command.stop(code))
  return undefined
})
