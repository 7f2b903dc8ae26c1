import { OWNERSHIP_LABELS, SOURCE_KIND_LABELS } from './acquisition'
import { DISCLOSURES } from './disclosures'
import { KEPT_WITH_KIND_LABELS, ORIGINALITY_LABELS, WHEREABOUTS_LABELS } from './kept-with'
import { KNOWLEDGE_LABELS } from './knowledge'
import { DISPOSITION_LABELS, HAND_LABELS, REASON_LABELS, REVERSIBILITY_LABELS } from './modifications'
import { PHOTO_SUBJECT_LABELS } from './photos'
import { ROLE_LABELS } from './roles'
import { HAZARD_LABELS, SAFETY_CLASS_LABELS, TRIAGE_VERDICT_LABELS } from './triage'
import { UNIT_STATE_LABELS } from './unit-state-names'

/** What an entry remembers, as it comes from the database: an older entry may lack what a newer one has. */
export type EntryDetails = Readonly<Record<string, unknown>>

/** Closed vocabularies an entry may name a value of. */
export const VOCABULARIES = {
  state: UNIT_STATE_LABELS,
  verdict: TRIAGE_VERDICT_LABELS,
  safetyClass: SAFETY_CLASS_LABELS,
  hazard: HAZARD_LABELS,
  hand: HAND_LABELS,
  ownership: OWNERSHIP_LABELS,
  source: SOURCE_KIND_LABELS,
  subject: PHOTO_SUBJECT_LABELS,
  answer: KNOWLEDGE_LABELS,
  role: ROLE_LABELS,
  topic: Object.fromEntries(Object.entries(DISCLOSURES).map(([key, { label }]) => [key, label])),
  kind: KEPT_WITH_KIND_LABELS,
  originality: ORIGINALITY_LABELS,
  whereabouts: WHEREABOUTS_LABELS,
  reversibility: REVERSIBILITY_LABELS,
  disposition: DISPOSITION_LABELS,
  reason: REASON_LABELS,
} satisfies Record<string, Record<string, string>>
export type Vocabulary = keyof typeof VOCABULARIES

/** The label of a stored value; the value itself where it is not of the vocabulary. */
export function labelOf(vocabulary: Vocabulary, value: string): string {
  const labels: Record<string, string> = VOCABULARIES[vocabulary]
  return labels[value] ?? value
}

/** A text field of an entry; empty where it has none. */
export function wordsIn(details: EntryDetails, field: string): string {
  const value = details[field]
  if (typeof value === 'number') return String(value)
  return typeof value === 'string' ? value.trim() : ''
}

export function numberIn(details: EntryDetails, field: string): number | null {
  const value = details[field]
  return typeof value === 'number' && Number.isFinite(value) ? value : null
}

export function listIn(details: EntryDetails, field: string): string[] {
  const value = details[field]
  return Array.isArray(value) ? value.filter(item => typeof item === 'string') : []
}

interface Change { field: string, from: string | null, to: string | null }

const isRecord = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null

/** The changes an entry remembers, whichever of their parts are there. */
export function changesIn(details: EntryDetails): Change[] {
  const value = details.changes
  if (!Array.isArray(value)) return []
  return value.filter(isRecord).map(change => ({
    field: wordsIn(change, 'field'), from: wordsIn(change, 'from') || null, to: wordsIn(change, 'to') || null,
  }))
}

/** Columns whose name is not how a person would say it. */
const FIELD_WORDS: Record<string, string> = {
  serial: 'serial number',
  serialAnswer: 'what is known of the serial number',
  conditionNotes: 'condition on arrival',
  supplyAsSet: 'supply as set',
  sourceKind: 'where it came from',
  sourceNote: 'note on where it came from',
  sourceName: 'who it came from',
  acquiredOn: 'day it came',
  costMinor: 'cost',
  askingMinor: 'asking price',
  modelId: 'model',
  locationId: 'place',
  placeTag: 'place',
  before: 'what was there',
  after: 'what is there now',
  hand: 'whose hand',
  doneOn: 'day of the work',
  dispositionNote: 'note on the removed parts',
  disposition: 'what became of the removed parts',
  testedAfter: 'what was checked afterwards',
  ownerConsent: 'owner’s consent',
  reversibility: 'whether it can be undone',
  parts: 'parts fitted',
}

/** A field's name as people say it: `dispositionNote`, unless it has words of its own, becomes "disposition note". */
export function fieldWords(field: string): string {
  return FIELD_WORDS[field] ?? field.replace(/([a-z])([A-Z])/g, '$1 $2').replaceAll('_', ' ').toLowerCase()
}

const FIELD_VOCABULARIES: Record<string, Vocabulary> = {
  serialAnswer: 'answer', sourceKind: 'source', ownership: 'ownership', hand: 'hand', reversibility: 'reversibility',
  disposition: 'disposition', reason: 'reason', kind: 'kind', originality: 'originality', whereabouts: 'whereabouts', state: 'state', role: 'role',
}

/** One change as a line: "Serial number: was 4417, now 4471". */
export function changeInWords({ field, from, to }: Change): string {
  const vocabulary = FIELD_VOCABULARIES[field]
  const said = (value: string | null) => value === null ? 'nothing' : vocabulary ? labelOf(vocabulary, value) : value
  const name = capital(fieldWords(field))
  if (from === null) return `${name}: now ${said(to)}`
  if (to === null) return `${name}: was ${said(from)}, now empty`
  return `${name}: was ${said(from)}, now ${said(to)}`
}

export const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1)

/** "a", "a and b", "a, b and c". */
export function listed(items: readonly string[]): string {
  const last = items.at(-1) ?? ''
  return items.length < 2 ? last : `${items.slice(0, -1).join(', ')} and ${last}`
}

/** A sentence a person could read aloud, without its full stop, and what is told beneath it. */
export interface Telling { sentence: string, details: string[] }
/** A sentence with the lines beneath it. */
export const tell = (sentence: string, ...details: string[][]): Telling => ({ sentence: sentence.trim(), details: details.flat() })
/** A line of its own for what is not empty. */
export const lineOf = (label: string, text: string): string[] => text === '' ? [] : [`${label}: ${text}`]
/** Why it was done, where that was said. */
export const why = (details: EntryDetails): string[] => lineOf('Why', wordsIn(details, 'why'))
