import { sql } from 'drizzle-orm'
import { bigint, check, date, index, jsonb, pgTable, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import type { FrozenProvenance } from '../../shared/types/provenance'
import { instant } from './columns'
import { people } from './people'
import { parties } from './shop'
import { units } from './units'

/** The public page of a unit: an unguessable link that can be taken back. */
export const publications = pgTable('publications', {
  id: uuid().primaryKey().defaultRandom(),
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  /** 192 random bits, base64url. Kept readable: the owner must be able to see the link again. */
  token: text().notNull(),
  publishedBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  publishedAt: instant().notNull().defaultNow(),
  revokedAt: instant(),
}, t => [
  uniqueIndex('publications_token_key').on(t.token),
  uniqueIndex('publications_one_standing').on(t.unitId).where(sql`${t.revokedAt} is null`),
])

/** A sale, with the provenance sheet frozen as it stood that day. */
export const sales = pgTable('sales', {
  id: uuid().primaryKey().defaultRandom(),
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  buyerId: uuid().notNull().references(() => parties.id, { onDelete: 'restrict' }),
  priceMinor: bigint({ mode: 'number' }).notNull(),
  currency: text().notNull(),
  soldOn: date({ mode: 'string' }).notNull(),
  frozenSheet: jsonb().$type<FrozenProvenance>().notNull(),
  soldBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  createdAt: instant().notNull().defaultNow(),
  /** Set when the piece came back or the sale fell through. */
  undoneAt: instant(),
}, t => [
  // One piece cannot be sold twice at once, whatever two people do.
  uniqueIndex('sales_one_standing').on(t.unitId).where(sql`${t.undoneAt} is null`),
  index('sales_sold_on_idx').on(t.soldOn),
  check('sales_price_not_negative', sql`${t.priceMinor} >= 0`),
])
