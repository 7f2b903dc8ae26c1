import { and, inArray, isNotNull } from 'drizzle-orm'
import { driftReadings, readings, sheetChecks } from '../../drizzle/schema'
import type { Measured } from '../../shared/domain/staleness'
import { staleReason } from '../../shared/domain/staleness'
import type { StaleView } from '../../shared/types/bench'
import type { Database } from '../utils/db'
import { listWorkFacts } from './work-facts'

/** What of a sheet is asked: `signedAt` null while it is open. */
interface Sheet { id: string, unitId: string, signedAt: Date | null }

const FRESH: StaleView = { staleBecause: null, staleWork: null }

/** For each signed sheet (by its row's id) whether later work has overtaken what it measured, why, and which work. */
export async function staleViews(db: Database, sheets: readonly Sheet[]): Promise<(sheetId: string) => StaleView> {
  const signed = sheets.flatMap(({ signedAt, ...sheet }) => signedAt === null ? [] : [{ ...sheet, signedAt }])
  const workLog = await listWorkFacts(db, [...new Set(signed.map(({ unitId }) => unitId))])
  const held = await listMeasured(db, signed.map(({ id }) => id))
  const views = new Map(signed.map(({ id, unitId, signedAt }): [string, StaleView] => {
    const reason = staleReason(signedAt.toISOString(), workLog.filter(work => work.unitId === unitId), held.get(id) ?? 'everything')
    const work = workLog.find(({ id: workId }) => workId === reason?.workId)
    return [id, reason && work ? { staleBecause: reason.sentence, staleWork: { id: work.id, version: work.version } } : FRESH]
  }))
  return sheetId => views.get(sheetId) ?? FRESH
}

/** The sections a sheet read, and whether it answered checks (passed or failed) or watched anything warm up; only sheets that did. */
async function listMeasured(db: Database, sheetIds: readonly string[]): Promise<Map<string, Measured[]>> {
  const held = new Map<string, Measured[]>()
  if (sheetIds.length === 0) return held
  const add = (sheetId: string, measured: Measured) => held.set(sheetId, [...held.get(sheetId) ?? [], measured])
  const ids = [...sheetIds]
  const read = await db.selectDistinct({ sheetId: readings.sheetId, section: readings.section }).from(readings)
    .where(and(inArray(readings.sheetId, ids), isNotNull(readings.foundValue))).orderBy(readings.section)
  const watched = await db.selectDistinct({ sheetId: driftReadings.sheetId }).from(driftReadings).where(inArray(driftReadings.sheetId, ids))
  const answered = await db.selectDistinct({ sheetId: sheetChecks.sheetId }).from(sheetChecks)
    .where(and(inArray(sheetChecks.sheetId, ids), inArray(sheetChecks.result, ['pass', 'fail'])))
  for (const { sheetId, section } of read) add(sheetId, section)
  for (const { sheetId } of watched) add(sheetId, 'warm_up')
  for (const { sheetId } of answered) add(sheetId, 'checks')
  return held
}
