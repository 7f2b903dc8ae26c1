import { randomInt } from 'node:crypto'
import { consola } from 'consola'
import type { SQL } from 'drizzle-orm'
import { and, eq, isNull, max, sql } from 'drizzle-orm'
import { people, sessions } from '../../drizzle/schema'
import type { Role } from '../../shared/domain/roles'
import type { NewPerson, PasswordChange, PersonChange } from '../../shared/schemas/people'
import type { PersonView, PersonWithPassword } from '../../shared/types/account'
import type { Person } from '../../shared/types/person'
import type { Database } from '../utils/db'
import { conflict, invalid, notFound, stale } from '../utils/errors'
import { passwordMatches, sealPassword } from '../utils/password'
import { violates } from '../utils/pg-errors'
import type { SignInLimits } from '../utils/sign-in-limits'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'
import { endSessions } from './sessions'
import { revokeTokens } from './tokens'

export interface NewPersonRow { name: string, email: string, role: Role, password: string, mustChangePassword: boolean }

/**
 * Writes a person down and gives their id. `actor` is null only for the first owner and the demo shop; the e-mail is lower
 * case. 422 if it is somebody's already.
 */
export async function writePerson(db: Database, actor: Actor | null, { password, ...row }: NewPersonRow): Promise<string> {
  const passwordHash = await sealPassword(password)
  return refuseTakenEmail(() => db.transaction(async (tx) => {
    const [made] = await tx.insert(people).values({ ...row, passwordHash }).returning({ id: people.id })
    if (!made) throw new Error('The person was not written')
    await appendLedger(tx, actor ?? made, { kind: 'person', id: made.id }, 'created', { name: row.name })
    return made.id
  }))
}

/** The id behind an e-mail of somebody who may sign in; null if there is none. */
export async function findPersonByEmail(db: Database, email: string): Promise<Actor | null> {
  const [row] = await db.select({ id: people.id, disabledAt: people.disabledAt }).from(people).where(eq(people.email, email.trim().toLowerCase()))
  return row && !row.disabledAt ? { id: row.id } : null
}

/** Whether nobody has been written down yet, so that the next page is the one that makes the owner's account. */
export async function isFirstRun(db: Database): Promise<boolean> {
  const { rows } = await db.execute<{ empty: boolean }>(sql`select not exists (select from ${people}) as empty`)
  return rows[0]?.empty ?? true
}

/** Everybody who ever signed in here, those who still may first, by name. */
export async function listPeople(db: Database): Promise<PersonView[]> {
  return selectPeople(db)
}

/** Adds a person with a password made for them, which they must change when they first sign in. */
export async function addPerson(db: Database, actor: Actor, input: NewPerson): Promise<PersonWithPassword> {
  const password = makePassword()
  const id = await writePerson(db, actor, { ...input, password, mustChangePassword: true })
  return { person: await getPerson(db, id), password }
}

/**
 * Changes a person's name, role or right to sign in. The owners' rows are locked first, in one order, so that of two
 * owners who disable each other at the same moment one is told that they are the last. Disabling ends their sessions.
 */
export async function changePerson(db: Database, actor: Actor, id: string, change: PersonChange): Promise<PersonView> {
  await db.transaction(async (tx) => {
    const owners = await lockOwners(tx)
    const row = await lockPerson(tx, id)
    if (row.version !== change.version) throw stale('person', await getPerson(tx, id))
    const role = change.role ?? row.role
    const disabled = change.disabled ?? row.disabledAt !== null
    if (owners.length === 1 && owners[0] === id && (role !== 'owner' || disabled)) {
      throw conflict('last-owner', `${row.name} is the only owner. Make somebody else an owner first: a shop without one cannot be managed.`)
    }
    await tx.update(people).set({
      name: change.name ?? row.name, role, version: sql`${people.version} + 1`,
      disabledAt: disabled ? row.disabledAt ?? sql`now()` : null,
    }).where(eq(people.id, id))
    if (disabled && !row.disabledAt) await endSessions(tx, id)
    await recordChange(tx, actor, row, { name: change.name ?? row.name, role, disabled })
  })
  return getPerson(db, id)
}

/** Gives a person a new password to sign in with once, and ends their sessions and tokens: the old one may be known to others. */
export async function resetPassword(db: Database, actor: Actor, id: string): Promise<PersonWithPassword> {
  const password = makePassword()
  const passwordHash = await sealPassword(password)
  await db.transaction(async (tx) => {
    const row = await lockPerson(tx, id)
    await tx.update(people).set({ passwordHash, mustChangePassword: true, version: sql`${people.version} + 1` }).where(eq(people.id, id))
    await endSessions(tx, id)
    await revokeTokens(tx, id)
    await appendLedger(tx, actor, { kind: 'person', id }, 'changed', { name: row.name, changes: [{ field: 'password', from: null, to: null }] })
  })
  consola.info(`Password reset: person ${id}, by person ${actor.id}`)
  return { person: await getPerson(db, id), password }
}

