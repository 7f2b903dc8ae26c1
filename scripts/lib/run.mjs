import { spawn } from 'node:child_process'
import { accessSync, constants } from 'node:fs'
import { delimiter, join } from 'node:path'
import { env, getuid } from 'node:process'
import { root } from './paths.mjs'
import { Trouble } from './steps.mjs'

/** Programs that are running now, so that an interrupted command leaves none behind. @type {Set<import('node:child_process').ChildProcess>} */
const running = new Set()
let isHalted = false

/**
 * @typedef {object} RunOptions
 * @property {string} [cwd]
 * @property {NodeJS.ProcessEnv} [env] replaces the whole environment
 * @property {number} [uid]
 * @property {number} [gid]
 * @property {boolean} [toItsEnd] must not be interrupted half-way, by Ctrl-C either
 * @property {boolean} [show] print the output as it comes instead of keeping it
 * @property {string} [failure] the sentence for when it fails
 */

/**
 * Runs a program to its end.
 *
 * @param {string} command
 * @param {string[]} args
 * @param {RunOptions} [options]
 * @returns {Promise<{ code: number, output: string, stdout: string }>} the exit code (a signal counts as 1), all that it
 * printed, and what of that was its result
 */
export function attempt(command, args, options = {}) {
  return new Promise((resolve, reject) => {
    if (isHalted) {
      reject(new Trouble('Interrupted.'))
      return
    }
    const child = spawn(command, args, {
      cwd: options.cwd ?? root,
      env: options.env ?? env,
      uid: options.uid,
      gid: options.gid,
      detached: options.toItsEnd === true,
      stdio: ['ignore', options.show ? 'inherit' : 'pipe', options.show ? 'inherit' : 'pipe'],
    })
    if (!options.toItsEnd) running.add(child)
    let output = ''
    let stdout = ''
    const keep = (/** @type {Buffer} */ chunk) => {
      output = (output + chunk.toString()).slice(-200_000)
    }
    child.stdout?.on('data', (/** @type {Buffer} */ chunk) => {
      stdout += chunk.toString()
      keep(chunk)
    })
    child.stderr?.on('data', keep)
    child.on('error', (error) => {
      running.delete(child)
      reject(new Trouble(`Could not run ${command}: ${error.message}`))
    })
    child.on('exit', (code) => {
      running.delete(child)
      // 'close' would wait for a daemon that keeps the pipe open; what it printed before now has arrived one turn later.
      setTimeout(() => resolve({ code: code ?? 1, output, stdout }), 20)
    })
  })
}

/**
 * As `attempt`, and a failure is trouble that shows what the program printed.
 * Returns what it printed as its result, without its warnings.
 *
 * @param {string} command
 * @param {string[]} args
 * @param {RunOptions} [options]
 */
export async function run(command, args, options = {}) {
  const { code, output, stdout } = await attempt(command, args, options)
  if (code !== 0) {
    throw new Trouble(options.failure ?? `${command} ${args.join(' ')} ended with code ${code}.`, { output: lastLines(output, 60) })
  }
  return stdout
}

/** Ends what can be ended, and lets nothing new begin until `resume`. */
export function halt() {
  isHalted = true
  for (const child of running) child.kill('SIGTERM')
}

export const isHalting = () => isHalted

export function resume() {
  isHalted = false
}

/** @param {string} text @param {number} count */
export function lastLines(text, count) {
  return text.trimEnd().split('\n').slice(-count).join('\n')
}

/** The full path of a program, or undefined where it is not installed.
 * @param {string} name */
export function findProgram(name) {
  for (const folder of [...(env.PATH ?? '').split(delimiter), '/usr/bin', '/usr/sbin', '/bin', '/sbin']) {
    if (folder && isExecutable(join(folder, name))) return join(folder, name)
  }
  return undefined
}

/** @param {string} path */
export function isExecutable(path) {
  try {
    accessSync(path, constants.X_OK)
    return true
  } catch {
    return false
  }
}

export const isRoot = () => getuid?.() === 0
