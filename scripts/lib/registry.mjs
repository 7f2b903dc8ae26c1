import { mkdirSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { pid } from 'node:process'
import { setTimeout as sleep } from 'node:timers/promises'
import { inData } from './paths.mjs'
import { endProcess, identify, isAlive } from './processes.mjs'
import { Trouble } from './steps.mjs'

const folder = inData('running')
const lockFile = inData('lock')

/**
 * @typedef {object} Entry one command of this checkout that is running now
 * @property {'start' | 'dev' | 'demo' | 'token' | 'bench'} command
 * @property {{ pid: number, started: string }} launcher
 * @property {{ pid: number, started: string }} [server] the application's process
 * @property {number} [port]
 * @property {string} [shop] which database it serves
 * @property {boolean} [usesCluster]
 */

/** @returns {Entry[]} */
function readEntries() {
  mkdirSync(folder, { recursive: true })
  return readdirSync(folder).flatMap((name) => {
    try {
      return [JSON.parse(readFileSync(join(folder, name), 'utf8'))]
    } catch {
      rmSync(join(folder, name), { force: true })
      return []
    }
  })
}

/** The other commands of this checkout that are running now. */
export function others() {
  return readEntries().filter(entry => entry.launcher.pid !== pid && isAlive(entry.launcher))
}

/** @param {Omit<Entry, 'launcher'>} entry */
export function register(entry) {
  mkdirSync(folder, { recursive: true })
  writeFileSync(join(folder, `${pid}.json`), JSON.stringify({ ...entry, launcher: identify(pid) }))
}

export function unregister() {
  rmSync(join(folder, `${pid}.json`), { force: true })
}

/**
 * Ends application servers whose launcher was killed before it could end them itself.
 *
 * @returns {Promise<number>} how many
 */
export async function endOrphans() {
  let ended = 0
  for (const entry of readEntries()) {
    if (entry.launcher.pid === pid || isAlive(entry.launcher)) continue
    if (entry.server && isAlive(entry.server)) {
      await endProcess(entry.server)
      ended++
    }
    rmSync(join(folder, `${entry.launcher.pid}.json`), { force: true })
  }
  return ended
}

/**
 * Lets one command of this checkout at a time through; a lock left by a killed one is broken.
 *
 * @template T
 * @param {() => Promise<T>} work
 * @returns {Promise<T>}
 */
export async function withLock(work) {
  mkdirSync(inData(), { recursive: true })
  for (let waited = 0; ; waited += 100) {
    try {
      writeFileSync(lockFile, JSON.stringify(identify(pid)), { flag: 'wx' })
      break
    } catch (error) {
      if (!(error instanceof Error && 'code' in error && error.code === 'EEXIST')) throw error
    }
    if (!isAlive(readHolder())) {
      // A lock that is just being written is empty for a moment: look twice.
      await sleep(100)
      if (!isAlive(readHolder())) rmSync(lockFile, { force: true })
      continue
    }
    if (waited > 180_000) throw new Trouble('Another command of this copy of Knurl is starting and does not finish.', { advice: `Its process number is in ${lockFile}` })
    await sleep(100)
  }
  try {
    return await work()
  } finally {
    rmSync(lockFile, { force: true })
  }
}

/** @returns {{ pid: number, started: string } | undefined} */
function readHolder() {
  try {
    return JSON.parse(readFileSync(lockFile, 'utf8'))
  } catch {
    return undefined
  }
}
