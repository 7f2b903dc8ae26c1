import { and, asc, desc, eq, inArray } from 'drizzle-orm'
import { alias } from 'drizzle-orm/pg-core'
import { fittings, locationPaths, locations, lotCounts, lotMovements, models, parties, partLots, partTypes, people, units } from '../../drizzle/schema'
import { balanceOf } from '../../shared/domain/lot-balance'
import { lotPhotoUrl, partTitle } from '../../shared/domain/part-words'
import type { Role } from '../../shared/domain/roles'
import { may } from '../../shared/domain/roles'
import type { LotCountView, LotMovementView, PartLink, PartLotSummary, PartLotView } from '../../shared/types/part'
import type { Database } from '../utils/db'
import { toPartTypeView } from './part-types'
import { noSuchLot } from './lot-stock'

/** Who asks: what lots cost and who sold them is only for those who may see it. */
export interface LotReader { role: Role }

/** The lots with all that a list says of them. */
export function selectLots(db: Database) {
  return db.select({
    lot: partLots, type: partTypes, supplier: parties.name, donorTag: units.tag, donorMaker: models.maker, donorDesignation: models.designation,
    placeTag: locations.tag, placePath: locationPaths.path,
  }).from(partLots)
    .innerJoin(partTypes, eq(partTypes.id, partLots.typeId))
    .leftJoin(parties, eq(parties.id, partLots.supplierId))
    .leftJoin(units, eq(units.id, partLots.donorUnitId))
    .leftJoin(models, eq(models.id, units.modelId))
    .leftJoin(locations, eq(locations.id, partLots.locationId))
    .leftJoin(locationPaths, eq(locationPaths.id, partLots.locationId))
}
type SelectedLot = Awaited<ReturnType<typeof selectLots>>[number]

/** A lot as a list shows it, to this reader. */
export function toLotSummary({ lot, type, supplier, donorTag, donorMaker, donorDesignation, placeTag, placePath }: SelectedLot, { role }: LotReader): PartLotSummary {
  const seesCost = may(role, 'cost.read')
  const seesNames = may(role, 'parties.read')
  return {
    tag: lot.tag,
    type: toPartTypeView(type),
    maker: lot.maker,
    dateCode: lot.dateCode,
    condition: lot.condition,
    tested: lot.tested,
    sourceKind: lot.sourceKind,
    supplier: seesNames ? supplier : null,
    invoiceNumber: seesNames ? lot.invoiceNumber : null,
    donor: donorTag === null ? null : { tag: donorTag, title: `${donorMaker ?? ''} ${donorDesignation ?? ''}`.trim() },
    standing: lot.standing,
    standingBecause: lot.standingBecause,
    quantity: lot.quantity,
    costMinor: seesCost ? lot.costMinor : null,
    currency: seesCost ? lot.currency : null,
    place: placeTag === null || placePath === null ? null : { tag: placeTag, path: placePath },
    acquiredOn: lot.acquiredOn,
    photoUrl: lot.photoFileId === null ? null : lotPhotoUrl(lot.tag, lot.photoFileId),
    version: lot.version,
  }
}

/** Everything on the page of one lot; 404 if no lot has this tag. */
export async function getLotView(db: Database, reader: LotReader, tag: string): Promise<PartLotView> {
  const [row] = await selectLots(db).where(eq(partLots.tag, tag))
  if (!row) throw noSuchLot(tag)
  const { lot } = row
  const movements = await listMovements(db, reader, lot.id)
  return {
    ...toLotSummary(row, reader),
    id: lot.id,
    madeFrom: lot.madeFrom,
    madeTo: lot.madeTo,
    note: lot.note,
    parent: lot.parentLotId === null ? null : await findLink(db, lot.parentLotId),
    children: await listChildren(db, lot.id),
    fromFitting: lot.fromFittingId === null ? null : await findFromFitting(db, lot.fromFittingId),
    balance: balanceOf(movements),
    movements,
    counts: await listCounts(db, lot.id),
  }
}

