import { modifications, triages } from '../../drizzle/schema'
import type { Capability } from '../../shared/domain/accuracy'
import type { Hand } from '../../shared/domain/modifications'
import type { TriageVerdict } from '../../shared/domain/triage'
import type { InstrumentView } from '../../shared/types/bench'
import type { Person } from '../../shared/types/person'
import { addInstrument } from '../../server/services/instruments'
import type { Database } from '../../server/utils/db'

/** A triage as recorded just now. */
export async function makeTriage(db: Database, doneBy: Person, unitId: string, verdict: TriageVerdict = 'may_be_powered'): Promise<void> {
  await db.insert(triages).values({ unitId, safetyClass: 'earthed', lead: 'sound', plug: 'sound', fuse: 'sound', verdict, doneBy: doneBy.id })
}

/** An entry of the work log as logged just now. */
export async function makeWork(db: Database, loggedBy: Person, unitId: string, hand: Hand = 'done_by_us'): Promise<void> {
  await db.insert(modifications).values({
    unitId, hand, place: 'C14', before: '0.1 µF paper', after: '0.1 µF film', reason: 'fault', disposition: 'kept_with_unit',
    reversibility: hand === 'left_alone' ? null : 're_solder', doneOn: hand === 'done_by_us' ? '2026-11-10' : null, loggedBy: loggedBy.id,
  })
}

/** A line of an instrument's specification: what is not said is not stated. */
export function makeCapability(said: Pick<Capability, 'quantity' | 'lower' | 'upper'> & Partial<Capability>): Capability {
  return {
    label: '', percentOfReading: null, percentOfRange: null, digits: null, digitStep: null, ppm: null, ageingPpmPerYear: null,
    gateSeconds: null, decibels: null, ...said,
  }
}

/** A frequency meter in date for years. */
export async function makeInstrument(db: Database, actor: Person): Promise<InstrumentView> {
  return addInstrument(db, actor, {
    name: 'Frequency meter', serial: '118', accuracy: '±0.1 ppm ±1 count',
    capabilities: [makeCapability({ quantity: 'frequency', lower: 10, upper: 100e6, ppm: 0.1, gateSeconds: 1 })],
    calibration: { calibratedOn: '2026-01-10', dueOn: '2099-01-10', certificateNumber: '88', laboratory: 'The county laboratory', traceableTo: 'the national standard', note: '' },
  })
}
