import { randomBytes } from 'node:crypto'
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { env, execPath } from 'node:process'
import { afterAll, beforeAll } from 'vitest'
import { inRoot } from '../../scripts/lib/paths.mjs'
import { freePort } from '../../scripts/lib/ports.mjs'
import { launch, waitUntilServing } from '../../scripts/lib/serve.mjs'
import { makeTestDatabase } from './database'
import type { TestDatabase } from './database'

export interface ServerOptions {
  /** Added to the server's environment. */
  env?: Record<string, string>
  /** Fills the database and the file store before the server starts. */
  prepare?: (site: { database: TestDatabase, filesDir: string, env: NodeJS.ProcessEnv }) => Promise<void>
}

export interface TestServer {
  /** `http://127.0.0.1:PORT`, without a slash at the end. */
  url: string
  database: TestDatabase
  filesDir: string
  /** The server's own environment, for scripts that work on the same database and files. */
  env: NodeJS.ProcessEnv
  /** All that it has printed so far. */
  output: () => string
  stop: () => Promise<void>
}

/** Starts the built application on a free port, on a database and a file store of its own. */
export async function startServer(options: ServerOptions = {}): Promise<TestServer> {
  const database = await makeTestDatabase()
  const filesDir = await mkdtemp(join(tmpdir(), 'knurl-files-'))
  const undo = [() => rm(filesDir, { recursive: true, force: true }), database.drop]
  const stop = async () => {
    for (const step of undo.splice(0).reverse()) await step()
  }
  try {
    const port = await freePort()
    const environment: NodeJS.ProcessEnv = {
      ...env,
      NODE_ENV: 'production',
      DATABASE_URL: database.url,
      NUXT_DATABASE_URL: database.url,
      NUXT_SESSION_PASSWORD: randomBytes(32).toString('base64url'),
      NUXT_FILES_DIR: filesDir,
      NUXT_PUBLIC_BASE_URL: '',
      NITRO_HOST: '127.0.0.1',
      NITRO_PORT: String(port),
      HOST: '127.0.0.1',
      PORT: String(port),
      ...options.env,
    }
    // What Vitest sets for itself would make a production server think that it is under test.
    for (const name of ['VITEST', 'TEST', 'VITEST_MODE', 'VITEST_WORKER_ID', 'VITEST_POOL_ID']) Reflect.deleteProperty(environment, name)
    await options.prepare?.({ database, filesDir, env: environment })
    let printed = ''
    const served = launch(execPath, [inRoot('.output/server/index.mjs')], {
      cwd: tmpdir(),
      env: environment,
      onOutput: (text) => {
        printed += text
      },
    })
    undo.push(served.stop)
    const url = `http://127.0.0.1:${port}`
    await waitUntilServing(url, served, () => printed)
    return { url, database, filesDir, env: environment, output: () => printed, stop }
  } catch (error) {
    await stop()
    throw error
  }
}

/**
 * Gives a test file its own running application.
 *
 * @returns what to read it from, once the tests run
 */
export function useTestServer(options: ServerOptions = {}): () => TestServer {
  let server: TestServer | undefined
  beforeAll(async () => {
    server = await startServer(options)
  })
  afterAll(async () => {
    await server?.stop()
  })
  return () => {
    if (!server) throw new Error('The test server runs only while tests run: read it inside a test or a hook')
    return server
  }
}
