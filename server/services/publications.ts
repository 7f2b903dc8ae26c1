import { randomBytes } from 'node:crypto'
import { and, eq, isNull, sql } from 'drizzle-orm'
import { publications } from '../../drizzle/schema'
import type { Database } from '../utils/db'
import { conflict, notFound } from '../utils/errors'
import { missingDisclosures } from './disclosures'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import { lockUnit } from './unit-lock'

export interface PublicationView { token: string, publishedAt: string }

const standing = (unitId: string) => and(eq(publications.unitId, unitId), isNull(publications.revokedAt))

/** The unit's public sheet, if it has one that has not been taken back. */
export async function findPublication(db: Database, unitId: string): Promise<PublicationView | null> {
  const [row] = await db.select().from(publications).where(standing(unitId))
  return row ? { token: row.token, publishedAt: row.publishedAt.toISOString() } : null
}

/**
 * Publishes the unit's sheet at a link nobody can guess (192 random bits; ASVS 5.0 11.5.1 asks for 128).
 * Publishing twice gives the same link. Refused (409) while something a buyer must be told is unanswered.
 */
export async function publishUnit(db: Database, actor: Actor, tag: string): Promise<PublicationView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    const already = await findPublication(tx, unit.id)
    if (already) return already
    const missing = await missingDisclosures(tx, unit.id)
    if (missing.length > 0) {
      throw conflict('disclosures-missing', `A buyer must still be told: ${missing.join(', ')}.`, {
        refusals: [{
          guard: 'disclosures', sentence: `Not answered yet: ${missing.join(', ')}.`,
          remedy: 'Answer each, or say which kind of “not known” it is.', href: `/units/${tag}/disclosures`,
        }],
      })
    }
    const token = randomBytes(24).toString('base64url')
    const [row] = await tx.insert(publications).values({ unitId: unit.id, token, publishedBy: actor.id }).returning()
    if (!row) throw new Error('The publication was not written')
    // The ledger is read by all staff, the link is the owner's to give: only its first characters are kept.
    await appendUnitLedger(tx, actor, unit.id, 'published', { token: token.slice(0, 4) })
    return { token, publishedAt: row.publishedAt.toISOString() }
  })
}

/** Takes the link back: it answers 404 from now on. A later publication gets a new one. */
export async function revokePublication(db: Database, actor: Actor, tag: string, why: string): Promise<void> {
  await db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    const revoked = await tx.update(publications).set({ revokedAt: sql`now()` }).where(standing(unit.id)).returning({ id: publications.id })
    if (revoked.length === 0) throw notFound('This unit has no public sheet to take back.')
    await appendUnitLedger(tx, actor, unit.id, 'publication_revoked', { why })
  })
}
