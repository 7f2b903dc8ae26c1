import { asc, desc, eq } from 'drizzle-orm'
import { people, procedureCheckpoints, procedureVersions } from '../../drizzle/schema'
import type { ProcedureView } from '../../shared/types/procedure'
import type { Database } from '../utils/db'
import { toCheckpoint } from './sheet-results'

/** The newest version of a model's procedure, by the model's id; null where it has none. */
export async function findCurrentProcedure(db: Database, modelId: string): Promise<ProcedureView | null> {
  const [head] = await db.select({ version: procedureVersions, madeBy: people.name }).from(procedureVersions)
    .innerJoin(people, eq(people.id, procedureVersions.madeBy))
    .where(eq(procedureVersions.modelId, modelId)).orderBy(desc(procedureVersions.number)).limit(1)
  if (!head) return null
  const { version, madeBy } = head
  const rows = await db.select().from(procedureCheckpoints).where(eq(procedureCheckpoints.versionId, version.id)).orderBy(asc(procedureCheckpoints.position))
  return {
    id: version.id,
    number: version.number,
    origin: version.origin,
    why: version.why,
    warmUpMinutes: version.warmUpMinutes,
    supply: version.supply,
    decisionRule: { rule: version.decisionRule, factor: version.guardFactor },
    checkpoints: rows.map(toCheckpoint),
    madeBy,
    madeAt: version.createdAt.toISOString(),
  }
}
