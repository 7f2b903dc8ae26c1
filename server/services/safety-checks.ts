import { and, desc, eq } from 'drizzle-orm'
import { instruments, models, people, safetyChecks, shop, testSheets } from '../../drizzle/schema'
import { judgeSafety, safetyHeadline, suggestLimits } from '../../shared/domain/safety-check'
import type { SafetyFindings, SafetyLimits } from '../../shared/domain/safety-check'
import { UNIT_STATE_LABELS } from '../../shared/domain/unit-state-names'
import type { UnitState } from '../../shared/domain/unit-state-names'
import { safetyCheckIsCurrent } from '../../shared/domain/unit-states'
import type { NewSafetyCheck } from '../../shared/schemas/safety-check'
import type { SafetyCheckView, SafetyFormView } from '../../shared/types/bench'
import type { Database } from '../utils/db'
import { conflict, invalid } from '../utils/errors'
import type { InstrumentRecord } from './instruments'
import { gatherInstruments, instrumentInWords, instrumentsForField } from './instruments'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import { findPowerDecision, requirePower } from './power'
import { findTriage } from './triage'
import { findLastWork } from './unit-facts'
import { getUnitRow, lockUnit } from './unit-lock'

type CheckRow = typeof safetyChecks.$inferSelect

/** States in which the record is closed to measurements: a buyer's paperwork must keep matching it, or the unit is gone. */
const CLOSED: readonly UnitState[] = ['sold', 'dispatched', 'parted', 'written_off']

/** 409 once the unit is sold or gone. */
export function refuseClosedToTests(state: UnitState): void {
  if (CLOSED.includes(state)) {
    throw conflict('record-closed', `Its tests are closed: the unit is “${UNIT_STATE_LABELS[state]}”. What was measured stays as it was written.`)
  }
}

/** The limits the shop suggests, before the class is taken into account, and where they come from. */
async function shopLimits(db: Database): Promise<{ limits: SafetyLimits, origin: string }> {
  const [row] = await db.select().from(shop)
  if (!row) throw conflict('no-shop', 'The shop has not been set up yet, so there are no limits to check against. The owner does that on the first page.')
  return {
    limits: { earthBondMilliohm: row.earthBondLimitMilliohm, insulationKilohm: row.insulationLimitKilohm, leakageMicroamp: row.leakageLimitMicroamp },
    origin: row.safetyLimitsOrigin,
  }
}

/** What the form of a safety check on this unit starts from; 404 if there is no such unit. The class is the last triage's. */
export async function getSafetyForm(db: Database, tag: string): Promise<SafetyFormView> {
  const unit = await getUnitRow(db, tag)
  const [model] = await db.select().from(models).where(eq(models.id, unit.modelId))
  const triage = await findTriage(db, unit.id)
  const power = await findPowerDecision(db, unit)
  const { limits, origin } = await shopLimits(db)
  return {
    unitName: model ? `${model.maker} ${model.designation}` : '',
    safetyClass: triage?.safetyClass ?? null,
    fuseRating: triage?.fuseRating ?? '',
    powerRefusal: power.allowed ? null : power.sentence,
    limits,
    limitsOrigin: origin,
    latest: await findSafetyCheck(db, unit.id),
  }
}

/** The limits of one check: those suggested for its class, each replaced where another was entered. */
async function limitsFor(tx: Database, input: NewSafetyCheck): Promise<{ limits: SafetyLimits, origin: string }> {
  const base = await shopLimits(tx)
  const suggested = suggestLimits(input.safetyClass, base.limits, base.origin)
  return {
    limits: {
      earthBondMilliohm: input.earthBondLimit ?? suggested.limits.earthBondMilliohm,
      insulationKilohm: input.insulationLimit ?? suggested.limits.insulationKilohm,
      leakageMicroamp: input.leakageLimit ?? suggested.limits.leakageMicroamp,
    },
    origin: input.limitsOrigin || suggested.origin,
  }
}

async function findSheetId(tx: Database, unitId: string, number: number | null): Promise<string | null> {
  if (number === null) return null
  const [sheet] = await tx.select({ id: testSheets.id, signedAt: testSheets.signedAt }).from(testSheets)
    .where(and(eq(testSheets.unitId, unitId), eq(testSheets.number, number)))
  if (!sheet) throw invalid([{ path: 'sheetNumber', message: `This unit has no test sheet ${number}` }])
  if (sheet.signedAt) throw invalid([{ path: 'sheetNumber', message: `Test sheet ${number} is signed: record the check on its own, or open the sheet again` }])
  return sheet.id
}

/**
 * Records a safety check and its judgement against the limits of the day. Never edited: a second check is a second row.
 * Leakage is measured under power, so it needs a triage that allows power; 409 without.
 */
