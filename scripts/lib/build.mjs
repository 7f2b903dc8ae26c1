import { createHash } from 'node:crypto'
import { existsSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs'
import { join, relative } from 'node:path'
import { env, execPath, versions } from 'node:process'
import { inRoot, root } from './paths.mjs'
import { run } from './run.mjs'

const stampFile = inRoot('.output', 'sources')

/** At the top level, what the build does not read. */
const apart = new Set(['node_modules', 'tests', 'scripts', 'docs', 'coverage', 'test-results', 'vitest.config.ts', 'drizzle.config.ts', 'eslint.config.mjs', 'bench-results.json', 'LICENSE'])

/** @param {string} folder @returns {string[]} */
function filesIn(folder) {
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const isApart = entry.name.startsWith('.') || entry.name.endsWith('.md') || entry.name.endsWith('.log')
      || (folder === root && apart.has(entry.name))
    if (isApart) return []
    const path = join(folder, entry.name)
    if (entry.isDirectory()) return filesIn(path)
    return entry.isFile() ? [path] : []
  })
}

/** One number for everything that the build reads, so that it is done again exactly when that changed. */
export function hashSources() {
  const hash = createHash('sha256').update(`node ${versions.modules}, https ${(env.NUXT_PUBLIC_BASE_URL ?? '').startsWith('https:')}`)
  for (const path of filesIn(root).sort()) {
    hash.update(`\0${relative(root, path)}\0`).update(readFileSync(path))
  }
  return hash.digest('hex')
}

export function isBuilt() {
  return existsSync(inRoot('.output/server/index.mjs')) && existsSync(stampFile)
    && readFileSync(stampFile, 'utf8') === hashSources()
}

/** Builds the application for production into `.output`. */
export async function build() {
  const sources = hashSources()
  rmSync(stampFile, { force: true })
  await run(execPath, [inRoot('node_modules/nuxt/bin/nuxt.mjs'), 'build'], {
    env: {
      ...env,
      NODE_ENV: 'production',
      NUXT_TELEMETRY_DISABLED: '1',
      // On a machine with little memory Node would give itself less than the build needs.
      NODE_OPTIONS: `${env.NODE_OPTIONS ?? ''} --max-old-space-size=3072`.trim(),
    },
    failure: 'The application could not be built.',
  })
  writeFileSync(stampFile, sources)
}
