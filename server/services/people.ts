import { eq, sql } from 'drizzle-orm'
import { people } from '../../drizzle/schema'
import type { Role } from '../../shared/domain/roles'
import type { Database } from '../utils/db'
import { invalid } from '../utils/errors'
import { sealPassword } from '../utils/password'
import { violates } from '../utils/pg-errors'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'

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

async function refuseTakenEmail<T>(write: () => Promise<T>): Promise<T> {
  try {
    return await write()
  } catch (error) {
    if (violates(error, 'people_email_key')) throw invalid([{ path: 'email', message: 'Somebody with this e-mail is here already' }])
    throw error
  }
}