const toLink = ({ tag, description, value }: { tag: string, description: string, value: string }): PartLink => ({ tag, title: partTitle({ description, value }) })
const selectLinks = (db: Database) => db.select({ tag: partLots.tag, description: partTypes.description, value: partTypes.value }).from(partLots).innerJoin(partTypes, eq(partTypes.id, partLots.typeId))

/** A lot by its row's id, as a line names it; null where there is none. */
export async function findLink(db: Database, lotId: string): Promise<PartLink | null> {
  const [row] = await selectLinks(db).where(eq(partLots.id, lotId))
  return row ? toLink(row) : null
}

async function listChildren(db: Database, lotId: string): Promise<PartLink[]> {
  return (await selectLinks(db).where(eq(partLots.parentLotId, lotId)).orderBy(asc(partLots.tag))).map(toLink)
}

async function findFromFitting(db: Database, fittingId: string): Promise<PartLotView['fromFitting']> {
  const [fitting] = await db.select().from(fittings).where(eq(fittings.id, fittingId))
  if (!fitting) return null
  return { lot: fitting.lotId === null ? null : await findLink(db, fitting.lotId), description: fitting.description, circuitReference: fitting.circuitReference }
}

const reversals = alias(lotMovements, 'reversals')

async function listMovements(db: Database, { role }: LotReader, lotId: string): Promise<LotMovementView[]> {
  const rows = await db.select({
    movement: lotMovements, who: people.name, reversedBy: reversals.id, circuitReference: fittings.circuitReference, unitTag: units.tag, maker: models.maker, designation: models.designation,
  }).from(lotMovements)
    .innerJoin(people, eq(people.id, lotMovements.personId))
    .leftJoin(reversals, eq(reversals.reversesId, lotMovements.id))
    .leftJoin(fittings, eq(fittings.id, lotMovements.fittingId))
    .leftJoin(units, eq(units.id, fittings.unitId))
    .leftJoin(models, eq(models.id, units.modelId))
    .where(eq(lotMovements.lotId, lotId)).orderBy(asc(lotMovements.id))
  return rows.map(({ movement, who, reversedBy, circuitReference, unitTag, maker, designation }) => ({
    id: movement.id,
    kind: movement.kind,
    quantity: movement.quantity,
    costMinor: may(role, 'cost.read') ? movement.costMinor : null,
    note: movement.note,
    who,
    at: movement.at.toISOString(),
    unit: unitTag === null ? null : { tag: unitTag, title: `${maker ?? ''} ${designation ?? ''}`.trim() },
    circuitReference: circuitReference ?? '',
    isReversal: movement.reversesId !== null,
    isReversed: reversedBy !== null,
  }))
}

async function listCounts(db: Database, lotId: string): Promise<LotCountView[]> {
  const rows = await db.select({ count: lotCounts, who: people.name }).from(lotCounts).innerJoin(people, eq(people.id, lotCounts.countedBy))
    .where(eq(lotCounts.lotId, lotId)).orderBy(desc(lotCounts.at), desc(lotCounts.id)).limit(20)
  return rows.map(({ count, who }) => ({
    id: count.id, counted: count.counted, book: count.book, note: count.note, who, at: count.at.toISOString(), settledAs: count.settledAs, settledNote: count.settledNote,
  }))
}

/** Links to several lots by their rows' ids. */
export async function mapLinks(db: Database, lotIds: readonly string[]): Promise<Map<string, PartLink>> {
  if (lotIds.length === 0) return new Map()
  const rows = await db.select({ id: partLots.id, tag: partLots.tag, description: partTypes.description, value: partTypes.value }).from(partLots)
    .innerJoin(partTypes, eq(partTypes.id, partLots.typeId)).where(and(inArray(partLots.id, [...lotIds])))
  return new Map(rows.map(({ id, ...row }) => [id, toLink(row)]))
}
