import { sql } from 'drizzle-orm'
import { shop } from '../../drizzle/schema'
import type { Database } from '../utils/db'

/** The calendar day it is now in the shop's own time zone, `2026-11-30`; in UTC before the shop has been set up. */
export async function todayInShop(db: Database): Promise<string> {
  const day = sql<string>`to_char(now() at time zone ${shop.timeZone}, 'YYYY-MM-DD')`
  const [row] = await db.select({ day }).from(shop)
  return row?.day ?? new Date().toISOString().slice(0, 10)
}
