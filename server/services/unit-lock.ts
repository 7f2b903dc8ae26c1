import { eq } from 'drizzle-orm'
import { units } from '../../drizzle/schema'
import { formatTag } from '../../shared/domain/tag'
import type { Database } from '../utils/db'
import { notFound } from '../utils/errors'

export type UnitRow = typeof units.$inferSelect

/** The unit with this compact tag, or 404. */
export async function getUnitRow(db: Database, tag: string): Promise<UnitRow> {
  const [unit] = await db.select().from(units).where(eq(units.tag, tag))
  if (!unit) throw noSuchUnit(tag)
  return unit
}

/**
 * The same, locked until the transaction ends: two writes to one unit take turns. Lock order everywhere: the unit first,
 * then what belongs to it.
 */
export async function lockUnit(tx: Database, tag: string): Promise<UnitRow> {
  const [unit] = await tx.select().from(units).where(eq(units.tag, tag)).for('update')
  if (!unit) throw noSuchUnit(tag)
  return unit
}

function noSuchUnit(tag: string) {
  return notFound(`No unit has the tag ${formatTag(tag)}.`, 'no-such-unit')
}
