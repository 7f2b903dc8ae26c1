import { sql } from 'drizzle-orm'
import { bigint, check, index, jsonb, pgEnum, pgTable, text, uuid } from 'drizzle-orm/pg-core'
import { LEDGER_SUBJECTS } from '../../shared/domain/ledger-events'
import { instant } from './columns'
import { people } from './people'
import { units } from './units'

export const ledgerSubject = pgEnum('ledger_subject', LEDGER_SUBJECTS)

/** What happened, to what, by whom, when. Append-only: a trigger refuses updates and deletions. */
export const ledger = pgTable('ledger', {
  id: bigint({ mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
  subject: ledgerSubject().notNull(),
  subjectId: uuid().notNull(),
  unitId: uuid().references(() => units.id, { onDelete: 'restrict' }),
  event: text().notNull(),
  details: jsonb().$type<Record<string, unknown>>().notNull(),
  personId: uuid().references(() => people.id, { onDelete: 'restrict' }),
  at: instant().notNull().defaultNow(),
}, t => [
  index('ledger_unit_idx').on(t.unitId, t.id),
  index('ledger_subject_idx').on(t.subject, t.subjectId, t.id),
  check('ledger_unit_is_subject', sql`(${t.subject} = 'unit') = (${t.unitId} is not null)`),
])
