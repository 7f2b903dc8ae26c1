import { existsSync } from 'node:fs'
import { dirname, resolve } from 'node:path'
import { env, exit } from 'node:process'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { drizzle } from 'drizzle-orm/node-postgres'
import { migrate } from 'drizzle-orm/node-postgres/migrator'
import { Logger, runMigrations } from 'graphile-worker'
import pg from 'pg'

const migrationsFolder = resolve(dirname(fileURLToPath(import.meta.url)), '../drizzle/migrations')

/** Any number will do, as long as nothing else in the database uses it for an advisory lock. */
const lockNumber = 7_204_115

/**
 * Brings a database up to date with the committed migrations. Instances that start together wait for one another.
 *
 * @returns how many migrations were applied, and how many there are in all
 */
export async function migrateDatabase(url: string): Promise<{ applied: number, total: number }> {
  const client = new pg.Client({ connectionString: url })
  await client.connect()
  try {
    await client.query('select pg_advisory_lock($1)', [lockNumber])
    if (!existsSync(resolve(migrationsFolder, 'meta/_journal.json'))) return { applied: 0, total: 0 }
    const before = await countApplied(client)
    await migrate(drizzle(client), { migrationsFolder })
    // The job queue's own schema: jobs are added by transactions, so it must be there before the first of them.
    await runMigrations({ connectionString: url, logger: new Logger(() => () => {}) })
    const total = await countApplied(client)
    return { applied: total - before, total }
  } finally {
    // Ending the connection gives the lock back too, after a failure as well.
    await client.end()
  }
}

async function countApplied(client: pg.Client): Promise<number> {
  const { rows: [table] } = await client.query<{ name: string | null }>('select to_regclass(\'drizzle.__drizzle_migrations\') as name')
  if (!table?.name) return 0
  const { rows: [row] } = await client.query<{ count: string }>('select count(*) from drizzle.__drizzle_migrations')
  return Number(row?.count ?? 0)
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  const url = env.NUXT_DATABASE_URL || env.DATABASE_URL
  if (!url) {
    console.error('Set NUXT_DATABASE_URL to the database that is to be brought up to date.')
    exit(1)
  }
  const { applied, total } = await migrateDatabase(url)
  console.log(applied > 0 ? `${applied} of ${total} migrations applied` : 'up to date')
}
