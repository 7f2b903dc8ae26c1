import { count, desc, eq, isNotNull, sql } from 'drizzle-orm'
import { alias } from 'drizzle-orm/pg-core'
import { parties, partLots, partRecallDecisions, partRecalls, partTypes, people } from '../../drizzle/schema'
import { PART_KIND_LABELS } from '../../shared/domain/part-lots'
import type { PartRecallReach } from '../../shared/domain/part-recall'
import { basisInWords } from '../../shared/domain/part-recall'
import { lotTitle } from '../../shared/domain/part-words'
import { may } from '../../shared/domain/roles'
import type { PartRecallBasisInput } from '../../shared/schemas/part-recall'
import type { PartRecallPreviewView, PartRecallReachView, PartRecallSummary, PartRecallView, RecalledUnitView } from '../../shared/types/part-recall'
import type { Database } from '../utils/db'
import { notFound } from '../utils/errors'
import type { LotReader } from './lot-view'
import type { PartRecallRow } from './part-recall-basis'
import { basisOf, readBasis, whyNothing } from './part-recall-basis'
import { gatherReach, mapUnits, viewLots, viewReach } from './part-recall-reach'

const NOTHING_REACHED: PartRecallReachView = { lots: [], lookAt: [], lookAtTotal: 0, units: [] }

/** What a recall on this basis would reach, before it is raised; or, in words, why it could not be. */
export async function previewPartRecall(db: Database, reader: LotReader, said: PartRecallBasisInput): Promise<PartRecallPreviewView> {
  const read = await readBasis(db, said)
  if (!read.ok) return { ...NOTHING_REACHED, refusal: read.error.message }
  const gathered = await gatherReach(db, basisOf(read.columns), { wantsDoubtful: true })
  return { ...await viewReach(db, reader, gathered), refusal: whyNothing(gathered.reach, said.basis)?.message ?? null }
}

const closers = alias(people, 'closers')

const selectRecalls = (db: Database) => db.select({
  recall: partRecalls, raisedBy: people.name, closedBy: closers.name, supplier: parties.name, lotTag: partLots.tag, description: partTypes.description, value: partTypes.value,
}).from(partRecalls)
  .innerJoin(people, eq(people.id, partRecalls.raisedBy))
  .leftJoin(closers, eq(closers.id, partRecalls.closedBy))
  .leftJoin(parties, eq(parties.id, partRecalls.supplierId))
  .leftJoin(partLots, eq(partLots.id, partRecalls.lotId))
  .leftJoin(partTypes, eq(partTypes.id, partLots.typeId))
type SelectedRecall = Awaited<ReturnType<typeof selectRecalls>>[number]

const dayFormat = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric', timeZone: 'UTC' })
const dayInWords = (day: string) => dayFormat.format(new Date(`${day}T00:00:00Z`))

function toSummary({ recall, raisedBy, supplier, lotTag, description, value }: SelectedRecall, { role }: LotReader, counts: Pick<PartRecallSummary, 'units' | 'decided'>): PartRecallSummary {
  const seesNames = may(role, 'parties.read')
  const { number, basis, why, createdAt, closedAt, madeFrom, madeTo, kind } = recall
  return {
    number,
    basis,
    title: basisInWords({
      basis, maker: recall.maker, value: recall.value, kindLabel: kind && PART_KIND_LABELS[kind],
      lotTitle: lotTag === null ? null : lotTitle({ description: description ?? '', value: value ?? '' }, lotTag),
      supplier: seesNames ? supplier : null, invoiceNumber: seesNames ? recall.invoiceNumber : null,
      made: madeFrom === null || madeTo === null ? '' : `${dayInWords(madeFrom)} to ${dayInWords(madeTo)}`,
    }),
    why,
    raisedBy,
    raisedAt: createdAt.toISOString(),
    closedAt: closedAt?.toISOString() ?? null,
    ...counts,
  }
}

