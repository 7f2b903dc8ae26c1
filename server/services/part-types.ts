import { and, eq, sql } from 'drizzle-orm'
import { partTypes } from '../../drizzle/schema'
import type { PartTypeInput } from '../../shared/schemas/part-lot'
import type { PartTypeView } from '../../shared/types/part'
import type { Database } from '../utils/db'
import { violates } from '../utils/pg-errors'

type PartTypeRow = typeof partTypes.$inferSelect

/** What a part is, as a response holds it. */
export function toPartTypeView({ id, kind, description, value, tolerance, rating, package: packageOrBase, countedIn, minimum, version }: PartTypeRow): PartTypeView {
  return { id, kind, description, value, tolerance, rating, package: packageOrBase, countedIn, minimum, version }
}

async function findType(db: Database, said: PartTypeInput): Promise<PartTypeRow | null> {
  const [row] = await db.select().from(partTypes).where(and(
    eq(partTypes.kind, said.kind),
    eq(partTypes.countedIn, said.countedIn),
    eq(sql`lower(${partTypes.description})`, sql`lower(${said.description})`),
    eq(sql`lower(${partTypes.value})`, sql`lower(${said.value})`),
    eq(sql`lower(${partTypes.tolerance})`, sql`lower(${said.tolerance})`),
    eq(sql`lower(${partTypes.rating})`, sql`lower(${said.rating})`),
    eq(sql`lower(${partTypes.package})`, sql`lower(${said.package})`),
  ))
  return row ?? null
}

/** The type of a part described like this, made if there is none: letters' case makes no difference. Two at once make one. */
export async function findOrAddPartType(tx: Database, { kind, description, value, tolerance, rating, package: packageOrBase, countedIn }: PartTypeInput): Promise<PartTypeRow> {
  const said = { kind, description, value, tolerance, rating, package: packageOrBase, countedIn }
  const known = await findType(tx, said)
  if (known) return known
  try {
    // In a savepoint: when another made it a moment ago, the transaction goes on with theirs.
    return await tx.transaction(async (point) => {
      const [made] = await point.insert(partTypes).values(said).returning()
      if (!made) throw new Error('A type of part was not written')
      return made
    })
  } catch (error) {
    const theirs = violates(error, 'part_types_key') ? await findType(tx, said) : null
    if (theirs) return theirs
    throw error
  }
}
