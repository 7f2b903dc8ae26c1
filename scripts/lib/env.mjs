import { randomBytes } from 'node:crypto'
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { env, loadEnvFile } from 'node:process'
import { inData, inRoot } from './paths.mjs'
import { Trouble } from './steps.mjs'

/** Reads `.env` where there is one; what the environment already says wins. */
export function readEnvFile() {
  if (existsSync(inRoot('.env'))) loadEnvFile(inRoot('.env'))
}

/** The address of a database of the operator's own, or undefined. */
export function outsideDatabase() {
  return env.DATABASE_URL || env.NUXT_DATABASE_URL || undefined
}

/** Seals the session cookies; made once and kept, so that people stay signed in when Knurl is restarted. */
export function sessionPassword() {
  const given = env.NUXT_SESSION_PASSWORD
  if (given !== undefined && given !== '') {
    if (given.length < 32) throw new Trouble('NUXT_SESSION_PASSWORD must have at least 32 characters.')
    return given
  }
  const file = inData('session-password')
  if (existsSync(file)) {
    const kept = readFileSync(file, 'utf8').trim()
    if (kept.length >= 32) return kept
  }
  const made = randomBytes(32).toString('base64url')
  mkdirSync(inData(), { recursive: true })
  writeFileSync(file, `${made}\n`, { mode: 0o600 })
  chmodSync(file, 0o600)
  return made
}

/**
 * What the application and its scripts read.
 *
 * @param {{ databaseUrl: string, filesDir?: string, port?: number, session?: string }} settings
 * @returns {NodeJS.ProcessEnv}
 */
export function appEnvironment({ databaseUrl, filesDir, port, session }) {
  return {
    ...env,
    DATABASE_URL: databaseUrl,
    NUXT_DATABASE_URL: databaseUrl,
    NUXT_SESSION_PASSWORD: session ?? sessionPassword(),
    NUXT_FILES_DIR: filesDir ?? (env.NUXT_FILES_DIR || inData('files')),
    HOST: '127.0.0.1',
    NITRO_HOST: '127.0.0.1',
    ...port === undefined ? {} : { PORT: String(port), NITRO_PORT: String(port) },
    NITRO_SHUTDOWN_TIMEOUT: '5000',
    NUXT_TELEMETRY_DISABLED: '1',
  }
}
