/**
 * Judging an electrical safety check. It compares what was measured with the limits in force on the day, and says so;
 * it never says that a piece is safe.
 *
 * Suggested limits: the shop's own, which start from the UK code of practice for in-service inspection (Class I: earth
 * bond 0.1 Ω, insulation 1 MΩ, protective conductor current 3.5 mA; Class II: insulation 2 MΩ, touch current 0.25 mA).
 * Old equipment often misses them by design, and codes differ by country, so each is editable.
 */
import type { SafetyClass } from './triage'
import type { CheckResult } from './sheet-checks'

/** Milliohms, kilohms and microamperes. */
export interface SafetyLimits { earthBondMilliohm: number, insulationKilohm: number, leakageMicroamp: number }

/** What was found. Null: not measured. */
export interface SafetyFindings {
  safetyClass: SafetyClass
  earthBondMilliohm: number | null
  insulationKilohm: number | null
  leakageMicroamp: number | null
  leadAndPlug: CheckResult
  fuse: CheckResult
  polarity: CheckResult
  visual: CheckResult
}

export const SAFETY_SUBJECTS = ['class', 'earthBond', 'insulation', 'leakage', 'leadAndPlug', 'fuse', 'polarity', 'visual', 'measured'] as const
export type SafetySubject = (typeof SAFETY_SUBJECTS)[number]

/** One line of the judgement: met, failed, or missing (without which it can't pass). */
export interface SafetyReason { subject: SafetySubject, outcome: 'met' | 'failed' | 'missing', sentence: string }
export interface SafetyJudgement { passed: boolean, reasons: SafetyReason[] }

/** Said wherever a live chassis is checked, and to its buyer. */
export const LIVE_CHASSIS_CAUTION = 'One side of the mains is joined to the chassis. It stays live whatever this check finds: only the insulation of the cabinet, knobs and covered screws was checked. Work on it only through an isolating transformer, check the polarity of the supply, and add no socket or earth.'

/** Narrow space, so that a value never wraps inside itself. */
const NARROW = '\u202F'
const figure = (value: number): string => String(Number(value.toPrecision(10)))

/** Milliohms as read: "0.06 Ω". */
export const formatMilliohm = (value: number): string => `${figure(value / 1000)}${NARROW}Ω`
/** Kilohms as read: "1 MΩ", "470 kΩ". */
export const formatKilohm = (value: number): string => value >= 1000 ? `${figure(value / 1000)}${NARROW}MΩ` : `${figure(value)}${NARROW}kΩ`
/** Microamperes as read: "3.5 mA", "250 µA". */
export const formatMicroamp = (value: number): string => value >= 1000 ? `${figure(value / 1000)}${NARROW}mA` : `${figure(value)}${NARROW}µA`

const CLASS_II = { insulationKilohm: 2000, leakageMicroamp: 250 }
const CLASS_II_ORIGIN = 'UK code of practice for in-service inspection, Class II; check your own local code'

/**
 * The limits suggested for a class, with where they come from. For anything but an earthed piece, whose touchable parts
 * rely on insulation alone, the Class II figures apply where they are stricter than the shop's.
 */
export function suggestLimits(safetyClass: SafetyClass, shop: SafetyLimits, shopOrigin: string): { limits: SafetyLimits, origin: string } {
  if (safetyClass === 'earthed') return { limits: shop, origin: shopOrigin }
  const limits = {
    earthBondMilliohm: shop.earthBondMilliohm,
    insulationKilohm: Math.max(shop.insulationKilohm, CLASS_II.insulationKilohm),
    leakageMicroamp: Math.min(shop.leakageMicroamp, CLASS_II.leakageMicroamp),
  }
  const isTheShops = limits.insulationKilohm === shop.insulationKilohm && limits.leakageMicroamp === shop.leakageMicroamp
  return { limits, origin: isTheShops ? shopOrigin : CLASS_II_ORIGIN }
}

function judgeMost(subject: SafetySubject, name: string, value: number | null, limit: number, format: (value: number) => string): SafetyReason[] {
  if (value === null) return []
  const met = value <= limit
  return [{ subject, outcome: met ? 'met' : 'failed', sentence: `${name} ${format(value)} against a limit of ${format(limit)} at most: ${met ? 'within it' : 'beyond it'}.` }]
}

function judgeLeast(subject: SafetySubject, name: string, value: number | null, limit: number, format: (value: number) => string): SafetyReason[] {
  if (value === null) return []
  const met = value >= limit
  return [{ subject, outcome: met ? 'met' : 'failed', sentence: `${name} ${format(value)} against a limit of ${format(limit)} at least: ${met ? 'within it' : 'beyond it'}.` }]
}

