import { spawn } from 'node:child_process'
import { setTimeout as sleep } from 'node:timers/promises'
import { identify, endProcess } from './processes.mjs'
import { isHalting } from './run.mjs'
import { Trouble } from './steps.mjs'

/**
 * @typedef {object} Served
 * @property {{ pid: number, started: string }} identity
 * @property {Promise<number>} ended its exit code, once it has ended
 * @property {() => Promise<void>} stop
 */

/**
 * Starts a program in a process group of its own, so that Ctrl-C reaches it only through us and in order.
 *
 * @param {string} command
 * @param {string[]} args
 * @param {{ env: NodeJS.ProcessEnv, cwd: string, onOutput: (text: string) => void }} options
 * @returns {Served}
 */
export function launch(command, args, { env, cwd, onOutput }) {
  const child = spawn(command, args, { cwd, env, detached: true, stdio: ['ignore', 'pipe', 'pipe'] })
  child.stdout.on('data', chunk => onOutput(chunk.toString()))
  child.stderr.on('data', chunk => onOutput(chunk.toString()))
  /** @type {Promise<number>} */
  const ended = new Promise((resolve) => {
    child.on('error', () => resolve(1))
    child.on('exit', code => resolve(code ?? 1))
  })
  const identity = identify(child.pid ?? 0)
  return { identity, ended, stop: () => endProcess(identity) }
}

/**
 * Waits until the application answers.
 *
 * @param {string} url
 * @param {Served} served
 * @param {() => string} output what it has printed so far
 */
export async function waitUntilServing(url, served, output) {
  let over = false
  void served.ended.then(() => {
    over = true
  })
  let last = ''
  for (const began = performance.now(); performance.now() - began < 90_000; await sleep(100)) {
    if (isHalting()) throw new Trouble('Interrupted.')
    if (over) throw new Trouble('The application ended while it was starting.', { output: output() })
    try {
      const response = await fetch(`${url}/api/health`, { signal: AbortSignal.timeout(5000) })
      if (response.status < 500) return
      last = await response.text()
    } catch { /* not listening yet */ }
  }
  throw new Trouble('The application started, but does not report that it is well.', { output: `${output()}\n${last}` })
}
