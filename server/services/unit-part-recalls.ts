import { and, asc, eq, isNotNull, isNull } from 'drizzle-orm'
import { fittings, partRecallDecisions, partRecalls } from '../../drizzle/schema'
import type { UnitPartRecall } from '../../shared/types/part-recall'
import type { Database } from '../utils/db'
import { basisOf } from './part-recall-basis'
import { gatherReach } from './part-recall-reach'
import { isOverdue } from './part-recall-view'

/** The open recalls of parts that reach a unit (by its row's id) and are not decided for it, by number. */
export async function listOpenPartRecalls(db: Database, unitId: string): Promise<UnitPartRecall[]> {
  // Only a part of a known lot can be recalled: most units are answered without looking further.
  const [fitted] = await db.select({ id: fittings.id }).from(fittings).where(and(eq(fittings.unitId, unitId), isNotNull(fittings.lotId), isNull(fittings.undoneAt))).limit(1)
  if (!fitted) return []
  const open = await db.select({ recall: partRecalls, decision: partRecallDecisions }).from(partRecalls)
    .leftJoin(partRecallDecisions, and(eq(partRecallDecisions.recallId, partRecalls.id), eq(partRecallDecisions.unitId, unitId)))
    .where(isNull(partRecalls.closedAt)).orderBy(asc(partRecalls.number))
  const found: UnitPartRecall[] = []
  for (const { recall, decision } of open) {
    const { reach } = await gatherReach(db, basisOf(recall), { wantsDoubtful: false })
    const unit = reach.units.find(reached => reached.unitId === unitId)
    if (unit && !(decision && !isOverdue(decision, unit))) found.push({ number: recall.number, why: recall.why, parts: unit.reasons.join('; ') })
  }
  return found
}
