import { eq, sql } from 'drizzle-orm'
import { tagCounters } from '../../drizzle/schema'
import type { TagKind } from '../../shared/domain/tag'
import { makeTag } from '../../shared/domain/tag'
import type { Database } from '../utils/db'

/**
 * The next tag of a kind. The counter's row stays locked until the transaction ends, so that numbers run without a gap
 * (margin-scheme stock books ask for an unbroken sequence).
 */
export async function takeTag(tx: Database, kind: TagKind): Promise<string> {
  const [row] = await tx.update(tagCounters).set({ last: sql`${tagCounters.last} + 1` }).where(eq(tagCounters.kind, kind)).returning({ last: tagCounters.last })
  if (!row) throw new Error(`No counter for tags of kind ${kind}`)
  return makeTag(kind, row.last)
}
