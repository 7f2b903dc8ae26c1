import type { NodePgDatabase, NodePgQueryResultHKT } from 'drizzle-orm/node-postgres'
import { drizzle } from 'drizzle-orm/node-postgres'
import type { PgTransaction } from 'drizzle-orm/pg-core'
import type { ExtractTablesWithRelations } from 'drizzle-orm'
import pg from 'pg'
import * as schema from '../../drizzle/schema'

type Schema = typeof schema

/** The connection, or a transaction on it: services take either. */
export type Database = NodePgDatabase<Schema> | PgTransaction<NodePgQueryResultHKT, Schema, ExtractTablesWithRelations<Schema>>

export function openDatabase(url: string): { db: NodePgDatabase<Schema>, pool: pg.Pool } {
  const pool = new pg.Pool({ connectionString: url, max: 10 })
  // An idle connection that drops must not end the process; the next query reports it.
  pool.on('error', () => {})
  return { db: drizzle({ client: pool, schema, casing: 'snake_case' }), pool }
}

let opened: ReturnType<typeof openDatabase> | undefined

function connection() {
  const url = process.env.NUXT_DATABASE_URL
  if (!url) throw new Error('NUXT_DATABASE_URL is not set: the database cannot be reached')
  opened ??= openDatabase(url)
  return opened
}

/** The server's one connection pool, opened at first use. */
export const useDb = () => connection().db
export const usePool = () => connection().pool

export async function closeDatabase(): Promise<void> {
  await opened?.pool.end()
  opened = undefined
}
