import { eq } from 'drizzle-orm'
import { units } from '../../drizzle/schema'
import { parseTag, tagProblemSentence } from '../../shared/domain/tag'
import type { Database } from '../utils/db'
import { notFound } from '../utils/errors'
import { findPublication } from './publications'
import { findTagged } from './tagged-things'

/**
 * Where the address in a label's code leads. Staff: to the record. Anybody else: to the unit's public sheet if one
 * stands, else to sign-in, whether there is such a thing or not. 404 in words for a tag that cannot be one, and, to
 * staff, for one that nothing has.
 */
export async function findLabelTarget(db: Database, isStaff: boolean, typed: string): Promise<string> {
  const read = parseTag(typed)
  if (!read.ok) throw notFound(tagProblemSentence(read.reason), read.reason)
  if (isStaff) {
    const [thing] = await findTagged(db, [read.tag])
    return thing?.href ?? '/scan'
  }
  return await findPublicSheet(db, read.tag) ?? `/sign-in?next=${encodeURIComponent(`/s/${read.tag}`)}`
}

async function findPublicSheet(db: Database, tag: string): Promise<string | null> {
  const [unit] = await db.select({ id: units.id }).from(units).where(eq(units.tag, tag))
  const publication = unit ? await findPublication(db, unit.id) : null
  return publication && `/p/${publication.token}`
}
