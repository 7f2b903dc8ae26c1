/**
 * The provenance sheet: what the buyer is given, made from the unit's records and nothing else. No cost, no shelf,
 * no person's name; a record that is missing shows as missing; only signed test sheets are evidence; and it says
 * what was checked, never that a thing is safe.
 */
import type { BandView } from '../types/model'
import type { DisclosureView } from '../types/disclosure'
import type { KeptWithView } from '../types/kept-with'
import type { ModificationView } from '../types/modification'
import type { PhotoView } from '../types/photo'
import type { ProvenanceSheet } from '../types/provenance'
import type { SafetyCheckView, TestSheetView } from '../types/bench'
import type { Fact } from '../types/unit'
import { describeCoverage } from './coverage'
import { DISCLOSURES } from './disclosures'
import type { EquipmentKind } from './equipment-kinds'
import { EQUIPMENT_KIND_LABELS } from './equipment-kinds'
import { FUNCTIONS, FUNCTION_LABELS } from './functions'
import type { Originality } from './originality'
import { ORIGINALITY_LABELS } from './kept-with'
import { factInWords } from './knowledge'
import { modificationHeading } from './modification-words'
import { DISPOSITION_LABELS, HAND_SAID, REASON_LABELS, REVERSIBILITY_SAID } from './modifications'
import { PHOTO_SUBJECT_LABELS } from './photos'
import { CHECK_RESULT_LABELS } from './sheet-checks'
import { DISCHARGE_CAUTION, storedChargeInWords } from './stored-charge'
import type { Hazard } from './triage'
import { HAZARD_CAUTIONS, HAZARD_LABELS, SAFETY_CLASS_LABELS } from './triage'
import type { UnitState } from './unit-state-names'
import { warmUpOf } from './warm-up'
import { yearsMade } from './years'

/** Everything the sheet is made from. Instants and days are ISO 8601. */
export interface ProvenanceFacts {
  tag: string
  state: UnitState
  shop: { name: string, address: string }
  asOf: string
  model: { maker: string, designation: string, kind: EquipmentKind, yearsFrom: number | null, yearsTo: number | null }
  serial: Fact
  supply: string
  supplyAsSet: string
  bands: BandView[]
  hazards: readonly Hazard[]
  hazardHold: string | null
  notEnergised: string | null
  originality: Originality
  modifications: readonly ModificationView[]
  sheets: readonly TestSheetView[]
  safety: SafetyCheckView | null
  keptWith: readonly KeptWithView[]
  disclosures: readonly DisclosureView[]
  photos: readonly PhotoView[]
}

/** The sheet as it stands on the day of `asOf`. */
export function makeProvenanceSheet(facts: ProvenanceFacts): ProvenanceSheet {
  return {
    form: 2,
    tag: facts.tag,
    shop: facts.shop,
    asOf: facts.asOf,
    state: facts.state,
    maker: facts.model.maker,
    designation: facts.model.designation,
    kind: EQUIPMENT_KIND_LABELS[facts.model.kind],
    years: yearsMade(facts.model.yearsFrom, facts.model.yearsTo),
    serial: facts.serial,
    supply: supplyInWords(facts.supply, facts.supplyAsSet),
    bands: facts.bands,
    coverage: coverageInWords(facts.bands),
    hazards: facts.hazards.map(hazard => ({ label: HAZARD_LABELS[hazard], caution: HAZARD_CAUTIONS[hazard] })),
    hazardHold: facts.hazardHold,
    notEnergised: facts.notEnergised,
    originality: { words: facts.originality.words, sentence: facts.originality.sentence, cautions: facts.originality.cautions },
    work: facts.modifications.filter(entry => entry.withdrawnBecause === null).map(workLine),
    sheets: facts.sheets.filter(sheet => sheet.signedAt !== null).map(testLine),
    safety: facts.safety && { doneAt: facts.safety.doneAt, passed: facts.safety.passed, lines: safetyLines(facts.safety), current: facts.safety.current },
    keptWith: facts.keptWith.map(keptWithLine),
    disclosures: facts.disclosures.map(disclosureLine),
    photos: facts.photos.filter(photo => photo.isPublic).map(({ id, subject, caption, width, height }) => ({ id, caption: caption || PHOTO_SUBJECT_LABELS[subject], width, height })),
  }
}

/** "110/200–250 V 50 Hz; as it stands: 240 V, three-pin plug". */
function supplyInWords(published: string, asSet: string): string {
  const set = asSet ? `as it stands: ${asSet}` : ''
  return [published, set].filter(Boolean).join('; ') || 'not known'
}

function coverageInWords(bands: readonly BandView[]): ProvenanceSheet['coverage'] {
  return FUNCTIONS.flatMap((each) => {
    const own = bands.filter(band => band.function === each)
    return own.length > 0 ? [{ function: FUNCTION_LABELS[each], words: describeCoverage(own) }] : []
  })
}

