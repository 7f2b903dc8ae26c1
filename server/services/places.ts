import { eq } from 'drizzle-orm'
import { locationPaths, locations } from '../../drizzle/schema'
import { formatTag } from '../../shared/domain/tag'
import type { PlaceView } from '../../shared/types/unit'
import type { Database } from '../utils/db'
import { invalid } from '../utils/errors'

/** A place by its row's id, with its path from the room inwards; null for none. */
export async function findPlace(db: Database, locationId: string | null): Promise<PlaceView | null> {
  if (locationId === null) return null
  const [place] = await db.select({ tag: locations.tag, path: locationPaths.path }).from(locations)
    .innerJoin(locationPaths, eq(locationPaths.id, locations.id)).where(eq(locations.id, locationId))
  return place ?? null
}

/** The row behind a place's tag as a form names it; 422 at `field` if there is none or it is no longer used. */
export async function placeForField(db: Database, tag: string, field: string): Promise<{ id: string, path: string }> {
  const [place] = await db.select({ id: locations.id, path: locationPaths.path, retiredAt: locations.retiredAt }).from(locations)
    .innerJoin(locationPaths, eq(locationPaths.id, locations.id)).where(eq(locations.tag, tag))
  if (!place) throw invalid([{ path: field, message: `No place has the tag ${formatTag(tag)}` }])
  if (place.retiredAt) throw invalid([{ path: field, message: `${place.path} is no longer used: choose another place` }])
  return { id: place.id, path: place.path }
}