/** The recalls of parts, those open first, then the newest. What an open one reaches is worked out anew. */
export async function listPartRecalls(db: Database, reader: LotReader): Promise<PartRecallSummary[]> {
  const rows = await selectRecalls(db).orderBy(desc(sql`${partRecalls.closedAt} is null`), desc(partRecalls.number))
  const decided = await db.select({ recallId: partRecallDecisions.recallId, many: count() }).from(partRecallDecisions)
    .innerJoin(partRecalls, eq(partRecalls.id, partRecallDecisions.recallId)).where(isNotNull(partRecalls.closedAt)).groupBy(partRecallDecisions.recallId)
  const summaries: PartRecallSummary[] = []
  for (const row of rows) {
    const closedWith = decided.find(({ recallId }) => recallId === row.recall.id)?.many ?? 0
    summaries.push(toSummary(row, reader, row.recall.closedAt ? { units: closedWith, decided: closedWith } : await countOpen(db, reader, row.recall)))
  }
  return summaries
}

async function countOpen(db: Database, reader: LotReader, recall: PartRecallRow): Promise<Pick<PartRecallSummary, 'units' | 'decided'>> {
  const { reach } = await gatherReach(db, basisOf(recall), { wantsDoubtful: false })
  return countsOf(await listUnits(db, reader, recall, reach))
}

const isDecided = ({ outcome, isFittedSince }: RecalledUnitView) => outcome !== null && !isFittedSince
const countsOf = (items: readonly RecalledUnitView[]) => ({ units: items.length, decided: items.filter(isDecided).length })

/** A recall by its number, with the names it is told with; 404 without it. */
export async function getRecallRow(db: Database, number: number): Promise<SelectedRecall> {
  const [row] = await selectRecalls(db).where(eq(partRecalls.number, number))
  if (!row) throw notFound(`There is no recall of parts ${number}.`, 'no-such-recall')
  return row
}

/**
 * A recall with the lots and units it reaches today, so that a unit fitted since is on its list too, and one that was decided
 * before stays on it. Buyers are named only to those who may read names. 404 without it.
 */
export async function getPartRecall(db: Database, reader: LotReader, number: number): Promise<PartRecallView> {
  const row = await getRecallRow(db, number)
  const gathered = await gatherReach(db, basisOf(row.recall), { wantsDoubtful: true })
  const items = await listUnits(db, reader, row.recall, gathered.reach)
  return { ...toSummary(row, reader, countsOf(items)), closedBy: row.closedBy, ...await viewLots(db, gathered), items }
}

/** Whether a decision does not know of all that reaches its unit: such a part was entered after it. */
export const isOverdue = ({ decidedAt }: { decidedAt: Date }, { lastEnteredAt }: { lastEnteredAt: string }): boolean => lastEnteredAt > decidedAt.toISOString()

async function listUnits(db: Database, reader: LotReader, recall: PartRecallRow, reach: PartRecallReach): Promise<RecalledUnitView[]> {
  const rows = await db.select({ decision: partRecallDecisions, decidedBy: people.name }).from(partRecallDecisions).innerJoin(people, eq(people.id, partRecallDecisions.decidedBy))
    .where(eq(partRecallDecisions.recallId, recall.id))
  const named = await mapUnits(db, reader, [...new Set([...reach.units, ...rows.map(({ decision }) => decision)].map(({ unitId }) => unitId))])
  const items = [...named].map(([id, unit]): RecalledUnitView => {
    const found = rows.find(({ decision }) => decision.unitId === id)
    const reached = reach.units.find(({ unitId }) => unitId === id)
    return {
      ...unit,
      how: reached?.how ?? null,
      reasons: reached?.reasons ?? [],
      outcome: found?.decision.outcome ?? null,
      note: found?.decision.note ?? '',
      decidedBy: found?.decidedBy ?? null,
      decidedAt: found?.decision.decidedAt.toISOString() ?? null,
      isFittedSince: found !== undefined && reached !== undefined && isOverdue(found.decision, reached),
    }
  })
  return items.sort((one, other) => Number(isDecided(one)) - Number(isDecided(other)) || one.tag.localeCompare(other.tag))
}
