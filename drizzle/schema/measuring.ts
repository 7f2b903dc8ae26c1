import { pgEnum } from 'drizzle-orm/pg-core'
import { SECTIONS } from '../../shared/domain/checkpoint'
import { DECISION_RULES } from '../../shared/domain/decision'
import { QUANTITIES } from '../../shared/domain/reading'

/** What is measured, where on a piece, and by which rule it is judged: shared by procedures, sheets and instruments. */
export const quantity = pgEnum('quantity', QUANTITIES)
export const section = pgEnum('section', SECTIONS)
export const decisionRule = pgEnum('decision_rule', DECISION_RULES)
