import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs'
import { execPath } from 'node:process'
import { admin, databaseUrl, makeCluster, makePassword, runningServer, startCluster, stopCluster } from './cluster.mjs'
import { inData, inRoot, root } from './paths.mjs'
import { others, unregister, withLock } from './registry.mjs'
import { isRoot, run } from './run.mjs'
import { Trouble } from './steps.mjs'

const recordFile = inData('cluster.json')

/** The application's role: owns its databases, may make others, is no superuser. */
const role = 'knurl'

/**
 * @typedef {object} ClusterRecord what `.data/cluster.json` holds
 * @property {string} checkout the folder it was made for
 * @property {string} directory
 * @property {number} port the last one it listened on
 * @property {string} adminPassword
 * @property {string} password the application's
 */

/** @returns {ClusterRecord | undefined} */
function readRecord() {
  if (!existsSync(recordFile)) return undefined
  const record = JSON.parse(readFileSync(recordFile, 'utf8'))
  if (!existsSync(record.directory)) return undefined
  // A copied checkout brings the record along: the cluster stays with the one that made it.
  const isCopy = record.checkout !== root && existsSync(`${record.checkout}/.data/cluster.json`)
  return isCopy ? undefined : record
}

/** @param {ClusterRecord} record */
function writeRecord(record) {
  mkdirSync(inData(), { recursive: true })
  writeFileSync(`${recordFile}.new`, `${JSON.stringify(record, undefined, 2)}\n`, { mode: 0o600 })
  renameSync(`${recordFile}.new`, recordFile)
}

/** Root's home can't be entered by the user that runs PostgreSQL, so root's clusters live in /var/lib. */
function homeForCluster() {
  return isRoot() ? `/var/lib/knurl/${createHash('sha256').update(root).digest('hex').slice(0, 12)}` : inData('pg')
}

/**
 * Starts this checkout's own PostgreSQL, making it first where there is none. The caller must have registered itself as
 * a user of the cluster.
 *
 * @returns {Promise<{ record: ClusterRecord, note: string }>}
 */
export function openCluster() {
  return withLock(async () => {
    let record = readRecord()
    let note = ''
    if (!record) {
      const directory = homeForCluster()
      if (existsSync(directory)) {
        await stopCluster(directory)
        const aside = `${directory}.before-${new Date().toISOString().replace(/\D/g, '').slice(0, 14)}`
        renameSync(directory, aside)
        note = `made anew; an earlier one whose password is lost was kept as ${aside}`
      }
      record = { checkout: root, directory, port: 0, adminPassword: makePassword(), password: makePassword() }
      await makeCluster(directory, { password: record.adminPassword })
      writeRecord(record)
      note ||= 'made'
    }
    const { port, startedHere } = await startCluster(record.directory, record.port)
    record = { ...record, checkout: root, port }
    writeRecord(record)
    await ensureRole(record)
    return { record, note: [note, startedHere ? '' : 'already running', `port ${port}`].filter(Boolean).join(', ') }
  })
}

/** Stops this checkout's PostgreSQL when the last command that uses it ends. */
export function closeCluster() {
  return withLock(async () => {
    unregister()
    if (others().some(entry => entry.usesCluster)) return
    const record = readRecord()
    if (record) await stopCluster(record.directory)
  })
}

/** @returns {ClusterRecord | undefined} the record of this checkout's PostgreSQL if it runs now */
export function runningCluster() {
  const record = readRecord()
  const server = record && runningServer(record.directory)
  return record && server ? { ...record, port: server.port } : undefined
}

/**
 * @template T
 * @param {string} url
 * @param {(client: import('pg').Client) => Promise<T>} work
 */
export async function withClient(url, work) {
  const { default: pg } = await import('pg')
  const client = new pg.Client({ connectionString: url, connectionTimeoutMillis: 15_000 })
  // A server that stops while we are connected is reported by the query that fails.
  client.on('error', () => {})
  await client.connect()
  try {
    return await work(client)
  } finally {
    await client.end().catch(() => {})
  }
}

/** @param {{ port: number, adminPassword: string, password: string }} record */
export async function ensureRole(record) {
  const url = databaseUrl({ user: admin, password: record.adminPassword, port: record.port, database: 'postgres' })
  await withClient(url, async (client) => {
    const { rowCount } = await client.query('select 1 from pg_roles where rolname = $1', [role])
    if (!rowCount) await client.query(`create role ${role} login createdb password ${client.escapeLiteral(record.password)}`)
  })
}

/** @param {{ port: number, password: string }} record @param {string} name */
export function urlOf(record, name) {
  return databaseUrl({ user: role, password: record.password, port: record.port, database: name })
}

/**
 * Makes a database in the cluster where it is missing.
 *
 * @param {{ port: number, password: string }} record
 * @param {string} name
 * @param {{ anew?: boolean }} [options] `anew` drops what was there
 * @returns {Promise<string>} its URL
 */
export async function ensureDatabase(record, name, { anew = false } = {}) {
  await withClient(urlOf(record, 'postgres'), async (client) => {
    const id = client.escapeIdentifier(name)
    if (anew) await client.query(`drop database if exists ${id} with (force)`)
    const { rowCount } = await client.query('select 1 from pg_database where datname = $1', [name])
    if (!rowCount) await client.query(`create database ${id}`)
  })
  return urlOf(record, name)
}

/** The URL as it may be shown: without its password.
 * @param {string} url */
export function withoutPassword(url) {
  try {
    const parsed = new URL(url)
    return `${parsed.hostname}${parsed.port ? `:${parsed.port}` : ''}${parsed.pathname}`
  } catch {
    return 'the database of DATABASE_URL'
  }
}

/** @param {string} url as in `DATABASE_URL` */
export async function checkConnection(url) {
  if (!/^postgres(ql)?:\/\//.test(url)) throw new Trouble('DATABASE_URL must begin with postgresql://')
  try {
    await withClient(url, async (client) => {
      const { rows } = await client.query('show server_version_num')
      const version = Number(rows[0]?.server_version_num)
      if (version < 140_000) throw new Trouble(`The server of DATABASE_URL is PostgreSQL ${Math.floor(version / 10_000)}; Knurl needs 14 or newer.`)
    })
  } catch (error) {
    if (error instanceof Trouble) throw error
    const words = error instanceof AggregateError ? error.errors.map(one => one.message).join('; ') : String(error instanceof Error ? error.message : error)
    throw new Trouble(`Can't reach the database at ${withoutPassword(url)}: ${words}`, { advice: 'Check DATABASE_URL, and that the database exists and its server runs.' })
  }
}

/** @param {NodeJS.ProcessEnv} environment @returns {Promise<string>} what the migrator printed */
export function migrate(environment) {
  return run(execPath, ['--import', 'tsx', inRoot('scripts/migrate.ts')], { env: environment, failure: 'The database could not be brought up to date.' })
}
