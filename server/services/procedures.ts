import { isDeepStrictEqual } from 'node:util'
import { and, asc, count, desc, eq, lt } from 'drizzle-orm'
import { z } from 'zod'
import { bands, models, people, procedureCheckpoints, procedureVersions } from '../../drizzle/schema'
import type { Checkpoint } from '../../shared/domain/checkpoint'
import { SECTION_LABELS } from '../../shared/domain/checkpoint'
import { settingKey } from '../../shared/domain/procedure-suggestions'
import { checkpointTitle } from '../../shared/domain/result-words'
import type { SavedProcedure } from '../../shared/schemas/procedure'
import type { Page } from '../../shared/types/page'
import type { ProcedureCopy, ProcedureSummary, ProcedureView } from '../../shared/types/procedure'
import { readCursor, writeCursor } from '../utils/cursor'
import type { Database } from '../utils/db'
import { conflict, notFound, stale } from '../utils/errors'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'
import { fromCheckpoint, toCheckpoint } from './sheet-results'

interface Head { version: typeof procedureVersions.$inferSelect, madeBy: string }

const selectHeads = (db: Database) => db.select({ version: procedureVersions, madeBy: people.name }).from(procedureVersions)
  .innerJoin(people, eq(people.id, procedureVersions.madeBy))

