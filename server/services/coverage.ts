import { asc, eq, inArray } from 'drizzle-orm'
import { bands, unitCoverage, units } from '../../drizzle/schema'
import type { Coverage } from '../../shared/domain/coverage'
import { coverageOf, formatMultirange, FUNCTION_LABELS, FUNCTIONS, parseMultirange } from '../../shared/domain/coverage'
import { formatFrequencyRange } from '../../shared/domain/frequency'
import type { Database } from '../utils/db'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'

/** Every unit of a model, or certain units by their rows' ids. */
export type CoverageOf = { modelId: string } | { unitIds: readonly string[] }

/**
 * Works out anew what units cover from the bands of their models, in the caller's transaction, and appends
 * `coverage_changed` for each whose coverage is not what it was. A unit that is being booked in passes
 * `quietly`, for its first coverage is no change.
 *
 * The caller holds the model's row locked (`for share` at least), else bands that change meanwhile would be missed.
 */
export async function refreshCoverage(tx: Database, actor: Actor | null, which: CoverageOf, options: { quietly?: boolean } = {}): Promise<void> {
  const wanted = 'modelId' in which ? eq(units.modelId, which.modelId) : inArray(units.id, [...which.unitIds])
  const rows = await tx.select({ id: units.id, modelId: units.modelId }).from(units).where(wanted).orderBy(asc(units.id))
  if (rows.length === 0) return
  const due = await dueByModel(tx, [...new Set(rows.map(row => row.modelId))])
  const kept = await keptByUnit(tx, rows.map(row => row.id))
  for (const { id, modelId } of rows) {
    const now = due.get(modelId) ?? coverageOf([])
    const before = kept.get(id) ?? coverageOf([])
    if (isSame(before, now)) continue
    await write(tx, id, now)
    if (!options.quietly) await appendUnitLedger(tx, actor, id, 'coverage_changed', { from: inWords(before), to: inWords(now) })
  }
}

async function dueByModel(tx: Database, modelIds: string[]): Promise<Map<string, Coverage>> {
  const rows = await tx.select({ modelId: bands.modelId, function: bands.function, lowerHz: bands.lowerHz, upperHz: bands.upperHz })
    .from(bands).where(inArray(bands.modelId, modelIds))
  return new Map(modelIds.map(id => [id, coverageOf(rows.filter(row => row.modelId === id))]))
}

async function keptByUnit(tx: Database, unitIds: string[]): Promise<Map<string, Coverage>> {
  const rows = await tx.select().from(unitCoverage).where(inArray(unitCoverage.unitId, unitIds))
  const kept = new Map<string, Coverage>()
  for (const row of rows) {
    const coverage = kept.get(row.unitId) ?? coverageOf([])
    coverage[row.function] = parseMultirange(row.ranges)
    kept.set(row.unitId, coverage)
  }
  return kept
}

const isSame = (a: Coverage, b: Coverage) => FUNCTIONS.every(name => formatMultirange(a[name]) === formatMultirange(b[name]))

async function write(tx: Database, unitId: string, coverage: Coverage): Promise<void> {
  await tx.delete(unitCoverage).where(eq(unitCoverage.unitId, unitId))
  const rows = FUNCTIONS.filter(name => coverage[name].length > 0)
    .map(name => ({ unitId, function: name, ranges: formatMultirange(coverage[name]) }))
  if (rows.length > 0) await tx.insert(unitCoverage).values(rows)
}

/** "Generates 100 kHz – 32 MHz, 50–60 MHz", function by function. */
function inWords(coverage: Coverage): string {
  const said = FUNCTIONS.filter(name => coverage[name].length > 0)
    .map(name => `${FUNCTION_LABELS[name].toLowerCase()} ${coverage[name].map(({ lowerHz, upperHz }) => formatFrequencyRange(lowerHz, upperHz)).join(', ')}`)
  return said.length === 0 ? 'nothing recorded' : said.join('; ')
}
