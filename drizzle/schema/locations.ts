import { sql } from 'drizzle-orm'
import { type AnyPgColumn, check, index, pgEnum, pgTable, pgView, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { LOCATION_KINDS } from '../../shared/domain/locations'
import { instant, timestamps, version } from './columns'

export const locationKind = pgEnum('location_kind', LOCATION_KINDS)

/** Rooms, bays, shelves and bins, as a tree. */
export const locations = pgTable('locations', {
  id: uuid().primaryKey().defaultRandom(),
  tag: text().notNull(),
  kind: locationKind().notNull(),
  name: text().notNull(),
  parentId: uuid().references((): AnyPgColumn => locations.id, { onDelete: 'restrict' }),
  note: text().notNull().default(''),
  retiredAt: instant(),
  version: version(),
  ...timestamps,
}, t => [
  uniqueIndex('locations_tag_key').on(t.tag),
  // No two places of one name side by side; coalesce because null parents would not count as equal.
  uniqueIndex('locations_name_key').on(sql`coalesce(${t.parentId}, '00000000-0000-0000-0000-000000000000'::uuid)`, sql`lower(${t.name})`),
  index('locations_parent_idx').on(t.parentId),
  check('locations_room_is_top', sql`(${t.kind} = 'room') = (${t.parentId} is null)`),
  check('locations_not_in_itself', sql`${t.parentId} is distinct from ${t.id}`),
  check('locations_tag_form', sql`${t.tag} ~ '^L[0-9]{5,}[0-9A-Z]$'`),
])

/** A place's names from the room inwards, and the places it stands in, itself last. The view is made by a migration. */
export const locationPaths = pgView('location_paths', {
  id: uuid().notNull(),
  names: text().array().notNull(),
  ids: uuid().array().notNull(),
  path: text().notNull(),
}).existing()
