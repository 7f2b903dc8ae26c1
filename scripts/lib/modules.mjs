import { createHash } from 'node:crypto'
import { existsSync, readFileSync, renameSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { execPath, versions } from 'node:process'
import { inRoot } from './paths.mjs'
import { findProgram, isExecutable, run } from './run.mjs'
import { Trouble } from './steps.mjs'

const stampFile = inRoot('node_modules', '.knurl-lock')

function stamp() {
  const lock = readFileSync(inRoot('package-lock.json'))
  return createHash('sha256').update(lock).update(`node ${versions.modules}`).digest('hex')
}

function writeStamp() {
  writeFileSync(`${stampFile}.new`, stamp())
  renameSync(`${stampFile}.new`, stampFile)
}

/** Whether someone's own `npm ci` or `npm install` already put there what the lock file asks for. */
function isInstalledByHand() {
  const hidden = inRoot('node_modules', '.package-lock.json')
  if (!existsSync(hidden)) return false
  const wanted = JSON.parse(readFileSync(inRoot('package-lock.json'), 'utf8')).packages
  const present = JSON.parse(readFileSync(hidden, 'utf8')).packages
  return Object.entries(wanted).every(([path, entry]) => {
    if (path === '' || entry.link) return true
    if (!present[path]) return entry.optional === true || entry.devOptional === true || entry.peer === true
    return present[path].version === entry.version
  })
}

/**
 * Makes node_modules hold what package-lock.json says; does nothing where it already does.
 *
 * @returns {Promise<boolean>} whether anything had to be installed
 */
export async function ensureModules() {
  if (existsSync(stampFile) && readFileSync(stampFile, 'utf8') === stamp()) return false
  if (isInstalledByHand()) {
    writeStamp()
    return false
  }
  const npm = [join(dirname(execPath), 'npm'), findProgram('npm')].find(path => path !== undefined && isExecutable(path))
  if (!npm) throw new Trouble('Node is here, but its package manager npm is not.', { advice: 'Install Node 20 together with npm, then try again.' })
  await run(npm, ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'], { failure: 'npm ci could not install the packages.' })
  writeStamp()
  return true
}

export function requireNode() {
  const [major = 0, minor = 0] = versions.node.split('.').map(Number)
  if (major > 20 || (major === 20 && minor >= 19)) return
  throw new Trouble(`Knurl needs Node 20.19 or newer; this is ${versions.node}.`)
}
