import { argv, env } from 'node:process'
import { parseArgs } from 'node:util'
import { readPort } from './ports.mjs'
import { Trouble } from './steps.mjs'

/**
 * Reads a command's options; an unknown one is refused with the command's help.
 *
 * @template {import('node:util').ParseArgsConfig['options']} T
 * @param {T} options
 * @param {string} help
 * @param {{ positionals?: boolean }} [more]
 */
export function readOptions(options, help, { positionals = false } = {}) {
  try {
    return parseArgs({ args: argv.slice(2), options, allowPositionals: positionals, strict: true })
  } catch (error) {
    throw new Trouble(error instanceof Error ? error.message.split('. ')[0] ?? '' : String(error), { advice: help })
  }
}

/** The port asked for by `--port` or `PORT`.
 * @param {string | undefined} option */
export function askedPort(option) {
  if (option !== undefined) return readPort(option, '--port')
  return env.PORT ? readPort(env.PORT, 'PORT') : undefined
}
