import { createHash, randomBytes, timingSafeEqual } from 'node:crypto'
import { and, eq, gt, isNull, sql } from 'drizzle-orm'
import type { H3Event } from 'h3'
import { getCookie, getHeader } from 'h3'
import { accessTokens, people, sessions } from '../../drizzle/schema'
import type { Person } from '../../shared/types/person'
import { readSignInConfig } from './config'
import { useDb } from './db'

/** How a request proved who it is: a browser's cookie can be ridden by another site, a token cannot. */
export interface Proof { person: Person, by: 'session' | 'token', sessionId: string | null }

const columns = {
  id: people.id, name: people.name, email: people.email, role: people.role, mustChangePassword: people.mustChangePassword,
}

export const sha256 = (text: string) => createHash('sha256').update(text).digest('hex')
/** 256 random bits as text that survives a URL. */
export const randomSecret = () => randomBytes(32).toString('base64url')

function sameHash(a: string, b: string): boolean {
  return a.length === b.length && timingSafeEqual(Buffer.from(a), Buffer.from(b))
}

/** Whoever sends the request, read afresh from the database each time: a revoked session, token or person ends at once. */
export async function findProof(event: H3Event): Promise<Proof | null> {
  const header = getHeader(event, 'authorization')
  if (header) return findByToken(header)
  // Opening a session that is not there would hand a cookie to every visitor of a public page.
  if (!getCookie(event, readSignInConfig(event).session.name)) return null
  const { secure } = await getUserSession(event)
  if (!secure) return null
  return findBySession(secure.sessionId, secure.secret)
}

async function findByToken(header: string): Promise<Proof | null> {
  const secret = /^Bearer\s+(\S{20,200})$/i.exec(header)?.[1]
  if (!secret) return null
  const db = useDb()
  const hash = sha256(secret)
  const [row] = await db.select({ person: columns, tokenId: accessTokens.id }).from(accessTokens)
    .innerJoin(people, eq(people.id, accessTokens.personId))
    .where(and(eq(accessTokens.tokenHash, hash), isNull(accessTokens.revokedAt), isNull(people.disabledAt)))
  if (!row) return null
  await db.update(accessTokens).set({ lastUsedAt: sql`now()` })
    .where(and(eq(accessTokens.id, row.tokenId), sql`${accessTokens.lastUsedAt} is null or ${accessTokens.lastUsedAt} < now() - interval '1 minute'`))
  return { person: row.person, by: 'token', sessionId: null }
}

async function findBySession(sessionId: string, secret: string): Promise<Proof | null> {
  const db = useDb()
  const [row] = await db.select({ person: columns, secretHash: sessions.secretHash }).from(sessions)
    .innerJoin(people, eq(people.id, sessions.personId))
    .where(and(eq(sessions.id, sessionId), isNull(sessions.revokedAt), gt(sessions.expiresAt, sql`now()`), isNull(people.disabledAt)))
  if (!row || !sameHash(row.secretHash, sha256(secret))) return null
  await db.update(sessions).set({ lastSeenAt: sql`now()` })
    .where(and(eq(sessions.id, sessionId), sql`${sessions.lastSeenAt} < now() - interval '1 minute'`))
  return { person: row.person, by: 'session', sessionId }
}
