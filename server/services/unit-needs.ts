import { and, eq, exists, inArray, isNotNull, isNull, not, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import { keptWithItems, triages, units } from '../../drizzle/schema'
import type { UnitNeed } from '../../shared/domain/unit-needs'
import { IN_STOCK_STATES } from '../../shared/domain/unit-state-names'
import type { Database } from '../utils/db'

const inStock = () => inArray(units.state, [...IN_STOCK_STATES])

/** The condition on `units` for what they wait for: one rule behind a count in the day-book and the list it leads to. */
export function waitsFor(db: Database, need: UnitNeed): SQL | undefined {
  switch (need) {
    case 'hazard': return and(inStock(), isNotNull(units.hazardHold))
    case 'triage': return and(inStock(), not(exists(db.select({ one: sql`1` }).from(triages).where(eq(triages.unitId, units.id)))))
    case 'bench': return eq(units.state, 'bench')
    case 'ready': return eq(units.state, 'ready')
    case 'held': return eq(units.state, 'held')
    case 'dispatch': return eq(units.state, 'sold')
    case 'missing': return and(inStock(), exists(db.select({ one: sql`1` }).from(keptWithItems).where(and(
      eq(keptWithItems.unitId, units.id), eq(keptWithItems.whereabouts, 'missing'), eq(keptWithItems.absenceDisclosed, ''), isNull(keptWithItems.removedAt),
    ))))
    case 'place': return and(inStock(), isNull(units.locationId))
  }
}
