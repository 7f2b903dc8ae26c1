import { asc, eq, sql } from 'drizzle-orm'
import { lotMovements, partLots, partTypes } from '../../drizzle/schema'
import { partTitle } from '../../shared/domain/part-words'
import { may } from '../../shared/domain/roles'
import type { DonorView } from '../../shared/types/part'
import type { Database } from '../utils/db'
import type { LotReader } from './lot-view'
import type { UnitRow } from './unit-lock'
import { getUnitRow } from './unit-lock'

/** How many of a pulled lot came out of the donor and were not put back; the unit's cost share of the same. */
const pulledQuantity = sql<number>`coalesce(sum(${lotMovements.quantity}) filter (where ${lotMovements.kind} in ('received', 'put_back')), 0)::int`
const pulledCost = sql<string>`coalesce(sum(${lotMovements.costMinor}) filter (where ${lotMovements.kind} in ('received', 'put_back')), 0)`

/** The lots pulled from a unit that are not back in it, with how many and their share of its cost. */
export async function listPulled(db: Database, unitId: string) {
  return db.select({ tag: partLots.tag, type: partTypes, left: partLots.quantity, standing: partLots.standing, currency: partLots.currency, quantity: pulledQuantity, cost: pulledCost })
    .from(partLots).innerJoin(partTypes, eq(partTypes.id, partLots.typeId)).innerJoin(lotMovements, eq(lotMovements.lotId, partLots.id))
    .where(eq(partLots.donorUnitId, unitId)).groupBy(partLots.id, partTypes.id).having(sql`${pulledQuantity} > 0`).orderBy(asc(partLots.tag))
}

/** What was pulled from a unit and is not back in it, with what became of its cost; costs are null for those who may not see them. */
export async function getDonor(db: Database, { role }: LotReader, tag: string): Promise<DonorView> {
  const unit = await getUnitRow(db, tag)
  const pulled = await listPulled(db, unit.id)
  const seesCost = may(role, 'cost.read')
  return {
    pulled: pulled.map(({ tag: lotTag, type, left, standing, quantity, cost, currency }) => ({
      lot: { tag: lotTag, title: partTitle(type) }, quantity, left, countedIn: type.countedIn, standing, shareMinor: seesCost && currency !== null ? Number(cost) : null,
    })),
    costLeftMinor: seesCost ? costLeft(unit, pulled) : null,
    currency: seesCost ? unit.costCurrency : null,
    version: unit.version,
  }
}

/** What of a unit's cost has not been shared among its parts, minor units; null where its cost is not known. */
export const costLeft = ({ costMinor }: UnitRow, pulled: readonly { cost: string }[]): number | null =>
  costMinor === null ? null : pulled.reduce((left, { cost }) => left - Number(cost), costMinor)

/** How many lots were pulled from a unit and are not back in it: none may be when it is to be whole again. */
export async function countPulled(db: Database, unitId: string): Promise<number> {
  return (await listPulled(db, unitId)).length
}
