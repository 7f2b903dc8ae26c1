import { and, eq, isNull, sql } from 'drizzle-orm'
import { fittings, modifications, sales, shop, units } from '../../drizzle/schema'
import type { Money } from '../../shared/domain/money'
import { benchTime, unitCost } from '../../shared/domain/unit-cost'
import type { UnitCeiling } from '../../shared/schemas/unit'
import type { UnitCostView } from '../../shared/types/unit-cost'
import type { Database } from '../utils/db'
import { stale } from '../utils/errors'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import { listPulled } from './pulled-lots'
import type { UnitRow } from './unit-lock'
import { getUnitRow, lockUnit } from './unit-lock'

/**
 * What a unit has cost and what is left of its price, for those who may see costs: the route asks. Amounts in minor units of the
 * shop's currency. 404 if there is no such unit.
 */
export async function getUnitCost(db: Database, tag: string): Promise<UnitCostView> {
  return costOfUnit(db, await getUnitRow(db, tag))
}

async function costOfUnit(db: Database, unit: UnitRow): Promise<UnitCostView> {
  const { currency, benchRateMinor } = await ratesOf(db)
  const { minutes, entriesWithoutMinutes } = await workOn(db, unit.id)
  const sale = await saleOf(db, unit.id)
  const cost = unitCost({
    currency, benchRateMinor, minutes, entriesWithoutMinutes,
    isConsigned: unit.ownership === 'consigned',
    purchase: money(unit.costMinor, unit.costCurrency),
    shares: (await listPulled(db, unit.id)).map(lot => money(Number(lot.cost), lot.currency)),
    fittings: await fittedIn(db, unit.id),
    price: sale ?? money(unit.askingMinor, unit.askingCurrency),
    isSold: sale !== null,
  })
  return {
    ...cost, benchRateMinor, minutesSpent: minutes, ceilingMinutes: unit.ceilingMinutes, benchTime: benchTime(minutes, unit.ceilingMinutes), version: unit.version,
  }
}

const money = (minor: number | null, currency: string | null): Money | null => minor === null || currency === null ? null : { minor, currency }

async function ratesOf(db: Database): Promise<{ currency: string, benchRateMinor: number | null }> {
  const [row] = await db.select({ currency: shop.currency, benchRateMinor: shop.benchRateMinor }).from(shop)
  return row ?? { currency: 'GBP', benchRateMinor: null }
}

/** Work of ours that stands: an earlier hand's time cost the shop nothing. */
async function workOn(db: Database, unitId: string): Promise<{ minutes: number, entriesWithoutMinutes: number }> {
  const [row] = await db.select({
    minutes: sql<number>`coalesce(sum(${modifications.minutes}), 0)::int`,
    entriesWithoutMinutes: sql<number>`count(*) filter (where ${modifications.minutes} is null)::int`,
  }).from(modifications).where(and(eq(modifications.unitId, unitId), eq(modifications.hand, 'done_by_us'), isNull(modifications.withdrawnAt)))
  return row ?? { minutes: 0, entriesWithoutMinutes: 0 }
}

/** What each fitting took out of its lot. A part taken out again since was still bought for this piece; one undone never was. */
async function fittedIn(db: Database, unitId: string): Promise<(Money | null)[]> {
  const rows = await db.select({ minor: fittings.costMinor, currency: fittings.currency }).from(fittings).where(and(eq(fittings.unitId, unitId), isNull(fittings.undoneAt)))
  return rows.map(({ minor, currency }) => money(minor, currency))
}

async function saleOf(db: Database, unitId: string): Promise<Money | null> {
  const [standing] = await db.select({ minor: sales.priceMinor, currency: sales.currency }).from(sales).where(and(eq(sales.unitId, unitId), isNull(sales.undoneAt)))
  return standing ?? null
}

/** Sets the bench time after which to stop and think, or takes it off (null). 409 with the unit's cost as it stands if somebody changed the unit meanwhile. */
export async function setCeiling(db: Database, actor: Actor, { tag, minutes, version }: UnitCeiling & { tag: string }): Promise<UnitCostView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    if (unit.version !== version) throw stale('unit', await costOfUnit(tx, unit))
    if (minutes === unit.ceilingMinutes) return costOfUnit(tx, unit)
    await tx.update(units).set({ ceilingMinutes: minutes, version: sql`${units.version} + 1` }).where(eq(units.id, unit.id))
    await appendUnitLedger(tx, actor, unit.id, 'ceiling_set', { fromMinutes: unit.ceilingMinutes, toMinutes: minutes })
    return getUnitCost(tx, tag)
  })
}
