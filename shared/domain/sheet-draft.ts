/**
 * A test sheet while it is being filled in: everything as it is typed, what of it has changed since it was last saved,
 * and how it comes together with what somebody else has saved meanwhile.
 */
import type { CheckResult } from './sheet-checks'

export interface DraftCheck { name: string, result: CheckResult, note: string }

/** Every field as typed: text, even where a number is meant. */
export interface SheetDraft {
  testedOn: string
  warmUpMinutes: string
  supply: string
  ambientCelsius: string
  note: string
  instrumentIds: string[]
  /** By the point's number on the sheet. */
  readings: Record<number, string>
  checks: DraftCheck[]
}

/** What a saved sheet tells of its fields. */
export interface SavedFields {
  testedOn: string
  warmUpMinutes: number | null
  supply: string
  ambientCelsius: number | null
  note: string
  instrumentList: readonly { id: string }[]
  readings: readonly { position: number, readingText: string | null }[]
  checks: readonly DraftCheck[]
}

const DRAFT_TEXTS = ['testedOn', 'warmUpMinutes', 'supply', 'ambientCelsius', 'note'] as const
type DraftText = (typeof DRAFT_TEXTS)[number]

/** A field of a draft: one of its texts, the instruments, the checks, or one reading. */
export type DraftKey = DraftText | 'instrumentIds' | 'checks' | `readings.${number}`

/** A saved sheet as it is opened for typing. */
export function draftOf(sheet: SavedFields): SheetDraft {
  return {
    testedOn: sheet.testedOn,
    warmUpMinutes: sheet.warmUpMinutes === null ? '' : String(sheet.warmUpMinutes),
    supply: sheet.supply,
    ambientCelsius: sheet.ambientCelsius === null ? '' : String(sheet.ambientCelsius),
    note: sheet.note,
    instrumentIds: sheet.instrumentList.map(({ id }) => id),
    readings: Object.fromEntries(sheet.readings.map(({ position, readingText }) => [position, readingText ?? ''])),
    checks: sheet.checks.map(check => ({ ...check })),
  }
}

const positionsOf = (draft: SheetDraft): number[] => Object.keys(draft.readings).map(Number)
const readingKey = (position: number): DraftKey => `readings.${position}`
const isText = (key: DraftKey): key is DraftText => DRAFT_TEXTS.some(text => text === key)

/** The number of the point that a field is the reading of, or null for another field. */
export function positionOf(key: DraftKey): number | null {
  return key.startsWith('readings.') ? Number(key.slice('readings.'.length)) : null
}

/** A field as one comparable text. The order in which instruments were picked tells nothing. */
function comparable(draft: SheetDraft, key: DraftKey): string {
  if (isText(key)) return draft[key]
  if (key === 'instrumentIds') return [...draft.instrumentIds].sort().join()
  if (key === 'checks') return JSON.stringify(draft.checks.map(({ name, result, note }) => [name, result, note]))
  return draft.readings[positionOf(key) ?? 0] ?? ''
}

/** The fields in which two drafts of one sheet differ. */
export function changedKeys(base: SheetDraft, mine: SheetDraft): DraftKey[] {
  const readings = [...new Set([...positionsOf(base), ...positionsOf(mine)])].sort((a, b) => a - b).map(readingKey)
  return [...DRAFT_TEXTS, 'instrumentIds' as const, 'checks' as const, ...readings].filter(key => comparable(base, key) !== comparable(mine, key))
}

/** `base` with some fields as they are in `from`; neither is changed. */
export function withFields(base: SheetDraft, from: SheetDraft, keys: readonly DraftKey[]): SheetDraft {
  const taken: SheetDraft = { ...base, readings: { ...base.readings } }
  for (const key of keys) {
    const position = positionOf(key)
    if (position !== null) taken.readings[position] = from.readings[position] ?? ''
    else if (key === 'instrumentIds') taken.instrumentIds = [...from.instrumentIds]
    else if (key === 'checks') taken.checks = from.checks.map(check => ({ ...check }))
    else if (isText(key)) taken[key] = from[key]
  }
  return taken
}

/** What a save sends of a draft: only the fields named. */
export interface DraftPatch {
  testedOn?: string
  warmUpMinutes?: string
  supply?: string
  ambientCelsius?: string
  note?: string
  instrumentIds?: string[]
  checks?: DraftCheck[]
  readings?: { position: number, readingText: string }[]
}

/** The fields of a draft as a save sends them. */
export function patchOf(draft: SheetDraft, keys: readonly DraftKey[]): DraftPatch {
  const patch: DraftPatch = {}
  const readings = keys.flatMap((key) => {
    const position = positionOf(key)
    return position === null ? [] : [{ position, readingText: draft.readings[position] ?? '' }]
  })
  for (const key of keys) {
    if (isText(key)) patch[key] = draft[key]
    else if (key === 'instrumentIds') patch.instrumentIds = [...draft.instrumentIds]
    else if (key === 'checks') patch.checks = draft.checks.map(check => ({ ...check }))
  }
  return readings.length > 0 ? { ...patch, readings } : patch
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

/** A draft kept by a browser, read back: null unless it is whole and of the same points. */
export function readKeptDraft(kept: unknown, like: SheetDraft): SheetDraft | null {
  if (typeof kept !== 'object' || kept === null) return null
  const fields = new Map<string, unknown>(Object.entries(kept))
  const texts = DRAFT_TEXTS.map(key => fields.get(key))
  if (!texts.every(text => typeof text === 'string')) return null
  const [testedOn = '', warmUpMinutes = '', supply = '', ambientCelsius = '', note = ''] = texts
  const instrumentIds = fields.get('instrumentIds')
  const checks = fields.get('checks')
  const readings = fields.get('readings')
  if (!Array.isArray(instrumentIds) || !instrumentIds.every(id => typeof id === 'string')) return null
  if (!Array.isArray(checks) || !checks.every(isDraftCheck)) return null
  if (typeof readings !== 'object' || readings === null) return null
  const typed = new Map<string, unknown>(Object.entries(readings))
  return {
    testedOn, warmUpMinutes, supply, ambientCelsius, note, instrumentIds, checks,
    readings: Object.fromEntries(positionsOf(like).map((position) => {
      const text = typed.get(String(position))
      return [position, typeof text === 'string' ? text : like.readings[position] ?? '']
    })),
  }
}

function isDraftCheck(check: unknown): check is DraftCheck {
  return typeof check === 'object' && check !== null && 'name' in check && typeof check.name === 'string'
    && 'note' in check && typeof check.note === 'string' && 'result' in check
    && (check.result === 'pass' || check.result === 'fail' || check.result === 'not_done' || check.result === 'not_applicable')
}
