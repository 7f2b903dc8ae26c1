import { and, desc, eq, isNull, sql } from 'drizzle-orm'
import { consola } from 'consola'
import { accessTokens } from '../../drizzle/schema'
import type { MadeToken, TokenView } from '../../shared/types/account'
import type { Database } from '../utils/db'
import { forbidden, notFound } from '../utils/errors'
import { randomSecret, sha256 } from '../utils/person'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'

/** So that a token is recognised where it should not be, in a log or a public file. */
export const TOKEN_PREFIX = 'knurl_'

type TokenRow = typeof accessTokens.$inferSelect

/** Makes a personal access token: the secret is in the answer and nowhere else. */
export async function makeToken(db: Database, actor: Actor, name: string): Promise<MadeToken> {
  const token = TOKEN_PREFIX + randomSecret()
  const made = await db.transaction(async (tx) => {
    const [row] = await tx.insert(accessTokens).values({ personId: actor.id, name, tokenHash: sha256(token) }).returning()
    if (!row) throw new Error('The token was not written')
    await appendLedger(tx, actor, { kind: 'person', id: actor.id }, 'changed', { name: 'Access tokens', changes: [{ field: 'token', from: null, to: name }] })
    return row
  })
  consola.info(`Token made: ${made.id}, by person ${actor.id}`)
  return { ...toTokenView(made), token }
}

/** The same, for somebody signed in by the sign-in page: a token that got out must not be able to make its successor. */
export async function makeTokenInSession(db: Database, actor: Actor, sessionId: string | null, name: string): Promise<MadeToken> {
  if (sessionId === null) throw forbidden('Sign in on the sign-in page to make a token: a token cannot make another.', 'session-needed')
  return makeToken(db, actor, name)
}

/** A person's own tokens that still work, the newest first. */
export async function listTokens(db: Database, actor: Actor): Promise<TokenView[]> {
  const rows = await db.select().from(accessTokens).where(standing(actor.id)).orderBy(desc(accessTokens.createdAt))
  return rows.map(toTokenView)
}

/** Ends one of a person's own tokens; 404 for anybody else's. */
export async function revokeToken(db: Database, actor: Actor, id: string): Promise<void> {
  await db.transaction(async (tx) => {
    const [row] = await tx.update(accessTokens).set({ revokedAt: sql`now()` }).where(and(eq(accessTokens.id, id), standing(actor.id))).returning()
    if (!row) throw notFound('That token has already been revoked.', 'no-such-token')
    await appendLedger(tx, actor, { kind: 'person', id: actor.id }, 'changed', { name: 'Access tokens', changes: [{ field: 'token', from: row.name, to: null }] })
  })
  consola.info(`Token revoked: ${id}, by person ${actor.id}`)
}

/** Ends every token of a person; gives their number. */
export async function revokeTokens(tx: Database, personId: string): Promise<number> {
  const ended = await tx.update(accessTokens).set({ revokedAt: sql`now()` }).where(standing(personId)).returning({ id: accessTokens.id })
  return ended.length
}

const standing = (personId: string) => and(eq(accessTokens.personId, personId), isNull(accessTokens.revokedAt))

function toTokenView(row: TokenRow): TokenView {
  return { id: row.id, name: row.name, createdAt: row.createdAt.toISOString(), lastUsedAt: row.lastUsedAt?.toISOString() ?? null }
}
