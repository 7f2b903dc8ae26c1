import { sql } from 'drizzle-orm'
import { bigint, check, integer, numeric, pgEnum, pgTable, text, uuid } from 'drizzle-orm/pg-core'
import { decisionRule } from './measuring'
import { timestamps, version } from './columns'

/** The shop's own settings: one row. */
export const shop = pgTable('shop', {
  id: integer().primaryKey().default(1),
  name: text().notNull(),
  address: text().notNull().default(''),
  currency: text().notNull().default('GBP'),
  timeZone: text().notNull().default('Europe/London'),
  /** ITU region, which decides what "medium wave" or "2 m" means. */
  ituRegion: integer().notNull().default(1),
  /** What the terms disclosure starts from. */
  defaultTerms: text().notNull().default(''),
  /** Limits the safety check suggests, and where they come from; editable because codes differ by country. */
  earthBondLimitMilliohm: integer().notNull().default(100),
  insulationLimitKilohm: integer().notNull().default(1000),
  leakageLimitMicroamp: integer().notNull().default(3500),
  safetyLimitsOrigin: text().notNull().default('UK code of practice for in-service inspection, Class I; check your own local code'),
  /** How a reading is judged unless a procedure says otherwise; r in the guard band w = r·U. */
  decisionRule: decisionRule().notNull().default('guard_band'),
  guardFactor: numeric({ precision: 4, scale: 2, mode: 'number' }).notNull().default(1),
  /** What an hour on the bench costs the shop, minor units of its currency; null where none is set. */
  benchRateMinor: bigint({ mode: 'number' }),
  version: version(),
  ...timestamps,
}, t => [
  check('shop_bench_rate', sql`${t.benchRateMinor} is null or ${t.benchRateMinor} >= 0`),
  check('shop_guard_factor', sql`${t.guardFactor} between 0 and 3`),
  check('shop_is_one_row', sql`${t.id} = 1`),
  check('shop_region_is_itu', sql`${t.ituRegion} between 1 and 3`),
  check('shop_currency_is_iso', sql`${t.currency} ~ '^[A-Z]{3}$'`),
])

/** The last running number given out per kind of tag. Locked by the transaction that takes the next, so numbers have no gaps. */
export const tagCounters = pgTable('tag_counters', {
  kind: text().primaryKey(),
  last: integer().notNull().default(0),
}, t => [check('tag_counters_kind', sql`${t.kind} in ('U', 'K', 'P', 'L', 'B')`)])

export const partyKind = pgEnum('party_kind', ['person', 'business'])

/** Those we buy from, hold for and sell to. Kept apart from units, so that names can be erased while the accounts stay right. */
export const parties = pgTable('parties', {
  id: uuid().primaryKey().defaultRandom(),
  name: text().notNull(),
  kind: partyKind().notNull().default('person'),
  contact: text().notNull().default(''),
  version: version(),
  ...timestamps,
})