async function whole(db: Database, { version, madeBy }: Head): Promise<ProcedureView> {
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

/** The newest version of a model's procedure, by the model's id; null where it has none. */
export async function findCurrentProcedure(db: Database, modelId: string): Promise<ProcedureView | null> {
  const [head] = await selectHeads(db).where(eq(procedureVersions.modelId, modelId)).orderBy(desc(procedureVersions.number)).limit(1)
  return head ? whole(db, head) : null
}

/** The same; 404 `no-procedure` where there is none. */
export async function getCurrentProcedure(db: Database, modelId: string): Promise<ProcedureView> {
  const current = await findCurrentProcedure(db, modelId)
  if (!current) throw notFound('This model has no procedure yet.', 'no-procedure')
  return current
}

/** One version by its number; 404 if there is none. Old versions stand as they were. */
export async function getProcedureVersion(db: Database, modelId: string, number: number): Promise<ProcedureView> {
  const [head] = await selectHeads(db).where(and(eq(procedureVersions.modelId, modelId), eq(procedureVersions.number, number)))
  if (!head) throw notFound(`This model’s procedure has no version ${number}.`, 'no-procedure')
  return whole(db, head)
}

/** The versions of a model's procedure, the newest first. */
export async function listProcedureVersions(db: Database, modelId: string, { limit, cursor }: { limit: number, cursor?: string }): Promise<Page<ProcedureSummary>> {
  const own = eq(procedureVersions.modelId, modelId)
  const checkpointCount = db.$count(procedureCheckpoints, eq(procedureCheckpoints.versionId, procedureVersions.id))
  const rows = await db.select({ version: procedureVersions, madeBy: people.name, checkpointCount }).from(procedureVersions)
    .innerJoin(people, eq(people.id, procedureVersions.madeBy)).where(and(own, cursor === undefined ? undefined : lt(procedureVersions.number, readCursor(cursor, z.number()))))
    .orderBy(desc(procedureVersions.number)).limit(limit + 1)
  const [counted] = await db.select({ total: count() }).from(procedureVersions).where(own)
  const last = rows.length > limit ? rows[limit - 1] : undefined
  return {
    items: rows.slice(0, limit).map(({ version: { number, origin, why, createdAt }, madeBy, checkpointCount: has }) =>
      ({ number, origin, why, madeBy, madeAt: createdAt.toISOString(), checkpointCount: has })),
    nextCursor: last ? writeCursor(last.version.number) : null,
    total: counted?.total ?? 0,
  }
}

/**
 * Saves a procedure as its next version; sheets made with an older one keep it. Saving it unchanged writes nothing. 409
 * `stale` with the newest version when it is not the one that was seen.
 */
export async function saveProcedure(db: Database, actor: Actor, { modelId, seen, checkpoints, ...input }: SavedProcedure & { modelId: string }): Promise<ProcedureView> {
  return db.transaction(async (tx) => {
    await lockModel(tx, modelId)
    const current = await findCurrentProcedure(tx, modelId)
    if ((current?.number ?? 0) !== seen) {
      if (current) throw stale('procedure', current)
      throw conflict('no-procedure', 'The version that was opened is not there. Open the procedure again.')
    }
    if (current && isSame(current, { ...input, checkpoints })) return current
    const number = seen + 1
    const [version] = await tx.insert(procedureVersions).values({ modelId, number, ...input, madeBy: actor.id }).returning()
    if (!version) throw new Error('The procedure was not inserted')
    await tx.insert(procedureCheckpoints).values(checkpoints.map((point, index) => ({ versionId: version.id, position: index + 1, ...fromCheckpoint(point) })))
    await appendLedger(tx, actor, { kind: 'model', id: modelId }, 'procedure_saved', { number, checkpoints: checkpoints.length, why: input.why })
    return getProcedureVersion(tx, modelId, number)
  })
}

const noSuchModel = () => notFound('There is no such model.', 'no-such-model')

async function lockModel(tx: Database, modelId: string): Promise<void> {
  const [model] = await tx.select({ id: models.id }).from(models).where(eq(models.id, modelId)).for('update')
  if (!model) throw noSuchModel()
}

type Content = Pick<SavedProcedure, 'origin' | 'warmUpMinutes' | 'supply' | 'decisionRule' | 'guardFactor' | 'checkpoints'>

/** Compared as values, for the database gives the keys of a limit back in an order of its own. */
function isSame(current: ProcedureView, next: Content): boolean {
  const contentOf = ({ origin, warmUpMinutes, supply, decisionRule, guardFactor, checkpoints }: Content) =>
    ({ origin, warmUpMinutes, supply, decisionRule, guardFactor, checkpoints: checkpoints.map(fromCheckpoint) })
  return isDeepStrictEqual(contentOf({ ...current, decisionRule: current.decisionRule.rule, guardFactor: current.decisionRule.factor }), contentOf(next))
}

type BandRow = Pick<typeof bands.$inferSelect, 'label' | 'lowerHz' | 'upperHz'>
const bandsOf = (db: Database, modelId: string): Promise<BandRow[]> =>
  db.select({ label: bands.label, lowerHz: bands.lowerHz, upperHz: bands.upperHz }).from(bands).where(eq(bands.modelId, modelId)).orderBy(asc(bands.position))

/** The label a checkpoint takes among other bands: that of the band it lies in, its own if it may; null where there is none. */
function labelAmong(own: readonly BandRow[], { bandLabel, atHz }: Checkpoint): string | null {
  const holding = own.filter(band => atHz === null || (band.lowerHz <= atHz && atHz <= band.upperHz))
  const same = holding.find(({ label }) => label === bandLabel)
  return same?.label ?? (atHz === null ? null : holding[0]?.label ?? null)
}

/**
 * Another model's procedure as a draft for this one, nothing written. A point that stood under a band of the other model takes
 * the label of this model's band that it lies in. Dial points that lie in none are left out and named; other points are kept
 * and named, to be put under a band by hand. 404 for a model that is not there or has no procedure to copy.
 */
export async function copyProcedure(db: Database, modelId: string, fromModelId: string): Promise<ProcedureCopy> {
  const [target] = await db.select({ id: models.id }).from(models).where(eq(models.id, modelId))
  if (!target) throw noSuchModel()
  const source = await findCurrentProcedure(db, fromModelId)
  if (!source) throw notFound('That model has no procedure to copy.', 'no-procedure')
  const own = await bandsOf(db, modelId)
  const itsLabels = new Set((await bandsOf(db, fromModelId)).map(({ label }) => label))
  const copy: Pick<ProcedureCopy, 'checkpoints' | 'leftOut' | 'strangers'> = { checkpoints: [], leftOut: [], strangers: [] }
  for (const point of source.checkpoints) {
    const label = labelAmong(own, point)
    const isDial = point.section === 'dial'
    if (label === null && isDial) copy.leftOut.push(checkpointTitle(point))
    else copy.checkpoints.push(label !== null && (isDial || itsLabels.has(point.bandLabel)) ? { ...point, bandLabel: label } : point)
    if (label === null && !isDial && itsLabels.has(point.bandLabel)) copy.strangers.push(`${SECTION_LABELS[point.section]}: ${checkpointTitle(point)}`)
  }
  // Two bands of the other model may meet within one of this: the edge they share is read once.
  const checkpoints = [...new Map(copy.checkpoints.map(point => [settingKey(point), point])).values()]
  return { origin: source.origin, warmUpMinutes: source.warmUpMinutes, supply: source.supply, decisionRule: source.decisionRule, ...copy, checkpoints }
}
