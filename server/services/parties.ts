import { asc, eq, sql } from 'drizzle-orm'
import { parties } from '../../drizzle/schema'
import type { Database } from '../utils/db'

/** The name behind a party's row; null for none. Only for those who may read names. */
export async function findPartyName(db: Database, id: string | null): Promise<string | null> {
  if (id === null) return null
  const [party] = await db.select({ name: parties.name }).from(parties).where(eq(parties.id, id))
  return party?.name ?? null
}

/** The party of this name, made if nobody has it; null for no name. Two people of one name are one party until somebody tells them apart. */
export async function partyNamed(tx: Database, name: string): Promise<string | null> {
  if (name === '') return null
  const [known] = await tx.select({ id: parties.id }).from(parties).where(sql`lower(${parties.name}) = lower(${name})`).orderBy(asc(parties.createdAt)).limit(1)
  if (known) return known.id
  const [made] = await tx.insert(parties).values({ name }).returning({ id: parties.id })
  if (!made) throw new Error('A party was not written')
  return made.id
}
