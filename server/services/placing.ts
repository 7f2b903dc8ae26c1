import { eq, sql } from 'drizzle-orm'
import { locations, units } from '../../drizzle/schema'
import { formatTag } from '../../shared/domain/tag'
import type { UnitPlacing } from '../../shared/schemas/locations'
import type { PlacedUnit } from '../../shared/types/location'
import type { Database } from '../utils/db'
import { conflict, stale } from '../utils/errors'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import { findPlace, placeForField } from './places'
import { lockUnit } from './unit-lock'

/**
 * Puts a unit in a place, or in none, and tells where it came from. Putting it where it is already is no move and leaves no
 * entry. 409 for a stale version if one is given, and for a unit that has left the shop; 422 for a place that is not used.
 */
export async function putUnit(db: Database, actor: Actor, { tag, locationTag, why, version }: UnitPlacing & { tag: string }): Promise<PlacedUnit> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    const from = await findPlace(tx, unit.locationId)
    if (version !== undefined && version !== unit.version) throw stale('unit', { tag, place: from, version: unit.version })
    if (unit.state === 'dispatched') throw conflict('unit-dispatched', `${formatTag(tag)} has been dispatched, so it stands nowhere in the shop.`)
    if (locationTag !== null) await tx.select({ id: locations.id }).from(locations).where(eq(locations.tag, locationTag)).for('key share')
    const to = locationTag === null ? null : await placeForField(tx, locationTag, 'locationTag')
    if ((to?.id ?? null) === unit.locationId) return { tag, place: from, version: unit.version }
    const [moved] = await tx.update(units).set({ locationId: to?.id ?? null, version: sql`${units.version} + 1` }).where(eq(units.id, unit.id))
      .returning({ version: units.version })
    await appendUnitLedger(tx, actor, unit.id, 'moved', { from: from?.path ?? null, to: to?.path ?? null, ...why ? { why } : {} })
    return { tag, place: await findPlace(tx, to?.id ?? null), version: moved?.version ?? unit.version }
  })
}
