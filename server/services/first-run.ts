import { sql } from 'drizzle-orm'
import { people, shop } from '../../drizzle/schema'
import type { FirstRunInput } from '../../shared/schemas/sign-in'
import type { Database } from '../utils/db'
import { conflict } from '../utils/errors'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'
import { isFirstRun, writePerson } from './people'

/** The shop's one row has no uuid of its own; the ledger knows it by this one. */
export const SHOP_SUBJECT = { kind: 'shop', id: '00000000-0000-0000-0000-000000000001' } as const

/**
 * Opens the shop: its settings and its first owner, once. The table is locked against itself, so that of two people who
 * send the page at the same moment the second is told that the shop is open.
 */
export async function openShop(db: Database, input: FirstRunInput): Promise<Actor> {
  if (!await isFirstRun(db)) throw alreadyOpen()
  return db.transaction(async (tx) => {
    await tx.execute(sql`lock table ${people} in share row exclusive mode`)
    if (!await isFirstRun(tx)) throw alreadyOpen()
    const id = await writePerson(tx, null, { name: input.name, email: input.email, role: 'owner', password: input.password, mustChangePassword: false })
    const settings = { name: input.shopName, currency: input.currency, timeZone: input.timeZone, ituRegion: input.ituRegion }
    await tx.insert(shop).values(settings).onConflictDoUpdate({ target: shop.id, set: settings })
    await appendLedger(tx, { id }, SHOP_SUBJECT, 'created', { name: input.shopName })
    return { id }
  })
}

function alreadyOpen() {
  return conflict('already-open', 'This shop has its owner already. Sign in, or ask the owner to add you.')
}
