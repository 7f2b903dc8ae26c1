/**
 * The gate before any power: nothing is powered before a triage that allows it, nor under a hazard hold.
 */
import type { TriageVerdict } from './triage'

/** What the gate looks at: the hold's reason, and the newest triage's verdict, or null where there is none. */
export interface PowerFacts { hazardHold: string | null, triageVerdict: TriageVerdict | null }

export type PowerDecision = { allowed: true } | { allowed: false, code: 'hazard-hold' | 'triage-needed' | 'do-not-power', sentence: string }

/** Whether a unit may be powered, for a reading or a test that needs it; if not, why and what would change it. */
export function decidePower({ hazardHold, triageVerdict }: PowerFacts): PowerDecision {
  if (hazardHold !== null) {
    return { allowed: false, code: 'hazard-hold', sentence: `A hazard hold is on it (${hazardHold}), so nothing is measured under power. Deal with the hazard, lift the hold, then triage it again.` }
  }
  if (triageVerdict === null) {
    return { allowed: false, code: 'triage-needed', sentence: 'It has had no triage, the safety look before any power. Record a triage first.' }
  }
  if (triageVerdict === 'do_not_power') {
    return { allowed: false, code: 'do-not-power', sentence: 'Its last triage says “do not power”. Put right what was found, then triage it again.' }
  }
  if (triageVerdict === 'hazard_hold') {
    return { allowed: false, code: 'hazard-hold', sentence: 'Its last triage put it on hazard hold. Triage it again before any power.' }
  }
  return { allowed: true }
}
