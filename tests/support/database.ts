import { randomBytes } from 'node:crypto'
import { setTimeout as sleep } from 'node:timers/promises'
import pg from 'pg'
import { afterAll, beforeAll, inject } from 'vitest'
import { openDatabase } from '../../server/utils/db'

type Opened = ReturnType<typeof openDatabase>

export interface TestDatabase extends Opened {
  /** For the programs that open it themselves. */
  url: string
  drop: () => Promise<void>
}

/** Runs one statement on the test server's maintenance database. */
async function maintain(text: string): Promise<void> {
  const client = new pg.Client({ connectionString: inject('maintenanceUrl') })
  await client.connect()
  try {
    await client.query(text)
  } finally {
    await client.end()
  }
}

/** Makes a migrated, empty database: a copy of the template, in some tens of milliseconds. */
export async function makeTestDatabase(): Promise<TestDatabase> {
  const name = `knurl_test_${randomBytes(6).toString('hex')}`
  for (let round = 0; ; round++) {
    try {
      await maintain(`create database ${name} template ${inject('templateName')}`)
      break
    } catch (error) {
      // object_in_use: another worker copies the template at this moment.
      const isBusy = error instanceof pg.DatabaseError && error.code === '55006'
      if (!isBusy || round > 50) throw error
      await sleep(100)
    }
  }
  const url = new URL(inject('maintenanceUrl'))
  url.pathname = `/${name}`
  const opened = openDatabase(url.href)
  return {
    ...opened,
    url: url.href,
    drop: async () => {
      await opened.pool.end()
      await maintain(`drop database if exists ${name} with (force)`)
    },
  }
}

/**
 * Gives a test file, or a `describe` block, a database of its own, dropped at the end.
 *
 * @returns what to read it from; its fields are there once the tests run, not before
 */
export function useTestDatabase(): Pick<TestDatabase, 'db' | 'pool' | 'url'> {
  let made: TestDatabase | undefined
  beforeAll(async () => {
    made = await makeTestDatabase()
  })
  afterAll(async () => {
    await made?.drop()
  })
  const get = () => {
    if (!made) throw new Error('The test database exists only while tests run: read it inside a test or a hook')
    return made
  }
  return {
    get db() {
      return get().db
    },
    get pool() {
      return get().pool
    },
    get url() {
      return get().url
    },
  }
}
