import { decidePower } from '../../shared/domain/power-gate'
import type { PowerDecision } from '../../shared/domain/power-gate'
import type { Database } from '../utils/db'
import { conflict } from '../utils/errors'
import { findTriage } from './triage'
import type { UnitRow } from './unit-lock'

/** Whether the unit may be powered now. */
export async function findPowerDecision(db: Database, unit: UnitRow): Promise<PowerDecision> {
  const triage = await findTriage(db, unit.id)
  return decidePower({ hazardHold: unit.hazardHold, triageVerdict: triage?.verdict ?? null })
}

/** 409 unless the unit, whose row the caller has locked, may be powered. */
export async function requirePower(tx: Database, unit: UnitRow): Promise<void> {
  const decision = await findPowerDecision(tx, unit)
  if (decision.allowed) return
  throw conflict(decision.code, decision.sentence, {
    refusals: [{ guard: decision.code, sentence: decision.sentence, remedy: 'Record a triage that allows power.', href: `/units/${unit.tag}/triage` }],
  })
}
