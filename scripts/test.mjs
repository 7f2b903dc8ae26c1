import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { env, execPath, stdout } from 'node:process'
import { build, isBuilt } from './lib/build.mjs'
import { ensurePostgres } from './lib/cluster.mjs'
import { Command } from './lib/command.mjs'
import { installPackages } from './lib/debian.mjs'
import { ensureModules, requireNode } from './lib/modules.mjs'
import { readOptions } from './lib/options.mjs'
import { inRoot } from './lib/paths.mjs'
import { others } from './lib/registry.mjs'
import { attempt, findProgram } from './lib/run.mjs'
import { explain, formatDuration, say, step } from './lib/steps.mjs'
import { makeThrowawayCluster } from './lib/throwaway.mjs'

const projects = ['unit', 'integration', 'nuxt', 'e2e']
const kinds = ['lint', 'types', ...projects]

const help = `npm test -- [options] [paths]

  --only KIND   one of ${kinds.join(', ')}; may be said again for more
  paths         run only the test files whose path contains one of these (no lint, no types)
  --help        this

Everything, without options: lint, types, unit, integration, component and browser tests, on a database of its own.`

const command = new Command()
const total = { passed: 0, failed: 0 }

/** @param {string} program @param {string} name @returns {string} where a package keeps what it runs */
const packaged = (program, name) => inRoot('node_modules', program, name)

/**
 * @param {string} label
 * @param {string[]} args for Node
 */
async function check(label, args) {
  let shown = ''
  await step(label, async (note) => {
    const { code, output } = await attempt(execPath, args, { env: { ...env, NUXT_TELEMETRY_DISABLED: '1' } })
    if (code === 0) {
      total.passed++
    } else {
      total.failed++
      note('FAILED')
      shown = output
    }
  })
  if (shown) say(`\n${shown.trimEnd()}\n`)
}

/** Runs Vitest once for all the projects asked for, and adds up what it counted.
 * @param {string[]} asked @param {string[]} paths @param {NodeJS.ProcessEnv} environment */
async function runVitest(asked, paths, environment) {
  const folder = mkdtempSync(join(tmpdir(), 'knurl-counts-'))
  command.onStop(async () => rmSync(folder, { recursive: true, force: true }))
  const file = join(folder, 'counts.json')
  say(`  Tests: ${asked.join(', ')}`)
  const { code } = await attempt(execPath, [
    packaged('vitest', 'vitest.mjs'), 'run', ...asked.flatMap(name => ['--project', name]),
    `--reporter=${inRoot('scripts/lib/vitest-reporter.mjs')}`, '--reporter=minimal', ...paths,
  ], { show: true, env: { ...environment, ...stdout.isTTY ? {} : { NO_COLOR: '1', FORCE_COLOR: undefined }, KNURL_TEST_COUNTS: file, NODE_ENV: 'test' } })
  const counts = readCounts(file)
  total.passed += counts.passed
  total.failed += counts.failed
  if (counts.passed + counts.failed === 0) {
    say('    Not one test ran: that counts as a failure.')
    total.failed++
  } else if (code !== 0 && counts.failed === 0) {
    say(`    Vitest ended with code ${code}: that counts as a failure.`)
    total.failed++
  }
  if (counts.skipped > 0) say(`    ${counts.skipped} skipped`)
}

/** @param {string} file @returns {{ passed: number, failed: number, skipped: number }} */
function readCounts(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'))
  } catch {
    return { passed: 0, failed: 1, skipped: 0 }
  }
}

/** @param {string[]} asked */
async function ensurePrograms(asked) {
  await step('PostgreSQL', async (note) => {
    note(await ensurePostgres() ? 'installed' : '')
  })
  const wanted = []
  if (asked.includes('e2e') && !findProgram('chromium')) wanted.push('chromium')
  if (!findProgram('pdftoppm')) wanted.push('poppler-utils')
  await step('Chromium, poppler', async (note) => {
    if (wanted.length === 0) return
    await installPackages(wanted, `${wanted.join(' and ')} for its tests`)
    note('installed')
  })
}

async function main() {
  const { values, positionals: paths } = readOptions(
    { only: { type: 'string', multiple: true }, help: { type: 'boolean' } }, help, { positionals: true },
  )
  if (values.help) {
    say(help)
    return 0
  }
  const only = values.only ?? (paths.length > 0 ? projects : kinds)
  const unknown = only.find(kind => !kinds.includes(kind))
  if (unknown !== undefined) {
    say(`There is no kind of test called "${unknown}".\n\n${help}`)
    return 1
  }
  const began = performance.now()
  // Debian's Node may be set to production by its surroundings; the tests set their own.
  delete env.NODE_ENV
  say('\n  Knurl, under test\n')
  requireNode()
  await step('Packages', async (note) => {
    note(await ensureModules() ? 'installed' : '')
  })
  const asked = projects.filter(name => only.includes(name))
  const needsDatabase = asked.includes('integration') || asked.includes('e2e')
  if (needsDatabase) await ensurePrograms(asked)
  await step('Nuxt\'s types', () => attempt(execPath, [packaged('nuxt', 'bin/nuxt.mjs'), 'prepare']))
  if (only.includes('lint')) await check('Lint', [packaged('eslint', 'bin/eslint.js'), '.', '--max-warnings', '0'])
  if (only.includes('types')) await check('Types', [packaged('nuxt', 'bin/nuxt.mjs'), 'typecheck'])
  if (asked.length > 0) {
    let environment = { ...env }
    if (needsDatabase) {
      const cluster = await step('Database', async (note) => {
        const made = await makeThrowawayCluster()
        command.onStop(made.remove)
        note(`its own, port ${made.port}`)
        return made
      })
      environment = { ...environment, TEST_DATABASE_URL: cluster.url }
    }
    if (!asked.includes('e2e') || await ensureBuild()) await runVitest(asked, paths, environment)
    else await runVitest(asked.filter(name => name !== 'e2e'), paths, environment)
  }
  say(`\n  Took ${formatDuration(performance.now() - began)}`)
  return total.failed === 0 && total.passed > 0 ? 0 : 1
}

/** A build that fails is one failure, and leaves the browser tests out. */
async function ensureBuild() {
  try {
    await step('Build', async (note) => {
      if (isBuilt()) return note('up to date')
      const serving = others().find(entry => entry.command === 'start' && entry.port !== undefined)
      await build()
      if (serving) note(`restart the one on port ${serving.port}: its files were replaced`)
    })
    return true
  } catch (error) {
    say(error instanceof Error && 'output' in error ? String(error.output) : String(error))
    total.failed++
    return false
  }
}

command.onEnd(() => {
  if (total.passed + total.failed > 0) say(`${total.passed} passed, ${total.failed} failed`)
})
await command.run(async () => {
  try {
    return await main()
  } catch (error) {
    if (command.isStopping) return 130
    total.failed++
    return explain(error)
  }
})