const LOOKED_AT = { leadAndPlug: 'Lead and plug', fuse: 'Fuse', polarity: 'Polarity', visual: 'Visual inspection' } as const
type LookedAt = keyof typeof LOOKED_AT
const LOOKS = ['leadAndPlug', 'fuse', 'polarity', 'visual'] as const satisfies readonly LookedAt[]

/** Those found in order, in one line. */
function judgeFoundInOrder(found: SafetyFindings): SafetyReason[] {
  const names = LOOKS.filter(subject => found[subject] === 'pass').map(subject => LOOKED_AT[subject].toLowerCase())
  return names.length === 0 ? [] : [{ subject: 'visual', outcome: 'met', sentence: `Looked at and found in order: ${names.join(', ')}.` }]
}

/** A look either passes (and then says nothing more here), fails or is missing. The visual inspection is never "not applicable", nor polarity on a live chassis. */
function judgeLook(subject: LookedAt, result: CheckResult, safetyClass: SafetyClass): SafetyReason[] {
  const name = LOOKED_AT[subject]
  if (result === 'pass') return []
  if (result === 'fail') return [{ subject, outcome: 'failed', sentence: `${name}: failed.` }]
  const alwaysApplies = subject === 'visual' || (subject === 'polarity' && safetyClass === 'live_chassis')
  if (result === 'not_applicable' && !alwaysApplies) return []
  return [{ subject, outcome: 'missing', sentence: result === 'not_done' ? `${name}: not done.` : `${name} always applies to ${subject === 'visual' ? 'every piece' : 'a live chassis'}.` }]
}

function judgeMeasured(found: SafetyFindings): SafetyReason[] {
  const reasons: SafetyReason[] = []
  if (found.safetyClass === 'earthed' && found.earthBondMilliohm === null) {
    reasons.push({ subject: 'earthBond', outcome: 'missing', sentence: 'The earth bond was not measured: an earthed piece can’t pass without it.' })
  }
  if (found.insulationKilohm === null && found.leakageMicroamp === null) {
    reasons.push({ subject: 'measured', outcome: 'missing', sentence: 'Neither insulation nor leakage was measured: nothing shows what can reach the parts that are touched.' })
  }
  return reasons
}

/**
 * Whether a safety check passes, with every reason. It passes only if the class is known, the visual inspection was
 * made, no look failed or was left out, what its class asks for was measured and nothing measured lies beyond its limit.
 * A piece that runs on a battery or low voltage alone has no mains to measure: it passes on the looks.
 */
export function judgeSafety(found: SafetyFindings, limits: SafetyLimits): SafetyJudgement {
  const current = found.safetyClass === 'earthed' ? 'Leakage (protective conductor) current' : 'Leakage (touch) current'
  const insulation = found.safetyClass === 'live_chassis' ? 'Insulation from the mains and chassis to parts that can be touched' : 'Insulation'
  const reasons: SafetyReason[] = [
    ...(found.safetyClass === 'not_known'
      ? [{ subject: 'class' as const, outcome: 'missing' as const, sentence: 'Its class is not known, so there is nothing to judge it by. Find out whether it is earthed, double-insulated or has a live chassis.' }]
      : []),
    ...judgeMost('earthBond', 'Earth bond', found.earthBondMilliohm, limits.earthBondMilliohm, formatMilliohm),
    ...judgeLeast('insulation', insulation, found.insulationKilohm, limits.insulationKilohm, formatKilohm),
    ...judgeMost('leakage', current, found.leakageMicroamp, limits.leakageMicroamp, formatMicroamp),
    ...(found.safetyClass === 'low_voltage' ? [] : judgeMeasured(found)),
    ...judgeFoundInOrder(found),
    ...LOOKS.flatMap(subject => judgeLook(subject, found[subject], found.safetyClass)),
  ]
  return { passed: reasons.every(reason => reason.outcome === 'met'), reasons }
}

const CLASS_SAID: Record<SafetyClass, string> = {
  earthed: 'earthed (Class I)',
  double_insulated: 'double-insulated (Class II)',
  live_chassis: 'live-chassis equipment',
  low_voltage: 'battery or low-voltage equipment, without any mains test',
  not_known: 'of unknown class',
}

/** The outcome in a line: what was checked against which limits, never that the piece is safe. */
export function safetyHeadline(passed: boolean, safetyClass: SafetyClass): string {
  const kind = CLASS_SAID[safetyClass]
  return passed
    ? `Checked as ${kind}: all within the limits stated`
    : `Checked as ${kind}: not passed`
}
