import { sql } from 'drizzle-orm'
import { bigint, check, date, index, integer, pgEnum, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { DISCLOSURE_KEYS } from '../../shared/domain/disclosures'
import { KNOWLEDGE } from '../../shared/domain/knowledge'
import { UNIT_STATES } from '../../shared/domain/unit-state-names'
import { OWNERSHIPS, SOURCE_KINDS } from '../../shared/domain/acquisition'
import { instant, int8multirange, timestamps, version } from './columns'
import { locations } from './locations'
import { coverageFunction, models } from './models'
import { people } from './people'
import { parties } from './shop'

export const unitState = pgEnum('unit_state', UNIT_STATES)
export const knowledge = pgEnum('knowledge', KNOWLEDGE)
export const ownership = pgEnum('ownership', OWNERSHIPS)
export const sourceKind = pgEnum('source_kind', SOURCE_KINDS)
export const disclosureKey = pgEnum('disclosure_key', DISCLOSURE_KEYS)

/** One physical piece. */
export const units = pgTable('units', {
  id: uuid().primaryKey().defaultRandom(),
  tag: text().notNull(),
  modelId: uuid().notNull().references(() => models.id, { onDelete: 'restrict' }),
  serialAnswer: knowledge().notNull(),
  serial: text(),
  state: unitState().notNull().default('intake'),
  locationId: uuid().references(() => locations.id, { onDelete: 'restrict' }),
  /** Condition on arrival, as seen at the doorway. */
  conditionNotes: text().notNull().default(''),
  /** Voltage setting and plug as it stands, "240 V, three-pin". */
  supplyAsSet: text().notNull().default(''),
  ownership: ownership().notNull(),
  sourceKind: sourceKind().notNull(),
  /** Who brought or sold it; null where the source has no name. */
  sourcePartyId: uuid().references(() => parties.id, { onDelete: 'restrict' }),
  sourceNote: text().notNull().default(''),
  acquiredOn: date({ mode: 'string' }).notNull(),
  /** What was paid, in minor units of costCurrency; null for a consigned piece or where it is not known yet. */
  costMinor: bigint({ mode: 'number' }),
  costCurrency: text(),
  askingMinor: bigint({ mode: 'number' }),
  askingCurrency: text(),
  /** Minutes on the bench after which to stop and think; null where none is set. */
  ceilingMinutes: integer(),
  /** The day somebody last looked inside, and how far; null where nobody has. */
  examinedInsideOn: date({ mode: 'string' }),
  examinedInsideNote: text().notNull().default(''),
  /** Why the piece is on hazard hold; null when it is not. */
  hazardHold: text(),
  /** "Untested, not to be energised", in the words the buyer will read; null when it is not so sold. */
  notEnergisedDisclosure: text(),
  bookedInBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  version: version(),
  ...timestamps,
}, t => [
  uniqueIndex('units_tag_key').on(t.tag),
  index('units_model_idx').on(t.modelId),
  index('units_state_idx').on(t.state, t.createdAt),
  index('units_location_idx').on(t.locationId),
  index('units_created_idx').on(t.createdAt, t.id),
  check('units_tag_form', sql`${t.tag} ~ '^U[0-9]{5,}[0-9A-Z]$'`),
  check('units_serial_is_answered', sql`(${t.serialAnswer} = 'known') = (${t.serial} is not null)`),
  check('units_cost_has_currency', sql`(${t.costMinor} is null) = (${t.costCurrency} is null)`),
  check('units_cost_not_negative', sql`${t.costMinor} is null or ${t.costMinor} >= 0`),
  check('units_asking_has_currency', sql`(${t.askingMinor} is null) = (${t.askingCurrency} is null)`),
  check('units_ceiling', sql`${t.ceilingMinutes} is null or ${t.ceilingMinutes} > 0`),
  check('units_asking_positive', sql`${t.askingMinor} is null or ${t.askingMinor} > 0`),
])

/** What the unit covers, per function: disjoint whole-hertz ranges, indexed for search. */
export const unitCoverage = pgTable('unit_coverage', {
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  function: coverageFunction().notNull(),
  ranges: int8multirange().notNull(),
}, t => [
  primaryKey({ name: 'unit_coverage_pkey', columns: [t.unitId, t.function] }),
  index('unit_coverage_ranges_idx').using('gist', t.ranges),
])

/** What the buyer is told, topic by topic. */
export const unitDisclosures = pgTable('unit_disclosures', {
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  key: disclosureKey().notNull(),
  answer: knowledge().notNull(),
  text: text(),
  answeredBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  version: version(),
  ...timestamps,
}, t => [
  primaryKey({ name: 'unit_disclosures_pkey', columns: [t.unitId, t.key] }),
  check('unit_disclosures_answered', sql`(${t.answer} = 'known') = (${t.text} is not null)`),
])

/** A piece put by for somebody. At most one stands at a time. */
export const holds = pgTable('holds', {
  id: uuid().primaryKey().defaultRandom(),
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  heldFor: text().notNull(),
  until: date({ mode: 'string' }).notNull(),
  note: text().notNull().default(''),
  createdBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  createdAt: instant().notNull().defaultNow(),
  releasedAt: instant(),
}, t => [uniqueIndex('holds_one_standing').on(t.unitId).where(sql`${t.releasedAt} is null`)])