export async function recordSafetyCheck(db: Database, actor: Actor, { tag, ...input }: NewSafetyCheck & { tag: string }): Promise<SafetyCheckView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    refuseClosedToTests(unit.state)
    if (input.leakage !== null) await requirePower(tx, unit)
    if (input.instrumentId !== null) await instrumentsForField(tx, [input.instrumentId], 'instrumentId')
    const { limits, origin } = await limitsFor(tx, input)
    const { passed } = judgeSafety({
      ...input, earthBondMilliohm: input.earthBond, insulationKilohm: input.insulation, leakageMicroamp: input.leakage,
    }, limits)
    await tx.insert(safetyChecks).values({
      unitId: unit.id,
      sheetId: await findSheetId(tx, unit.id, input.sheetNumber),
      safetyClass: input.safetyClass,
      earthBondMilliohm: input.earthBond,
      insulationKilohm: input.insulation,
      insulationTestVolts: input.insulation === null ? null : input.insulationTestVolts,
      leakageMicroamp: input.leakage,
      leadAndPlug: input.leadAndPlug,
      fuse: input.fuse,
      polarity: input.polarity,
      visual: input.visual,
      fuseRating: input.fuseRating,
      reservoirMicrofarad: input.reservoirMicrofarad,
      bleederKilohm: input.bleederKilohm,
      reservoirVolts: input.reservoirVolts,
      earthBondLimitMilliohm: limits.earthBondMilliohm,
      insulationLimitKilohm: limits.insulationKilohm,
      leakageLimitMicroamp: limits.leakageMicroamp,
      limitsOrigin: origin,
      passed,
      note: input.note,
      instrumentId: input.instrumentId,
      doneBy: actor.id,
    })
    await appendUnitLedger(tx, actor, unit.id, 'safety_checked', {
      verdict: safetyHeadline(passed, input.safetyClass), ...input.note && { note: input.note },
    })
    const view = await findSafetyCheck(tx, unit.id)
    if (!view) throw new Error('The safety check just recorded is not there')
    return view
  })
}

/** The unit's newest safety check, or null if it never had one. */
export async function findSafetyCheck(db: Database, unitId: string): Promise<SafetyCheckView | null> {
  const [row] = await selectChecks(db).where(eq(safetyChecks.unitId, unitId)).orderBy(desc(safetyChecks.createdAt)).limit(1)
  return row ? toView(await withInstrument(db, row), await findLastWork(db, unitId), true) : null
}

/** The newest safety check made as a part of one sheet's sitting, or null. */
export async function findSafetyCheckOfSheet(db: Database, unitId: string, sheetId: string): Promise<SafetyCheckView | null> {
  const [row] = await selectChecks(db).where(eq(safetyChecks.sheetId, sheetId)).orderBy(desc(safetyChecks.createdAt)).limit(1)
  if (!row) return null
  const [newest] = await db.select({ id: safetyChecks.id }).from(safetyChecks).where(eq(safetyChecks.unitId, unitId)).orderBy(desc(safetyChecks.createdAt)).limit(1)
  return toView(await withInstrument(db, row), await findLastWork(db, unitId), newest?.id === row.check.id)
}

function selectChecks(db: Database) {
  return db.select({ check: safetyChecks, instrument: instruments, doneBy: people.name, sheetNumber: testSheets.number }).from(safetyChecks)
    .innerJoin(people, eq(people.id, safetyChecks.doneBy))
    .leftJoin(instruments, eq(instruments.id, safetyChecks.instrumentId))
    .leftJoin(testSheets, eq(testSheets.id, safetyChecks.sheetId))
}

async function withInstrument(db: Database, { instrument, ...row }: Omit<JoinedCheck, 'instrument'> & { instrument: typeof instruments.$inferSelect | null }): Promise<JoinedCheck> {
  const [record] = instrument ? await gatherInstruments(db, [instrument]) : []
  return { ...row, instrument: record ?? null }
}

interface JoinedCheck { check: CheckRow, instrument: InstrumentRecord | null, doneBy: string, sheetNumber: number | null }

function toView({ check, instrument, doneBy, sheetNumber }: JoinedCheck, lastWork: Date | null, isNewest: boolean): SafetyCheckView {
  const { unitId: _unitId, sheetId: _sheetId, instrumentId: _instrumentId, doneBy: _doneBy, createdAt, ...kept } = check
  const found: SafetyFindings = kept
  const limits = { earthBondMilliohm: kept.earthBondLimitMilliohm, insulationKilohm: kept.insulationLimitKilohm, leakageMicroamp: kept.leakageLimitMicroamp }
  const doneAt = createdAt.toISOString()
  return {
    ...kept,
    reasons: judgeSafety(found, limits).reasons,
    instrument: instrument && instrumentInWords(instrument, doneAt.slice(0, 10)),
    sheetNumber,
    doneBy,
    doneAt,
    current: isNewest && safetyCheckIsCurrent({ lastSafetyPass: doneAt, lastWorkAt: lastWork?.toISOString() ?? null }),
  }
}
