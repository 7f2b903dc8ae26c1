import { shop } from '../../drizzle/schema'
import type { Me } from '../../shared/types/me'
import type { Person } from '../../shared/types/person'
import type { Database } from '../utils/db'
import { isFirstRun } from './people'

/** What the browser needs to know of the visitor and the shop. Anyone may ask: it tells a stranger the shop's name only. */
export async function getMe(db: Database, person: Person | null): Promise<Me> {
  const [settings] = await db.select({ name: shop.name, currency: shop.currency, timeZone: shop.timeZone, ituRegion: shop.ituRegion }).from(shop)
  return { person, firstRun: person === null && await isFirstRun(db), shop: settings ?? null }
}
