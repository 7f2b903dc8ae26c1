import { sql } from 'drizzle-orm'
import { bigint, boolean, check, index, integer, jsonb, pgEnum, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { ROLES } from '../../shared/domain/roles'
import { instant, timestamps, version } from './columns'

export const role = pgEnum('role', ROLES)

/** Those who sign in. Never deleted: their name stands in the ledger. */
export const people = pgTable('people', {
  id: uuid().primaryKey().defaultRandom(),
  email: text().notNull(),
  name: text().notNull(),
  role: role().notNull(),
  passwordHash: text().notNull(),
  /** Set when the person may no longer sign in. */
  disabledAt: instant(),
  /** A password set by somebody else must be changed at the first sign-in. */
  mustChangePassword: boolean().notNull().default(false),
  version: version(),
  ...timestamps,
}, t => [
  uniqueIndex('people_email_key').on(t.email),
  check('people_email_is_lower_case', sql`${t.email} = lower(${t.email})`),
])

/** One sign-in on one device. The sealed cookie holds only its id; revoking the row ends it at the next request. */
export const sessions = pgTable('sessions', {
  id: uuid().primaryKey().defaultRandom(),
  personId: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  /** SHA-256 of the random secret in the cookie. */
  secretHash: text().notNull(),
  device: text().notNull(),
  createdAt: instant().notNull().defaultNow(),
  lastSeenAt: instant().notNull().defaultNow(),
  expiresAt: instant().notNull(),
  revokedAt: instant(),
}, t => [index('sessions_person_idx').on(t.personId)])

/** A personal access token for scripts: only its SHA-256 is kept. */
export const accessTokens = pgTable('access_tokens', {
  id: uuid().primaryKey().defaultRandom(),
  personId: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  name: text().notNull(),
  tokenHash: text().notNull(),
  createdAt: instant().notNull().defaultNow(),
  lastUsedAt: instant(),
  revokedAt: instant(),
}, t => [
  uniqueIndex('access_tokens_hash_key').on(t.tokenHash),
  index('access_tokens_person_idx').on(t.personId),
])

/** Counters of failed sign-ins, shared by all instances. The shape is the rate limiter's own. */
export const signInLimits = pgTable('sign_in_limits', {
  key: text().primaryKey(),
  points: integer().notNull().default(0),
  expire: bigint({ mode: 'number' }),
})

/** A write that a phone may send twice happens once: the answer of the first is kept, in the same transaction. */
export const idempotencyKeys = pgTable('idempotency_keys', {
  personId: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  key: text().notNull(),
  /** Method, path and SHA-256 of the body: the same key with another request is refused. */
  fingerprint: text().notNull(),
  status: integer(),
  answer: jsonb(),
  createdAt: instant().notNull().defaultNow(),
}, t => [primaryKey({ name: 'idempotency_keys_pkey', columns: [t.personId, t.key] })])
