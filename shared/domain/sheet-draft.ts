/**
 * A test sheet while it is being filled in: everything as it is typed, what of it has changed since it was last saved,
 * and how it comes together with what somebody else has saved meanwhile.
 */
import type { DecisionRuleName } from './decision'
import type { Quantity } from './reading'
import type { CheckResult } from './sheet-checks'

export interface DraftCheck { name: string, result: CheckResult, note: string }
export interface DraftDrift { label: string, quantity: Quantity, readings: { minutes: string, text: string }[] }

/** What is written of one checkpoint. `instrumentId` empty: the best of the sheet's instruments. */
export interface DraftReading { found: string, left: string, instrumentId: string, note: string }
export const EMPTY_READING: DraftReading = { found: '', left: '', instrumentId: '', note: '' }

/** Every field as typed: text, even where a number is meant. */
export interface SheetDraft {
  testedOn: string
  warmUpMinutes: string
  supply: string
  ambientCelsius: string
  note: string
  deviations: string
  decisionRule: DecisionRuleName
  guardFactor: string
  instrumentIds: string[]
  /** By the point's number on the sheet. */
  readings: Record<number, DraftReading>
  checks: DraftCheck[]
  drift: DraftDrift
}

/** What a saved sheet tells of its fields. */
export interface SavedFields {
  testedOn: string
  warmUpMinutes: number | null
  supply: string
  ambientCelsius: number | null
  note: string
  deviations: string
  decisionRule: { rule: DecisionRuleName, factor: number }
  instrumentList: readonly { id: string }[]
  readings: readonly { position: number, found: { text: string } | null, left: { text: string } | null, instrumentId: string | null, note: string }[]
  checks: readonly DraftCheck[]
  drift: { label: string, quantity: Quantity, readings: readonly { minutes: number, text: string }[] }
}

const DRAFT_TEXTS = ['testedOn', 'warmUpMinutes', 'supply', 'ambientCelsius', 'note', 'deviations', 'guardFactor'] as const
type DraftText = (typeof DRAFT_TEXTS)[number]
const DRAFT_LISTS = ['decisionRule', 'instrumentIds', 'checks', 'drift'] as const
type DraftList = (typeof DRAFT_LISTS)[number]
export const READING_PARTS = ['found', 'left', 'instrumentId', 'note'] as const
export type ReadingPart = (typeof READING_PARTS)[number]

/** A field of a draft: one of its texts or lists, or one part of one reading. */
export type DraftKey = DraftText | DraftList | `readings.${number}.${ReadingPart}`

/** A saved sheet as it is opened for typing. */
export function draftOf(sheet: SavedFields): SheetDraft {
  return {
    testedOn: sheet.testedOn,
    warmUpMinutes: sheet.warmUpMinutes === null ? '' : String(sheet.warmUpMinutes),
    supply: sheet.supply,
    ambientCelsius: sheet.ambientCelsius === null ? '' : String(sheet.ambientCelsius),
    note: sheet.note,
    deviations: sheet.deviations,
    decisionRule: sheet.decisionRule.rule,
    guardFactor: String(sheet.decisionRule.factor),
    instrumentIds: sheet.instrumentList.map(({ id }) => id),
    readings: Object.fromEntries(sheet.readings.map(({ position, found, left, instrumentId, note }) =>
      [position, { found: found?.text ?? '', left: left?.text ?? '', instrumentId: instrumentId ?? '', note }])),
    checks: sheet.checks.map(check => ({ ...check })),
    drift: { label: sheet.drift.label, quantity: sheet.drift.quantity, readings: sheet.drift.readings.map(({ minutes, text }) => ({ minutes: String(minutes), text })) },
  }
}

const positionsOf = (draft: SheetDraft): number[] => Object.keys(draft.readings).map(Number)
const isText = (key: DraftKey): key is DraftText => DRAFT_TEXTS.some(text => text === key)

/** The point and the part that a field is of, or null for another field. */
export function readingKeyOf(key: DraftKey): { position: number, part: ReadingPart } | null {
  const [, position, part] = /^readings\.(\d+)\.(\w+)$/.exec(key) ?? []
  const known = READING_PARTS.find(each => each === part)
  return known === undefined ? null : { position: Number(position), part: known }
}

const readingOf = (draft: SheetDraft, position: number): DraftReading => draft.readings[position] ?? EMPTY_READING

