import { sql } from 'drizzle-orm'
import { check, index, pgEnum, pgTable, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { ORIGINALITIES, WHEREABOUTS } from '../../shared/domain/kept-with'
import { instant, timestamps, version } from './columns'
import { locations } from './locations'
import { keptWithKind, modelKitItems } from './models'
import { people } from './people'
import { units } from './units'

export const originality = pgEnum('originality', ORIGINALITIES)
export const whereabouts = pgEnum('whereabouts', WHEREABOUTS)

/** Manual, lead, probe, bag of removed parts: belongs to one unit and must leave with it. */
export const keptWithItems = pgTable('kept_with_items', {
  id: uuid().primaryKey().defaultRandom(),
  tag: text().notNull(),
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  /** Which line of the model's kit it answers, if any. */
  kitItemId: uuid().references(() => modelKitItems.id, { onDelete: 'set null' }),
  kind: keptWithKind().notNull(),
  description: text().notNull(),
  originality: originality().notNull(),
  condition: text().notNull().default(''),
  whereabouts: whereabouts().notNull().default('with_unit'),
  /** Where it is when it is elsewhere. */
  locationId: uuid().references(() => locations.id, { onDelete: 'restrict' }),
  missingSince: instant(),
  /** What the buyer is told of its absence; dispatch is refused while it is missing and this is empty. */
  absenceDisclosed: text().notNull().default(''),
  packedAt: instant(),
  packedBy: uuid().references(() => people.id, { onDelete: 'restrict' }),
  removedAt: instant(),
  version: version(),
  ...timestamps,
}, t => [
  uniqueIndex('kept_with_items_tag_key').on(t.tag),
  index('kept_with_items_unit_idx').on(t.unitId),
  check('kept_with_items_tag_form', sql`${t.tag} ~ '^K[0-9]{5,}[0-9A-Z]$'`),
  check('kept_with_items_elsewhere_is_somewhere', sql`(${t.whereabouts} = 'elsewhere') = (${t.locationId} is not null)`),
  check('kept_with_items_missing_since', sql`(${t.whereabouts} = 'missing') = (${t.missingSince} is not null)`),
  check('kept_with_items_packed_by', sql`(${t.packedAt} is null) = (${t.packedBy} is null)`),
])
