import { and, desc, eq, gt, isNull, ne, sql } from 'drizzle-orm'
import { consola } from 'consola'
import { people, sessions } from '../../drizzle/schema'
import type { SignInInput } from '../../shared/schemas/sign-in'
import type { Person } from '../../shared/types/person'
import type { SessionView } from '../../shared/types/account'
import type { Database } from '../utils/db'
import { notFound, signInNeeded } from '../utils/errors'
import type { Origin } from '../utils/origin'
import { passwordMatches } from '../utils/password'
import { randomSecret, sha256 } from '../utils/person'
import type { SignInLimits } from '../utils/sign-in-limits'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'

/** What the sealed cookie carries. The secret is never stored, only its hash. */
export interface OpenedSession { personId: string, sessionId: string, secret: string }

/** How long a sign-in lasts, in seconds, and the session of this browser that it replaces. */
interface Terms { lifetimeSeconds: number, replaces: string | null }

/**
 * Signs a person in. An unknown e-mail, a wrong password and a disabled person get the same 401 after the same work; 429
 * after too many tries. The log names the person's id, never the e-mail or the password (OWASP ASVS 5.0, 16.3.1).
 */
export async function signIn(db: Database, limits: SignInLimits, input: SignInInput, origin: Origin, terms: Terms): Promise<OpenedSession & { person: Person }> {
  const tried = { email: input.email, address: origin.address }
  await limits.spend(tried)
  const [row] = await db.select().from(people).where(eq(people.email, input.email))
  const matches = await passwordMatches(row?.passwordHash ?? null, input.password)
  if (!row || !matches || row.disabledAt) {
    consola.info(`Sign-in refused: ${row ? `person ${row.id}${matches ? ', disabled' : ''}` : 'nobody of that name'}, from ${origin.address}`)
    throw signInNeeded('E-mail or password is wrong. Check both and try again.', 'wrong-sign-in')
  }
  await limits.forgive(tried)
  const opened = await openSession(db, row, origin, terms)
  return { ...opened, person: { id: row.id, name: row.name, email: row.email, role: row.role, mustChangePassword: row.mustChangePassword } }
}

/** Opens a session for somebody who has proved who they are. */
export async function openSession(db: Database, person: Actor, origin: Origin, { lifetimeSeconds, replaces }: Terms): Promise<OpenedSession> {
  const secret = randomSecret()
  const sessionId = await db.transaction(async (tx) => {
    if (replaces) await tx.update(sessions).set({ revokedAt: sql`now()` }).where(and(eq(sessions.id, replaces), isNull(sessions.revokedAt)))
    const [made] = await tx.insert(sessions).values({
      personId: person.id, secretHash: sha256(secret), device: origin.device,
      expiresAt: sql`now() + make_interval(secs => ${lifetimeSeconds})`,
    }).returning({ id: sessions.id })
    if (!made) throw new Error('The session was not written')
    await appendLedger(tx, person, { kind: 'person', id: person.id }, 'signed_in', { from: origin.device })
    return made.id
  })
  consola.info(`Signed in: person ${person.id}, session ${sessionId}, from ${origin.address}`)
  return { personId: person.id, sessionId, secret }
}

/** Ends the session of this browser; the cookie is the route's to clear. */
export async function signOut(db: Database, sessionId: string | null): Promise<void> {
  if (sessionId === null) return
  await db.update(sessions).set({ revokedAt: sql`now()` }).where(and(eq(sessions.id, sessionId), isNull(sessions.revokedAt)))
  consola.info(`Signed out: session ${sessionId}`)
}

const standing = (personId: string) => and(eq(sessions.personId, personId), isNull(sessions.revokedAt), gt(sessions.expiresAt, sql`now()`))

/** A person's own sign-ins that still stand, the latest used first. */
export async function listSessions(db: Database, actor: Actor, currentId: string | null): Promise<SessionView[]> {
  const rows = await db.select().from(sessions).where(standing(actor.id)).orderBy(desc(sessions.lastSeenAt))
  return rows.map(row => ({
    id: row.id, device: row.device, createdAt: row.createdAt.toISOString(), lastSeenAt: row.lastSeenAt.toISOString(),
    expiresAt: row.expiresAt.toISOString(), isCurrent: row.id === currentId,
  }))
}

/** Ends one of a person's own sign-ins; 404 for anybody else's. */
export async function revokeSession(db: Database, actor: Actor, id: string): Promise<void> {
  const ended = await db.update(sessions).set({ revokedAt: sql`now()` }).where(and(eq(sessions.id, id), standing(actor.id))).returning({ id: sessions.id })
  if (ended.length === 0) throw notFound('That sign-in has already ended.', 'no-such-session')
  consola.info(`Session ended: ${id}, by person ${actor.id}`)
}

/** Ends every sign-in of a person but the one named; gives their number. */
export async function endSessions(tx: Database, personId: string, exceptId: string | null = null): Promise<number> {
  const which = exceptId ? and(standing(personId), ne(sessions.id, exceptId)) : standing(personId)
  const ended = await tx.update(sessions).set({ revokedAt: sql`now()` }).where(which).returning({ id: sessions.id })
  return ended.length
}