function workLine(entry: ModificationView): ProvenanceSheet['work'][number] {
  const old = entry.disposition === 'nothing_removed'
    ? ''
    : `Old parts: ${DISPOSITION_LABELS[entry.disposition].toLowerCase()}${entry.dispositionNote ? ` (${entry.dispositionNote})` : ''}`
  const lines = [
    HAND_SAID[entry.hand],
    entry.reason === 'not_known' ? '' : `Why: ${REASON_LABELS[entry.reason].toLowerCase()}`,
    entry.reversibility ? capital(REVERSIBILITY_SAID[entry.reversibility]) : '',
    old,
    entry.parts ? `Parts fitted: ${entry.parts}` : '',
    ...entry.fitted.map(part => `Part fitted: ${part}`),
    entry.testedAfter ? `Checked afterwards: ${entry.testedAfter}` : '',
  ].filter(Boolean)
  return { doneOn: entry.hand === 'found_like_this' ? null : entry.doneOn, hand: entry.hand, heading: modificationHeading(entry), lines }
}

function testLine(sheet: TestSheetView): ProvenanceSheet['sheets'][number] {
  const conditions = [
    sheet.warmUpMinutes === null ? '' : `after ${sheet.warmUpMinutes} minutes’ warm-up`,
    sheet.supply && `on ${sheet.supply}`,
    sheet.ambientCelsius === null ? '' : `at ${sheet.ambientCelsius} °C`,
  ].filter(Boolean).join(', ')
  return {
    number: sheet.number,
    testedOn: sheet.testedOn,
    instruments: sheet.instruments,
    conditions: conditions ? capital(conditions) : 'Warm-up, supply and temperature not recorded',
    staleBecause: sheet.staleBecause,
    instrumentWarnings: sheet.instrumentWarnings,
    decisionRule: sheet.decisionRule,
    readings: sheet.readings,
    earlier: sheet.earlier,
    drift: sheet.drift.readings.length > 0 ? [sheet.drift.label && `${sheet.drift.label}.`, warmUpOf(sheet.drift.readings).sentence].filter(Boolean).join(' ') : null,
    checks: sheet.checks.map(check => ({ name: check.name, result: CHECK_RESULT_LABELS[check.result], note: check.note })),
  }
}

/** Each thing that was measured, against the limit in force that day; what was not measured says so. */
export function safetyLines(check: SafetyCheckView): string[] {
  const stored = storedChargeInWords(check)
  const measured = (label: string, value: number | null, unit: string, limit: string) =>
    value === null ? `${label}: not measured` : `${label}: ${value} ${unit} (limit ${limit})`
  return [
    `Class: ${SAFETY_CLASS_LABELS[check.safetyClass]}`,
    measured('Protective earth', check.earthBondMilliohm, 'mΩ', `${check.earthBondLimitMilliohm} mΩ or less`),
    `${measured('Insulation', check.insulationKilohm, 'kΩ', `${check.insulationLimitKilohm} kΩ or more`)}${check.insulationKilohm !== null && check.insulationTestVolts ? ` at ${check.insulationTestVolts} V DC` : ''}`,
    measured('Leakage', check.leakageMicroamp, 'µA', `${check.leakageLimitMicroamp} µA or less`),
    `Lead and plug: ${CHECK_RESULT_LABELS[check.leadAndPlug].toLowerCase()}`,
    `Fuse: ${CHECK_RESULT_LABELS[check.fuse].toLowerCase()}${check.fuseRating ? `, fitted: ${check.fuseRating}` : ''}`,
    `Polarity: ${CHECK_RESULT_LABELS[check.polarity].toLowerCase()}`,
    `By eye: ${CHECK_RESULT_LABELS[check.visual].toLowerCase()}`,
    ...stored ? [`Stored charge: ${stored} ${DISCHARGE_CAUTION}`] : [],
    `Limits from: ${check.limitsOrigin}`,
    ...check.note ? [check.note] : [],
  ]
}

function keptWithLine(item: KeptWithView): ProvenanceSheet['keptWith'][number] {
  return {
    tag: item.tag,
    description: item.description,
    originality: ORIGINALITY_LABELS[item.originality],
    condition: item.condition,
    missing: item.whereabouts === 'missing' ? item.absenceDisclosed || 'Missing' : null,
  }
}

function disclosureLine(entry: DisclosureView): ProvenanceSheet['disclosures'][number] {
  return {
    key: entry.key,
    label: DISCLOSURES[entry.key].label,
    words: entry.answer === null ? 'not answered' : factInWords(entry.answer, entry.text),
    known: entry.answer === 'known',
  }
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}
