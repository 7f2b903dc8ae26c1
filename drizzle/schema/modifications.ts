import { sql } from 'drizzle-orm'
import { check, date, index, integer, pgEnum, pgTable, text, uuid } from 'drizzle-orm/pg-core'
import { PATHS } from '../../shared/domain/paths'
import { DISPOSITIONS, HANDS, NATURES, REASONS, REVERSIBILITIES } from '../../shared/domain/modifications'
import { instant, timestamps, version } from './columns'
import { people } from './people'
import { units } from './units'

export const measurementPath = pgEnum('measurement_path', PATHS)
export const hand = pgEnum('hand', HANDS)
export const reversibility = pgEnum('reversibility', REVERSIBILITIES)
export const disposition = pgEnum('disposition', DISPOSITIONS)
export const nature = pgEnum('nature', NATURES)
export const modificationReason = pgEnum('modification_reason', REASONS)

/** The work log. A correction raises the version and stands in the ledger with what it said before; nothing is deleted. */
export const modifications = pgTable('modifications', {
  id: uuid().primaryKey().defaultRandom(),
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  hand: hand().notNull(),
  /** Circuit reference or place: "C14", "rear apron". */
  place: text().notNull().default(''),
  before: text().notNull().default(''),
  after: text().notNull().default(''),
  reason: modificationReason().notNull(),
  /** Null only for what was left alone: there is nothing to undo. */
  reversibility: reversibility(),
  /** How far it changes what the piece is; null where nobody said, and for what was left alone. */
  nature: nature(),
  disposition: disposition().notNull(),
  dispositionNote: text().notNull().default(''),
  parts: text().notNull().default(''),
  /** What was checked afterwards: "HT 248 V at 240 V". */
  testedAfter: text().notNull().default(''),
  minutes: integer(),
  /** The day of the work; null for an earlier hand's. */
  doneOn: date({ mode: 'string' }),
  /** The parts of the piece that it could have changed; null: not said, so it could be any. */
  touches: measurementPath().array(),
  /** Why it could not have changed what was measured; null: it could. */
  affectsNothingBecause: text(),
  /** For a consigned piece: who agreed to the work, when and how. */
  ownerConsent: text().notNull().default(''),
  loggedBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  withdrawnAt: instant(),
  withdrawnBecause: text(),
  version: version(),
  ...timestamps,
}, t => [
  index('modifications_unit_idx').on(t.unitId, t.createdAt),
  check('modifications_undoable_is_said', sql`(${t.hand} = 'left_alone') = (${t.reversibility} is null)`),
  check('modifications_left_alone_changes_nothing', sql`${t.hand} <> 'left_alone' or ${t.nature} is null`),
  check('modifications_our_work_is_dated', sql`${t.hand} <> 'done_by_us' or ${t.doneOn} is not null`),
  check('modifications_minutes', sql`${t.minutes} is null or ${t.minutes} between 0 and 100000`),
  check('modifications_withdrawn_says_why', sql`(${t.withdrawnAt} is null) = (${t.withdrawnBecause} is null)`),
])
