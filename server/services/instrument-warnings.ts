import { and, asc, eq, inArray, isNull } from 'drizzle-orm'
import { instrumentRecalls, instrumentRecallSheets, instruments } from '../../drizzle/schema'
import { calibrationState } from '../../shared/domain/calibration'
import { formatTag } from '../../shared/domain/tag'
import type { Database } from '../utils/db'
import type { InstrumentRecord } from './instruments'
import { certificateInForce } from './instruments'

export interface MeasuredWith { sheetId: string, testedOn: string, records: readonly InstrumentRecord[] }

/**
 * What has to be said wherever a sheet is shown of the instruments it was made with: overdue on the day, fallen due since,
 * or found wrong and not yet looked into. By the sheet's id; empty where there is nothing to say.
 */
export async function instrumentWarnings(db: Database, sheets: readonly MeasuredWith[], today: string): Promise<Map<string, string[]>> {
  const recalled = await openRecalls(db, sheets.map(({ sheetId }) => sheetId))
  return new Map(sheets.map(({ sheetId, testedOn, records }) => [sheetId, [
    ...recalled.filter(recall => recall.sheetId === sheetId)
      .map(({ tag, name, foundOn }) => `${name} (${formatTag(tag)}), with which it was measured, was found wrong on ${foundOn} and its readings here have not been looked into yet.`),
    ...records.flatMap(record => overdueInWords(record, testedOn, today)),
  ]]))
}

async function openRecalls(db: Database, sheetIds: readonly string[]) {
  if (sheetIds.length === 0) return []
  return db.select({ sheetId: instrumentRecallSheets.sheetId, tag: instruments.tag, name: instruments.name, foundOn: instrumentRecalls.foundOn })
    .from(instrumentRecallSheets)
    .innerJoin(instrumentRecalls, eq(instrumentRecalls.id, instrumentRecallSheets.recallId))
    .innerJoin(instruments, eq(instruments.id, instrumentRecalls.instrumentId))
    .where(and(inArray(instrumentRecallSheets.sheetId, [...sheetIds]), isNull(instrumentRecallSheets.outcome))).orderBy(asc(instruments.tag))
}

function overdueInWords(record: InstrumentRecord, testedOn: string, today: string): string[] {
  const name = `${record.row.name} (${formatTag(record.row.tag)})`
  if (calibrationState(certificateInForce(record, testedOn), testedOn) === 'overdue') return [`${name} was overdue for calibration on the day of this sheet.`]
  // One retired since is no longer sent to be calibrated: that it is overdue now says nothing of its readings then.
  const isOverdueNow = record.row.retiredAt === null && calibrationState(certificateInForce(record, today), today) === 'overdue'
  return isOverdueNow ? [`${name} was in date on the day of this sheet and has fallen due for calibration since.`] : []
}
