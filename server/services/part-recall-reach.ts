import { and, desc, eq, gte, inArray, isNull, lte, or, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import { fittings, lotMovements, models, modifications, parties, partLots, partTypes, sales, shop, units } from '../../drizzle/schema'
import { lotTitle } from '../../shared/domain/part-words'
import type { PartRecallReach, RecallBasis, RecallFitting, RecallLot } from '../../shared/domain/part-recall'
import { reachOf } from '../../shared/domain/part-recall'
import { may } from '../../shared/domain/roles'
import type { LotStanding } from '../../shared/domain/part-lots'
import type { LookAtLotView, PartRecallReachView, ReachedUnitView } from '../../shared/types/part-recall'
import type { Database } from '../utils/db'
import type { LotReader } from './lot-view'

/** A lot with what the list of a recall says of it. */
interface GatheredLot extends RecallLot { dateCode: string, standing: LotStanding, inDrawer: number }

/** What a recall reaches, with the lots themselves. */
export interface GatheredReach { reach: PartRecallReach, lots: Map<string, GatheredLot> }

/** The lots that a basis may take, before they are looked at one by one; without the doubtful ones unless they are wanted. */
function candidates(basis: RecallBasis, wantsDoubtful: boolean): SQL | undefined {
  const isUnknown = (unknown: SQL | undefined) => wantsDoubtful ? unknown : undefined
  const markedBy = (maker: string) => maker === '' ? undefined : or(sql`lower(trim(${partLots.maker})) = lower(trim(${maker}))`, isUnknown(sql`trim(${partLots.maker}) = ''`))
  switch (basis.basis) {
    case 'lot': return eq(partLots.id, basis.lotId)
    case 'invoice': return and(eq(partLots.supplierId, basis.supplierId), sql`lower(trim(${partLots.invoiceNumber})) = lower(trim(${basis.invoiceNumber}))`)
    case 'made_between': return and(
      or(and(lte(partLots.madeFrom, basis.madeTo), gte(partLots.madeTo, basis.madeFrom)), isUnknown(isNull(partLots.madeFrom))),
      basis.kind === null ? undefined : eq(partTypes.kind, basis.kind), markedBy(basis.maker),
    )
    case 'maker_and_value': return markedBy(basis.maker)
  }
}

/** A lot that was put back where it came from was never pulled: nothing of it is anywhere. */
const wasNotPutBack = sql`(${partLots.sourceKind} <> 'donor' or (
  select coalesce(sum(${lotMovements.quantity}), 0) from ${lotMovements} where ${lotMovements.lotId} = ${partLots.id} and ${lotMovements.kind} in ('received', 'put_back')) > 0)`

async function selectLots(db: Database, where: SQL | undefined): Promise<GatheredLot[]> {
  return db.select({
    id: partLots.id, tag: partLots.tag, kind: partTypes.kind, description: partTypes.description, value: partTypes.value, countedIn: partTypes.countedIn,
    maker: partLots.maker, dateCode: partLots.dateCode, madeFrom: partLots.madeFrom, madeTo: partLots.madeTo, supplierId: partLots.supplierId, invoiceNumber: partLots.invoiceNumber,
    parentLotId: partLots.parentLotId, donorUnitId: partLots.donorUnitId, donorTag: units.tag, fromFittingId: partLots.fromFittingId, acquiredOn: partLots.acquiredOn,
    standing: partLots.standing, inDrawer: partLots.quantity,
  }).from(partLots).innerJoin(partTypes, eq(partTypes.id, partLots.typeId)).leftJoin(units, eq(units.id, partLots.donorUnitId))
    .where(and(where, wasNotPutBack)).orderBy(partLots.tag)
}

/** The day of an instant in the shop's zone. */
const dayInShop = (instant: SQL | typeof fittings.createdAt | typeof fittings.removedAt) =>
  sql`(${instant} at time zone coalesce((select ${shop.timeZone} from ${shop} limit 1), 'UTC'))::date`

async function selectFittings(db: Database, lotIds: string[]): Promise<RecallFitting[]> {
  if (lotIds.length === 0) return []
  const rows = await db.select({
    id: fittings.id, unitId: fittings.unitId, lotId: fittings.lotId, modificationId: fittings.modificationId, quantity: fittings.quantity,
    circuitReference: fittings.circuitReference, oldLotId: fittings.oldLotId, createdAt: fittings.createdAt,
    // Work may be logged after the day on which it was done, never before.
    fittedOn: sql<string>`least(${modifications.doneOn}, ${dayInShop(fittings.createdAt)})::text`,
    removedOn: sql<string | null>`${dayInShop(fittings.removedAt)}::text`,
  }).from(fittings).innerJoin(modifications, eq(modifications.id, fittings.modificationId))
    .where(and(isNull(fittings.undoneAt), or(inArray(fittings.lotId, lotIds), inArray(fittings.oldLotId, lotIds)))).orderBy(fittings.createdAt)
  return rows.map(({ createdAt, ...row }) => ({ ...row, enteredAt: createdAt.toISOString() }))
}

/** The lots that came out of these, or of units that these went into, at any remove: more than the recall reaches, never less. */
async function lotsBeyond(db: Database, lotIds: string[]): Promise<string[]> {
  if (lotIds.length === 0) return []
  const { rows } = await db.execute<{ id: string }>(sql`with recursive reached(id) as (
    select id from part_lots where ${inArray(sql`id`, lotIds)}
    union
    select further.id from reached cross join lateral (
      select l.id from part_lots l where l.parent_lot_id = reached.id
      union all
      select l.id from fittings f join part_lots l on l.donor_unit_id = f.unit_id
      where f.lot_id = reached.id and f.undone_at is null and (l.from_fitting_id is null or l.from_fitting_id = f.id)
    ) further
  ) select id from reached`)
  return rows.map(({ id }) => id)
}

/**
 * What a recall reaches as the book stands now: only the part of the graph that hangs on its basis is read. Without
 * `wantsDoubtful` the lots of which too little is known are left out, which are most of them in an old shop.
 */
export async function gatherReach(db: Database, basis: RecallBasis, { wantsDoubtful }: { wantsDoubtful: boolean }): Promise<GatheredReach> {
  const first = await selectLots(db, candidates(basis, wantsDoubtful))
  const starts = reachOf(basis, first, []).lots.map(({ id }) => id)
  const beyond = await lotsBeyond(db, starts)
  const lots = new Map((beyond.length === 0 ? first : [...first, ...await selectLots(db, inArray(partLots.id, beyond))]).map(lot => [lot.id, lot]))
  return { reach: reachOf(basis, [...lots.values()], await selectFittings(db, beyond)), lots }
}

const MOST_TO_LOOK_AT = 100

/** The same as its pages show it, to this reader: buyers are named only to those who may read names. */
export async function viewReach(db: Database, reader: LotReader, gathered: GatheredReach): Promise<PartRecallReachView> {
  return { ...await viewLots(db, gathered), units: await viewUnits(db, reader, gathered.reach) }
}

/** Its lots, and those of which too little is known. */
export async function viewLots(db: Database, { reach, lots }: GatheredReach): Promise<Omit<PartRecallReachView, 'units'>> {
  const lotOf = (id: string) => {
    const lot = lots.get(id)
    if (!lot) throw new Error('A recall reaches a lot that was not read')
    return { ...lot, title: lotTitle(lot, lot.tag) }
  }
  return {
    lots: reach.lots.map(({ id, how }) => {
      const { tag, title, maker, dateCode, standing, inDrawer, countedIn } = lotOf(id)
      return { tag, title, how, maker, dateCode, standing, quantity: inDrawer, countedIn }
    }),
    lookAt: await viewLookAt(db, reach.lookAt.map(({ id, unknown }) => ({ ...lotOf(id), unknown }))),
    lookAtTotal: reach.lookAt.length,
  }
}

async function viewLookAt(db: Database, lots: (GatheredLot & Pick<LookAtLotView, 'title' | 'unknown'>)[]): Promise<LookAtLotView[]> {
  if (lots.length === 0) return []
  const many = sql<number>`count(distinct ${fittings.unitId})::int`
  const counted = await db.select({ lotId: fittings.lotId, units: many }).from(fittings)
    .where(and(inArray(fittings.lotId, lots.map(({ id }) => id)), isNull(fittings.undoneAt), isNull(fittings.removedAt))).groupBy(fittings.lotId).orderBy(desc(many))
  const unitsWith = new Map(counted.map(({ lotId, units: count }) => [lotId, count]))
  return lots.map(({ id, tag, title, unknown, maker, dateCode }) => ({ tag, title, unknown, maker, dateCode, units: unitsWith.get(id) ?? 0 }))
    .sort((one, other) => other.units - one.units || one.tag.localeCompare(other.tag)).slice(0, MOST_TO_LOOK_AT)
}

/** Units as a recall's list names them, by their rows' ids. */
export async function mapUnits(db: Database, { role }: LotReader, ids: readonly string[]): Promise<Map<string, Pick<ReachedUnitView, 'tag' | 'title' | 'state' | 'sale'>>> {
  if (ids.length === 0) return new Map()
  const seesNames = may(role, 'parties.read')
  const rows = await db.select({
    id: units.id, tag: units.tag, state: units.state, maker: models.maker, designation: models.designation, soldOn: sales.soldOn, buyer: parties.name, contact: parties.contact,
  }).from(units).innerJoin(models, eq(models.id, units.modelId))
    .leftJoin(sales, and(eq(sales.unitId, units.id), isNull(sales.undoneAt))).leftJoin(parties, eq(parties.id, sales.buyerId))
    .where(inArray(units.id, [...ids])).orderBy(units.tag)
  return new Map(rows.map(({ id, tag, state, maker, designation, soldOn, buyer, contact }) => [id, {
    tag, title: `${maker} ${designation}`, state, sale: soldOn === null ? null : { soldOn, buyer: seesNames ? buyer : null, contact: seesNames ? contact : null },
  }]))
}

async function viewUnits(db: Database, reader: LotReader, reach: PartRecallReach): Promise<ReachedUnitView[]> {
  const byId = new Map(reach.units.map(unit => [unit.unitId, unit]))
  return [...await mapUnits(db, reader, [...byId.keys()])].flatMap(([id, named]) => {
    const unit = byId.get(id)
    return unit ? [{ ...named, how: unit.how, reasons: unit.reasons }] : []
  })
}
