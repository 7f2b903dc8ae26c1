import { and, asc, desc, eq, exists, gte, inArray, isNotNull, isNull, not, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import { locationPaths, models, modifications, people, testSheets, triages, units } from '../../drizzle/schema'
import { IN_STOCK_STATES } from '../../shared/domain/unit-state-names'
import type { BenchList, BenchQueueView, BenchSheet, BenchUnit } from '../../shared/types/bench'
import type { Database } from '../utils/db'
import { listOverdueInstruments } from './instruments'
import { staleViews } from './sheet-staleness'

/** How many rows of each part are shown; the total says how many there are. */
const MOST_ROWS = 50

const isInStock = inArray(units.state, [...IN_STOCK_STATES])

/** What waits for the bench, each part oldest first. */
export async function getBenchQueue(db: Database): Promise<BenchQueueView> {
  const noTriage = not(exists(db.select({ one: sql`1` }).from(triages).where(eq(triages.unitId, units.id))))
  return {
    awaitingTriage: await listUnits(db, and(isInStock, noTriage)),
    hazardHolds: await listUnits(db, and(isInStock, isNotNull(units.hazardHold))),
    onBench: await listUnits(db, eq(units.state, 'bench')),
    unsigned: await listUnsigned(db),
    stale: await listStale(db),
    overdue: await listOverdue(db),
  }
}

async function listUnits(db: Database, which: SQL | undefined): Promise<BenchList<BenchUnit>> {
  const rows = await db.select({
    tag: units.tag, id: units.id, maker: models.maker, designation: models.designation, serial: units.serial, state: units.state,
    hazardHold: units.hazardHold, place: locationPaths.path, since: units.createdAt,
  }).from(units).innerJoin(models, eq(models.id, units.modelId)).leftJoin(locationPaths, eq(locationPaths.id, units.locationId))
    .where(which).orderBy(asc(units.createdAt), asc(units.id)).limit(MOST_ROWS)
  const open = rows.length === 0
    ? []
    : await db.select({ unitId: testSheets.unitId, number: testSheets.number }).from(testSheets)
        .where(and(isNull(testSheets.signedAt), inArray(testSheets.unitId, rows.map(({ id }) => id)))).orderBy(asc(testSheets.number))
  return {
    total: await db.$count(units, which),
    items: rows.map(({ id, maker, designation, since, ...row }) => ({
      ...row,
      name: `${maker} ${designation}`,
      since: since.toISOString(),
      openSheets: open.filter(sheet => sheet.unitId === id).map(({ number }) => number),
    })),
  }
}

const sheetColumns = {
  id: testSheets.id, unitId: units.id, unitTag: units.tag, maker: models.maker, designation: models.designation, number: testSheets.number,
  testedOn: testSheets.testedOn, testedBy: people.name, signedAt: testSheets.signedAt,
}

function selectSheets(db: Database) {
  return db.select(sheetColumns).from(testSheets)
    .innerJoin(units, eq(units.id, testSheets.unitId)).innerJoin(models, eq(models.id, units.modelId)).innerJoin(people, eq(people.id, testSheets.testedBy))
}

async function listUnsigned(db: Database): Promise<BenchList<BenchSheet>> {
  const rows = await selectSheets(db).where(and(isInStock, isNull(testSheets.signedAt))).orderBy(asc(testSheets.createdAt))
  return {
    total: rows.length,
    items: rows.slice(0, MOST_ROWS).map(({ unitTag, maker, designation, number, testedOn, testedBy }) =>
      ({ unitTag, unitName: `${maker} ${designation}`, number, testedOn, testedBy, staleBecause: null })),
  }
}

/**
 * Units whose newest signed sheet has gone stale; older sheets are history. The query leaves out the units without later
 * entries, so that the pure rule, which decides, reads few work logs.
 */
async function listStale(db: Database): Promise<BenchList<BenchSheet>> {
  const newest = db.selectDistinctOn([testSheets.unitId], { id: testSheets.id }).from(testSheets)
    .where(isNotNull(testSheets.signedAt)).orderBy(testSheets.unitId, desc(testSheets.number))
  const touched = exists(db.select({ one: sql`1` }).from(modifications)
    .where(and(eq(modifications.unitId, units.id), gte(modifications.createdAt, sql`date_trunc('milliseconds', ${testSheets.signedAt})`))))
  const rows = await selectSheets(db).where(and(isInStock, inArray(testSheets.id, newest), touched)).orderBy(asc(testSheets.signedAt))
  const staleOf = await staleViews(db, rows)
  const items = rows.flatMap(({ id, unitTag, maker, designation, number, testedOn, testedBy }): BenchSheet[] => {
    const { staleBecause } = staleOf(id)
    return staleBecause === null ? [] : [{ unitTag, unitName: `${maker} ${designation}`, number, testedOn, testedBy, staleBecause }]
  })
  return { total: items.length, items: items.slice(0, MOST_ROWS) }
}

async function listOverdue(db: Database): Promise<BenchQueueView['overdue']> {
  const items = await listOverdueInstruments(db)
  return { total: items.length, items: items.slice(0, MOST_ROWS) }
}