/** Signs a person out everywhere; gives the number of sign-ins that ended. */
export async function signOutEverywhere(db: Database, actor: Actor, id: string): Promise<{ ended: number }> {
  const ended = await db.transaction(async (tx) => {
    const row = await lockPerson(tx, id)
    const count = await endSessions(tx, id)
    await appendLedger(tx, actor, { kind: 'person', id }, 'changed', { name: row.name, changes: [{ field: 'sign-ins', from: String(count), to: '0' }] })
    return count
  })
  consola.info(`Sessions ended: ${ended} of person ${id}, by person ${actor.id}`)
  return { ended }
}

/**
 * A person chooses a new password; their other sessions end. Wrong guesses at the present one are slowed down as at
 * sign-in. 422 at the field if it is wrong.
 */
export async function changePassword(
  db: Database, limits: SignInLimits, actor: Person, sessionId: string | null, input: PasswordChange, address: string,
): Promise<void> {
  const tried = { email: actor.email, address }
  await limits.spend(tried)
  const [row] = await db.select({ passwordHash: people.passwordHash }).from(people).where(eq(people.id, actor.id))
  if (!await passwordMatches(row?.passwordHash ?? null, input.current)) {
    throw invalid([{ path: 'current', message: 'Present password is wrong' }])
  }
  await limits.forgive(tried)
  const passwordHash = await sealPassword(input.next)
  await db.transaction(async (tx) => {
    await tx.update(people).set({ passwordHash, mustChangePassword: false, version: sql`${people.version} + 1` }).where(eq(people.id, actor.id))
    await endSessions(tx, actor.id, sessionId)
    await appendLedger(tx, actor, { kind: 'person', id: actor.id }, 'changed', { name: actor.name, changes: [{ field: 'password', from: null, to: null }] })
  })
  consola.info(`Password changed: person ${actor.id}, from ${address}`)
}

/** Letters and figures that no hand confuses: 31 of them, 16 drawn, 79 bits. */
const CLEAR = 'abcdefghjkmnpqrstuvwxyz23456789'
function makePassword(): string {
  const drawn = Array.from({ length: 16 }, () => CLEAR[randomInt(CLEAR.length)]).join('')
  return drawn.replace(/.{4}(?=.)/g, '$&-')
}

async function lockOwners(tx: Database): Promise<string[]> {
  const rows = await tx.select({ id: people.id }).from(people).where(and(eq(people.role, 'owner'), isNull(people.disabledAt))).orderBy(people.id).for('update')
  return rows.map(({ id }) => id)
}

async function lockPerson(tx: Database, id: string) {
  const [row] = await tx.select().from(people).where(eq(people.id, id)).for('update')
  if (!row) throw noSuchPerson()
  return row
}

const noSuchPerson = () => notFound('Nobody here answers to this address.', 'no-such-person')

async function recordChange(
  tx: Database, actor: Actor, before: { id: string, name: string, role: Role, disabledAt: Date | null }, after: { name: string, role: Role, disabled: boolean },
): Promise<void> {
  const subject = { kind: 'person', id: before.id } as const
  if (before.role !== after.role) await appendLedger(tx, actor, subject, 'role_changed', { name: after.name, from: before.role, to: after.role })
  const changes = [
    ...before.name === after.name ? [] : [{ field: 'name', from: before.name, to: after.name }],
    ...(before.disabledAt !== null) === after.disabled ? [] : [{ field: 'may sign in', from: after.disabled ? 'yes' : 'no', to: after.disabled ? 'no' : 'yes' }],
  ]
  if (changes.length) await appendLedger(tx, actor, subject, 'changed', { name: after.name, changes })
}

async function getPerson(db: Database, id: string): Promise<PersonView> {
  const [view] = await selectPeople(db, eq(people.id, id))
  if (!view) throw noSuchPerson()
  return view
}

async function selectPeople(db: Database, where?: SQL): Promise<PersonView[]> {
  const rows = await db.select({
    id: people.id, name: people.name, email: people.email, role: people.role, disabledAt: people.disabledAt,
    mustChangePassword: people.mustChangePassword, version: people.version,
    lastSeenAt: max(sessions.lastSeenAt),
    openSessions: sql<number>`count(${sessions.id}) filter (where ${sessions.revokedAt} is null and ${sessions.expiresAt} > now())`.mapWith(Number),
  }).from(people).leftJoin(sessions, eq(sessions.personId, people.id)).where(where)
    .groupBy(people.id).orderBy(sql`${people.disabledAt} is not null`, people.name, people.id)
  return rows.map(row => ({ ...row, disabledAt: row.disabledAt?.toISOString() ?? null, lastSeenAt: row.lastSeenAt?.toISOString() ?? null }))
}

async function refuseTakenEmail<T>(write: () => Promise<T>): Promise<T> {
  try {
    return await write()
  } catch (error) {
    if (violates(error, 'people_email_key')) throw invalid([{ path: 'email', message: 'Somebody with this e-mail is here already' }])
    throw error
  }
}