/** A field as one comparable text. The order in which instruments were picked tells nothing. */
function comparable(draft: SheetDraft, key: DraftKey): string {
  if (isText(key)) return draft[key]
  if (key === 'decisionRule') return draft.decisionRule
  if (key === 'instrumentIds') return [...draft.instrumentIds].sort().join()
  if (key === 'checks') return JSON.stringify(draft.checks.map(({ name, result, note }) => [name, result, note]))
  if (key === 'drift') return JSON.stringify([draft.drift.label, draft.drift.quantity, draft.drift.readings.map(({ minutes, text }) => [minutes, text])])
  const of = readingKeyOf(key)
  return of ? readingOf(draft, of.position)[of.part] : ''
}

/** The fields in which two drafts of one sheet differ. */
export function changedKeys(base: SheetDraft, mine: SheetDraft): DraftKey[] {
  const positions = [...new Set([...positionsOf(base), ...positionsOf(mine)])].sort((a, b) => a - b)
  const readings = positions.filter(position => base.readings[position] !== mine.readings[position])
    .flatMap(position => READING_PARTS.map((part): DraftKey => `readings.${position}.${part}`))
  return [...DRAFT_TEXTS, ...DRAFT_LISTS, ...readings].filter(key => comparable(base, key) !== comparable(mine, key))
}

/** `base` with some fields as they are in `from`; neither is changed. */
export function withFields(base: SheetDraft, from: SheetDraft, keys: readonly DraftKey[]): SheetDraft {
  const taken: SheetDraft = { ...base, readings: { ...base.readings } }
  for (const key of keys) {
    const of = readingKeyOf(key)
    if (of) taken.readings[of.position] = { ...readingOf(taken, of.position), [of.part]: readingOf(from, of.position)[of.part] }
    else if (isText(key)) taken[key] = from[key]
    else copyList(taken, from, key)
  }
  return taken
}

function copyList(to: SheetDraft, from: SheetDraft, key: DraftKey): void {
  if (key === 'decisionRule') to.decisionRule = from.decisionRule
  else if (key === 'instrumentIds') to.instrumentIds = [...from.instrumentIds]
  else if (key === 'checks') to.checks = from.checks.map(check => ({ ...check }))
  else if (key === 'drift') to.drift = { ...from.drift, readings: from.drift.readings.map(row => ({ ...row })) }
}

/** What a save sends of a draft: only the fields named. */
export interface DraftPatch extends Partial<Record<DraftText, string>> {
  decisionRule?: DecisionRuleName
  instrumentIds?: string[]
  checks?: DraftCheck[]
  drift?: DraftDrift
  readings?: ({ position: number } & Partial<DraftReading>)[]
}

/** The fields of a draft as a save sends them. */
export function patchOf(draft: SheetDraft, keys: readonly DraftKey[]): DraftPatch {
  const patch: DraftPatch = {}
  const readings = new Map<number, { position: number } & Partial<DraftReading>>()
  for (const key of keys) {
    const of = readingKeyOf(key)
    if (of) readings.set(of.position, { ...readings.get(of.position) ?? { position: of.position }, [of.part]: readingOf(draft, of.position)[of.part] })
    else if (isText(key)) patch[key] = draft[key]
    else if (key === 'decisionRule') patch.decisionRule = draft.decisionRule
    else if (key === 'instrumentIds') patch.instrumentIds = [...draft.instrumentIds]
    else if (key === 'checks') patch.checks = draft.checks.map(check => ({ ...check }))
    else if (key === 'drift') patch.drift = { ...draft.drift, readings: draft.drift.readings.filter(({ minutes, text }) => minutes.trim() !== '' || text.trim() !== '') }
  }
  return readings.size > 0 ? { ...patch, readings: [...readings.values()] } : patch
}

/**
 * Brings together what two people typed on one sheet. A field that only one of them changed is taken from that one; a
 * field that both changed, to different words, is a conflict and stands as mine until the person has chosen.
 */
export function mergeDrafts(base: SheetDraft, mine: SheetDraft, theirs: SheetDraft): { merged: SheetDraft, conflicts: DraftKey[] } {
  const changedByMe = changedKeys(base, mine)
  return {
    merged: withFields(theirs, mine, changedByMe),
    conflicts: changedByMe.filter(key => comparable(base, key) !== comparable(theirs, key) && comparable(mine, key) !== comparable(theirs, key)),
  }
}
