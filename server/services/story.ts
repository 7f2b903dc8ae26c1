import { and, desc, eq, lt, notInArray } from 'drizzle-orm'
import { ledger, people } from '../../drizzle/schema'
import { eventsHiddenFrom, tellEvent } from '../../shared/domain/story'
import type { Page } from '../../shared/types/page'
import type { Person } from '../../shared/types/person'
import type { StoryEntry } from '../../shared/types/unit'
import type { Database } from '../utils/db'
import { badRequest } from '../utils/errors'
import { getUnitRow } from './unit-lock'

/** Where a page of the story ended, opaque to the client. */
const toCursor = (id: number) => Buffer.from(String(id)).toString('base64url')

function fromCursor(cursor: string): number {
  const id = Number(Buffer.from(cursor, 'base64url').toString())
  if (!Number.isSafeInteger(id) || id < 1) throw badRequest('bad-cursor', 'That cursor is not one of ours. Start again from the first page.')
  return id
}

/**
 * The ledger of a unit in plain words, newest first; entries with money or names the reader may not see are left out.
 * 404 if there is no such unit, 400 for a cursor that is not ours.
 */
export async function listStory(
  db: Database, reader: Pick<Person, 'role'>, { tag, limit, cursor }: { tag: string, limit: number, cursor?: string },
): Promise<Page<StoryEntry>> {
  const unit = await getUnitRow(db, tag)
  const hidden = eventsHiddenFrom(reader.role)
  const rows = await db.select({ id: ledger.id, at: ledger.at, who: people.name, event: ledger.event, details: ledger.details }).from(ledger)
    .leftJoin(people, eq(people.id, ledger.personId))
    .where(and(
      eq(ledger.unitId, unit.id),
      hidden.length > 0 ? notInArray(ledger.event, hidden) : undefined,
      cursor === undefined ? undefined : lt(ledger.id, fromCursor(cursor)),
    ))
    .orderBy(desc(ledger.id)).limit(limit + 1)
  const shown = rows.slice(0, limit)
  const last = shown.at(-1)
  return {
    items: shown.map(({ details, at, ...entry }) => ({ ...entry, at: at.toISOString(), ...tellEvent(entry.event, details) })),
    nextCursor: rows.length > limit && last ? toCursor(last.id) : null,
  }
}
