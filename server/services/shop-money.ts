import { shop } from '../../drizzle/schema'
import { parseMoney } from '../../shared/domain/money'
import type { Database } from '../utils/db'
import { invalid } from '../utils/errors'

/** The currency the shop keeps its book in; pounds before it has been set up. */
export async function shopCurrency(db: Database): Promise<string> {
  const [row] = await db.select({ currency: shop.currency }).from(shop)
  return row?.currency ?? 'GBP'
}

/** An amount as typed, in minor units of the shop's currency; null for an empty one. 422 at `field` in the reader's own words. */
export async function readAmount(db: Database, typed: string, field: string): Promise<{ minor: number, currency: string } | null> {
  if (typed === '') return null
  const reading = parseMoney(typed, await shopCurrency(db))
  if (!reading.ok) throw invalid([{ path: field, message: reading.sentence }])
  return { minor: reading.minor, currency: reading.currency }
}
