import { and, asc, count, eq, inArray, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import { z } from 'zod'
import { bands, modelKitItems, models, units } from '../../drizzle/schema'
import type { FieldChange } from '../../shared/domain/ledger-events'
import { IN_STOCK_STATES } from '../../shared/domain/unit-state-names'
import type { ChangedModel, ModelNameInput, ModelsQuery, NewModel } from '../../shared/schemas/model'
import type { BandView, KitItemView, ModelSummary, ModelView } from '../../shared/types/model'
import type { Page } from '../../shared/types/page'
import { readCursor, writeCursor } from '../utils/cursor'
import type { Database } from '../utils/db'
import { invalid, notFound, stale } from '../utils/errors'
import { violates } from '../utils/pg-errors'
import { refreshCoverage } from './coverage'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'
import { describeModel } from './model-words'

type ModelRow = typeof models.$inferSelect

const placeInList = z.tuple([z.int(), z.string(), z.uuid()])
const fullName = sql<string>`${models.maker} || ' ' || ${models.designation}`
const sortName = sql<string>`lower(${fullName})`

/** The fewest shared trigrams, as a share of what was typed, for a name to be taken as meant: "oxmardn 307" finds Oxmarden 307. */
const LIKENESS = 0.5

/**
 * Models by name, in pages; with `q` those whose names begin with it first, then those with all its words, then those
 * that are nearly it. 400 for a cursor that is not ours.
 */
export async function listModels(db: Database, query: ModelsQuery): Promise<Page<ModelSummary>> {
  const { rank, answers } = matching(query.q)
  const [counted] = await db.select({ total: count() }).from(models).where(answers)
  const rows = await db.select({ model: models, rank, sortName }).from(models)
    .where(and(answers, after(query.cursor, rank)))
    .orderBy(asc(rank), asc(sortName), asc(models.id)).limit(query.limit + 1)
  const shown = rows.slice(0, query.limit)
  const last = rows.length > query.limit ? shown.at(-1) : undefined
  return {
    items: await summarise(db, shown.map(row => row.model)),
    nextCursor: last ? writeCursor([last.rank, last.sortName, last.model.id]) : null,
    total: counted?.total ?? 0,
  }
}

function matching(q: string | undefined): { rank: SQL<number>, answers: SQL | undefined } {
  if (!q) return { rank: sql<number>`0::int`, answers: undefined }
  const like = (text: string) => text.replace(/[\\%_]/g, String.raw`\$&`)
  const words = q.split(/\s+/u).slice(0, 10)
  const hasAll = and(...words.map(word => sql`${fullName} ilike ${`%${like(word)}%`}`)) ?? sql`true`
  const begins = sql`${fullName} ilike ${`${like(q)}%`} or ${models.designation} ilike ${`${like(q)}%`}`
  return {
    rank: sql<number>`(case when ${begins} then 0 when ${hasAll} then 1 else 2 end)`,
    answers: sql`(${hasAll} or word_similarity(${q}, ${fullName}) >= ${LIKENESS})`,
  }
}

function after(cursor: string | undefined, rank: SQL<number>): SQL | undefined {
  if (cursor === undefined) return undefined
  const [lastRank, lastName, lastId] = readCursor(cursor, placeInList)
  return sql`(${rank}, ${sortName}, ${models.id}) > (${lastRank}::int, ${lastName}, ${lastId}::uuid)`
}

async function summarise(db: Database, rows: ModelRow[]): Promise<ModelSummary[]> {
  const ids = rows.map(row => row.id)
  if (ids.length === 0) return []
  const bandRows = await db.select().from(bands).where(inArray(bands.modelId, ids)).orderBy(asc(bands.modelId), asc(bands.position))
  const inStock = sql<number>`count(*) filter (where ${inArray(units.state, [...IN_STOCK_STATES])})`.mapWith(Number)
  const counts = await db.select({ modelId: units.modelId, all: count(), inStock }).from(units).where(inArray(units.modelId, ids)).groupBy(units.modelId)
  return rows.map((row) => {
    const counted = counts.find(each => each.modelId === row.id)
    return {
      id: row.id,
      maker: row.maker,
      designation: row.designation,
      kind: row.kind,
      yearsFrom: row.yearsFrom,
      yearsTo: row.yearsTo,
      technology: row.technology,
      bands: bandRows.filter(band => band.modelId === row.id).map(toBandView),
      unitCount: counted?.all ?? 0,
      inStockCount: counted?.inStock ?? 0,
    }
  })
}

const toBandView = ({ label, function: does, lowerHz, upperHz, dialTolerancePercent }: typeof bands.$inferSelect): BandView =>
  ({ label, function: does, lowerHz, upperHz, dialTolerancePercent })

/** A model with its bands and its kit; 404 if there is none of this id. */
export async function getModel(db: Database, id: string): Promise<ModelView> {
  const [row] = await db.select().from(models).where(eq(models.id, id))
  if (!row) throw noSuchModel()
  return toView(db, row)
}

async function toView(db: Database, row: ModelRow): Promise<ModelView> {
  const [summary] = await summarise(db, [row])
  if (!summary) throw noSuchModel()
  return {
    ...summary,
    supply: row.supply,
    summary: row.summary,
    typicalHazards: row.typicalHazards,
    dialTolerancePercent: row.dialTolerancePercent,
    modulationHz: row.modulationHz,
    kit: await listKit(db, row.id),
    version: row.version,
  }
}

/** What a complete one came with (by the model's id), in the order of its list. */
export async function listKit(db: Database, modelId: string): Promise<KitItemView[]> {
  return db.select({ id: modelKitItems.id, kind: modelKitItems.kind, description: modelKitItems.description, quantity: modelKitItems.quantity })
    .from(modelKitItems).where(eq(modelKitItems.modelId, modelId)).orderBy(asc(modelKitItems.position), asc(modelKitItems.id))
}

const noSuchModel = () => notFound('There is no such model.', 'no-such-model')

/**
 * Locks a model against changes of its bands until the transaction ends, for whoever is about to rest a unit on them.
 * Lock order everywhere: the model before its units. 422 at `field` if there is none.
 */
export async function holdModelForField(tx: Database, id: string, field: string): Promise<ModelRow> {
  const [row] = await tx.select().from(models).where(eq(models.id, id)).for('share')
  if (!row) throw invalid([{ path: field, message: 'That model is not among the models: choose it again' }])
  return row
}

/** The model of this maker and type, made if there is none, in the caller's transaction; held as by `holdModelForField`. */
export async function findOrAddModel(tx: Database, actor: Actor, name: ModelNameInput): Promise<ModelRow> {
  const [made] = await tx.insert(models).values(name).onConflictDoNothing().returning()
  if (made) {
    await appendLedger(tx, actor, { kind: 'model', id: made.id }, 'created', { name: nameOf(made) })
    return made
  }
  const [row] = await tx.select().from(models)
    .where(and(sql`lower(${models.maker}) = lower(${name.maker})`, sql`lower(${models.designation}) = lower(${name.designation})`)).for('share')
  if (!row) throw new Error('A model conflicts with one that is not there')
  return row
}

/** Adds a model. 422 if there is one of this maker and type already. */
export async function addModel(db: Database, actor: Actor, input: NewModel): Promise<ModelView> {
  return db.transaction(async (tx) => {
    const row = await orTaken(input, async inner => (await inner.insert(models).values(columnsOf(input)).returning())[0], tx)
    await writeBands(tx, row.id, input.bands)
    await writeKit(tx, row.id, input.kit)
    await appendLedger(tx, actor, { kind: 'model', id: row.id }, 'created', { name: nameOf(row) })
    return toView(tx, row)
  })
}

/**
 * Writes a model as it should be now, and what each of its units covers with it. 409 with the model as it stands if
 * somebody else changed it meanwhile; 422 for a name that another model has.
 */
export async function changeModel(db: Database, actor: Actor, { id, version, ...input }: ChangedModel & { id: string }): Promise<ModelView> {
  return db.transaction(async (tx) => {
    const [row] = await tx.select().from(models).where(eq(models.id, id)).for('update')
    if (!row) throw noSuchModel()
    const before = await toView(tx, row)
    if (row.version !== version) throw stale('model', before)
    const changes = changesBetween(describeModel(before), describeModel({ ...before, ...columnsOf(input), bands: input.bands, kit: input.kit }))
    if (changes.length === 0) return before
    const changed = await orTaken(input, async inner => (await inner.update(models)
      .set({ ...columnsOf(input), version: sql`${models.version} + 1` }).where(eq(models.id, id)).returning())[0], tx)
    await writeBands(tx, id, input.bands)
    await writeKit(tx, id, input.kit)
    await refreshCoverage(tx, actor, { modelId: id })
    await appendLedger(tx, actor, { kind: 'model', id }, 'changed', { name: nameOf(changed), changes })
    return toView(tx, changed)
  })
}

const nameOf = ({ maker, designation }: Pick<ModelRow, 'maker' | 'designation'>) => `${maker} ${designation}`

const columnsOf = ({ maker, designation, kind, technology, yearsFrom, yearsTo, supply, summary, typicalHazards, dialTolerancePercent, modulationHz }: NewModel) =>
  ({ maker, designation, kind, technology, yearsFrom, yearsTo, supply, summary, typicalHazards, dialTolerancePercent, modulationHz })

/** Runs a write of the row in a savepoint, and says at the field if its name is taken. */
async function orTaken(input: ModelNameInput, write: (tx: Database) => Promise<ModelRow | undefined>, tx: Database): Promise<ModelRow> {
  try {
    const row = await tx.transaction(write)
    if (!row) throw noSuchModel()
    return row
  } catch (error) {
    if (!violates(error, 'models_name_key')) throw error
    throw invalid([{ path: 'designation', message: `${nameOf(input)} is already among the models` }])
  }
}

async function writeBands(tx: Database, modelId: string, wanted: NewModel['bands']): Promise<void> {
  await tx.delete(bands).where(eq(bands.modelId, modelId))
  if (wanted.length > 0) await tx.insert(bands).values(wanted.map((band, index) => ({ ...band, modelId, position: index + 1 })))
}

/** Lines that stay keep their ids, for kept-with items answer to them. */
async function writeKit(tx: Database, modelId: string, wanted: NewModel['kit']): Promise<void> {
  const kept = new Set((await listKit(tx, modelId)).map(line => line.id))
  const staying = wanted.flatMap(line => line.id !== null && kept.has(line.id) ? [line.id] : [])
  const gone = [...kept].filter(id => !staying.includes(id))
  if (gone.length > 0) await tx.delete(modelKitItems).where(inArray(modelKitItems.id, gone))
  for (const [index, { id, ...line }] of wanted.entries()) {
    const values = { ...line, modelId, position: index + 1 }
    if (id !== null && kept.has(id)) await tx.update(modelKitItems).set(values).where(eq(modelKitItems.id, id))
    else await tx.insert(modelKitItems).values(values)
  }
}

function changesBetween(before: Record<string, string>, after: Record<string, string>): FieldChange[] {
  return Object.keys(after)
    .filter(field => before[field] !== after[field])
    .map(field => ({ field, from: before[field] || null, to: after[field] || null }))
}
