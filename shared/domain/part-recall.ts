/**
 * What a recall of parts reaches: from its basis to lots, from lots to the units they went into, and through parts that were
 * pulled from those to further units (common practice of traceability, no source).
 */
import type { PartKind, PartRecallBasis } from './part-lots'
import type { CountedIn } from './part-quantity'
import { formatQuantity } from './part-quantity'
import { partTitle } from './part-words'
import { parseReading } from './reading'
import { formatTag } from './tag'

/** What a recall goes by. Days are `YYYY-MM-DD`, both included; an empty maker and a null kind narrow nothing. */
export type RecallBasis
  = | { basis: 'lot', lotId: string }
    | { basis: 'invoice', supplierId: string, invoiceNumber: string }
    | { basis: 'made_between', madeFrom: string, madeTo: string, kind: PartKind | null, maker: string }
    | { basis: 'maker_and_value', maker: string, value: string }

/** A lot as far as a recall asks. Days are `YYYY-MM-DD` in the shop's zone. */
export interface RecallLot {
  id: string
  tag: string
  kind: PartKind
  description: string
  value: string
  countedIn: CountedIn
  maker: string
  madeFrom: string | null
  madeTo: string | null
  supplierId: string | null
  invoiceNumber: string
  parentLotId: string | null
  donorUnitId: string | null
  donorTag: string | null
  /** The fitting of ours that was pulled to make it; null: a part the donor came with, or nobody said which. */
  fromFittingId: string | null
  acquiredOn: string
}

/** A fitting that was not undone. Days are `YYYY-MM-DD` in the shop's zone. */
export interface RecallFitting {
  id: string
  unitId: string
  /** Null: the lot is unknown, so that it only says what came out. */
  lotId: string | null
  modificationId: string
  /** In the lot's smallest unit. */
  quantity: number
  circuitReference: string
  fittedOn: string
  /** Null while it stands. */
  removedOn: string | null
  /** The lot that the part became whose place it took. */
  oldLotId: string | null
  /** The instant it was entered in the book, ISO 8601. */
  enteredAt: string
}

export const UNIT_REACHES = ['fitted', 'may_be', 'taken_out'] as const
export type UnitReach = (typeof UNIT_REACHES)[number]
export const UNIT_REACH_LABELS: Record<UnitReach, string> = { fitted: 'In it', may_be: 'May be: look', taken_out: 'Was in it, taken out' }

export const LOT_REACHES = ['in_basis', 'split_out', 'pulled', 'may_be'] as const
export type LotReach = (typeof LOT_REACHES)[number]
export const LOT_REACH_LABELS: Record<LotReach, string> = {
  in_basis: 'Recalled',
  split_out: 'Taken out of a recalled lot',
  pulled: 'Pulled again from a unit that had it',
  may_be: 'May be: look',
}

/** What keeps a lot from being judged by a basis. */
export type UnknownMark = 'date' | 'maker'
export const UNKNOWN_MARK_LABELS: Record<UnknownMark, string> = { date: 'Date not known: look', maker: 'Maker not known: look' }

export interface ReachedUnit {
  unitId: string
  how: UnitReach
  /** Each part that reaches it, in words: "C14: suppression capacitor X2 · 0.1 µF, P 000004 X". */
  reasons: string[]
  /** When the newest of them was entered in the book, ISO 8601: what was decided before then did not know of it. */
  lastEnteredAt: string
}

export interface PartRecallReach {
  lots: { id: string, how: LotReach }[]
  /** Lots that the basis would reach if what is not known of them were so; nothing is walked from them. */
  lookAt: { id: string, unknown: UnknownMark }[]
  units: ReachedUnit[]
}

const same = (one: string, other: string) => one.trim().toLowerCase() === other.trim().toLowerCase()
const bare = (value: string) => value.normalize('NFKC').replace(/\s/gu, '').replace(',', '.').toLowerCase()
const VALUE_QUANTITIES = ['capacitance', 'resistance', 'inductance'] as const

/** Whether two values as typed are one: "0.1 µF", "0,1µF" and "100 nF" are; "10 mH" and "10 MΩ" are not. */
export function sameValue(one: string, other: string): boolean {
  for (const quantity of VALUE_QUANTITIES) {
    const [a, b] = [parseReading(one, quantity), parseReading(other, quantity)]
    if (a.ok && b.ok) return Math.abs(a.value - b.value) <= 1e-9 * Math.abs(a.value)
  }
  return bare(one) === bare(other)
}

type Answer = 'in' | 'out' | 'silent' | UnknownMark

/** What a lot says of itself to a basis; a silent one goes by the lot it was taken out of. */
function answer(basis: RecallBasis, lot: RecallLot): Answer {
  switch (basis.basis) {
    case 'lot': return lot.id === basis.lotId ? 'in' : 'silent'
    case 'invoice': return lot.supplierId === basis.supplierId && same(lot.invoiceNumber, basis.invoiceNumber) ? 'in' : 'silent'
    case 'made_between': return datedAnswer(basis, lot)
    case 'maker_and_value': return sameValue(basis.value, lot.value) ? makerAnswer(basis.maker, lot) : 'out'
  }
}

function datedAnswer({ madeFrom, madeTo, kind, maker }: Extract<RecallBasis, { basis: 'made_between' }>, lot: RecallLot): Answer {
  if (kind !== null && lot.kind !== kind) return 'out'
  const byMaker = maker === '' ? 'in' : makerAnswer(maker, lot)
  if (byMaker === 'out') return 'out'
  if (lot.madeFrom === null || lot.madeTo === null) return 'date'
  return lot.madeFrom <= madeTo && lot.madeTo >= madeFrom ? byMaker : 'out'
}

function makerAnswer(maker: string, lot: RecallLot): Answer {
  if (lot.maker.trim() === '') return 'maker'
  return same(lot.maker, maker) ? 'in' : 'out'
}

/** Every one that is reached from the starts, each once: where a part went round in a circle the walk ends. */
function walk(starts: readonly string[], next: (id: string) => readonly string[]): Set<string> {
  const reached = new Set(starts)
  // A set is iterated in the order of adding, those added meanwhile too.
  for (const id of reached) for (const further of next(id)) reached.add(further)
  return reached
}

function groupBy<T>(items: readonly T[], keyOf: (item: T) => string | null): (key: string) => readonly T[] {
  const groups = new Map<string, T[]>()
  for (const item of items) {
    const key = keyOf(item)
    const group = key === null ? undefined : groups.get(key)
    if (group) group.push(item)
    else if (key !== null) groups.set(key, [item])
  }
  return key => groups.get(key) ?? []
}

/** Lots and fittings by what leads from one to the next. */
function indexOf(lots: readonly RecallLot[], fittings: readonly RecallFitting[]) {
  return {
    splitsOf: groupBy(lots, ({ parentLotId }) => parentLotId),
    pulledAs: groupBy(lots, ({ fromFittingId }) => fromFittingId),
    pulledFromUnit: groupBy(lots.filter(({ fromFittingId }) => fromFittingId === null), ({ donorUnitId }) => donorUnitId),
    fittingsOf: groupBy(fittings, ({ lotId }) => lotId),
    tookPlaceOf: groupBy(fittings, ({ oldLotId }) => oldLotId),
  }
}
type Index = ReturnType<typeof indexOf>

/**
 * Whether a lot pulled from the fitting's unit, without a word on which part it was, may be that part: of its kind (or an
 * assembly that may hold it), pulled while it was in there, and not known to have been another one.
 */
function mayBe(fitting: RecallFitting, fitted: RecallLot, pulled: RecallLot, { pulledAs, tookPlaceOf }: Index): boolean {
  if (pulled.id === fitted.id || (pulled.kind !== fitted.kind && pulled.kind !== 'assembly')) return false
  if (pulled.acquiredOn < fitting.fittedOn || (fitting.removedOn !== null && fitting.removedOn < pulled.acquiredOn)) return false
  return pulledAs(fitting.id).length === 0 && !tookPlaceOf(pulled.id).some(later => isAnotherPlace(later, fitting))
}

/** Whether the part whose place `later` took was another than `fitting`: both went in together, or at places that differ. */
function isAnotherPlace(later: RecallFitting, fitting: RecallFitting): boolean {
  if (later.modificationId === fitting.modificationId) return true
  return later.circuitReference !== '' && fitting.circuitReference !== '' && !same(later.circuitReference, fitting.circuitReference)
}

/**
 * The lots and units that a recall reaches. `lots` and `fittings` are those that may be reached (more do no harm); fittings that
 * were undone are left out by the caller, for they never stood.
 */
export function reachOf(basis: RecallBasis, lots: readonly RecallLot[], fittings: readonly RecallFitting[]): PartRecallReach {
  const byId = new Map(lots.map(lot => [lot.id, lot]))
  const index = indexOf(lots, fittings)
  const answers = new Map(lots.map(lot => [lot.id, answer(basis, lot)]))

  const ids = (found: readonly RecallLot[]) => found.map(({ id }) => id)
  const splits = (id: string) => ids(index.splitsOf(id)).filter(split => answers.get(split) !== 'out')
  const named = (id: string) => index.fittingsOf(id).flatMap(fitting => ids(index.pulledAs(fitting.id)))
  const unnamed = (id: string) => index.fittingsOf(id).flatMap((fitting) => {
    const fitted = byId.get(id)
    return fitted ? ids(index.pulledFromUnit(fitting.unitId).filter(pulled => mayBe(fitting, fitted, pulled, index))) : []
  })

  const certain = walk(ids(lots.filter(({ id }) => answers.get(id) === 'in')), id => [...splits(id), ...named(id)])
  const doubtful = walk([...certain].flatMap(unnamed), id => [...splits(id), ...named(id), ...unnamed(id)])
  const reached = lots.filter(({ id }) => certain.has(id) || doubtful.has(id))

  return {
    lots: reached.map(lot => ({ id: lot.id, how: lotReach(lot, answers, certain) })),
    lookAt: lots.flatMap(({ id }) => {
      const said = answers.get(id)
      return (said === 'date' || said === 'maker') && !certain.has(id) && !doubtful.has(id) ? [{ id, unknown: said }] : []
    }),
    units: unitsOf(reached.flatMap(lot => index.fittingsOf(lot.id).map(fitting => ({ fitting, lot, isCertain: certain.has(lot.id) })))),
  }
}

function lotReach(lot: RecallLot, answers: Map<string, Answer>, certain: Set<string>): LotReach {
  if (!certain.has(lot.id)) return 'may_be'
  if (answers.get(lot.id) === 'in') return 'in_basis'
  return lot.parentLotId !== null && certain.has(lot.parentLotId) ? 'split_out' : 'pulled'
}

interface ReachedFitting { fitting: RecallFitting, lot: RecallLot, isCertain: boolean }

function unitsOf(reached: readonly ReachedFitting[]): ReachedUnit[] {
  const ofUnit = groupBy(reached, ({ fitting }) => fitting.unitId)
  return [...new Set(reached.map(({ fitting }) => fitting.unitId))].map((unitId) => {
    const parts = [...ofUnit(unitId)].sort(inReadingOrder)
    return {
      unitId,
      how: unitReach(parts),
      reasons: parts.map(reasonInWords),
      lastEnteredAt: parts.reduce((last, { fitting }) => fitting.enteredAt > last ? fitting.enteredAt : last, ''),
    }
  })
}

function inReadingOrder(one: ReachedFitting, other: ReachedFitting): number {
  const [isOut, isOtherOut] = [one.fitting.removedOn !== null, other.fitting.removedOn !== null]
  return Number(isOut) - Number(isOtherOut) || one.fitting.circuitReference.localeCompare(other.fitting.circuitReference, 'en', { numeric: true })
}

/** What stands in a unit outweighs what was taken out of it, and what is known what may be. */
function unitReach(parts: readonly ReachedFitting[]): UnitReach {
  const stands = parts.filter(({ fitting }) => fitting.removedOn === null)
  if (stands.some(({ isCertain }) => isCertain)) return 'fitted'
  return stands.length > 0 || parts.every(({ isCertain }) => !isCertain) ? 'may_be' : 'taken_out'
}

/** "C14: 2 × suppression capacitor X2 · 0.1 µF, P 000004 X, taken out again". */
function reasonInWords({ fitting, lot, isCertain }: ReachedFitting): string {
  const many = formatQuantity(fitting.quantity, lot.countedIn)
  const opening = `${fitting.circuitReference && `${fitting.circuitReference}: `}${many === '1' ? '' : `${many} × `}`
  const title = partTitle({ description: lot.description, value: lot.value })
  return [
    `${opening}${opening === '' ? title : inSentence(title)}`,
    formatTag(lot.tag),
    lot.donorTag === null ? '' : `pulled from ${formatTag(lot.donorTag)}`,
    isCertain ? '' : 'may be one of them',
    fitting.removedOn === null ? '' : 'taken out again',
  ].filter(Boolean).join(', ')
}

/** Within a sentence a title goes without its capital; an abbreviation keeps it. */
const inSentence = (title: string) => /^\p{Lu}\p{Ll}/u.test(title) ? title.charAt(0).toLowerCase() + title.slice(1) : title

interface NamedBasis { basis: PartRecallBasis, lotTitle: string | null, supplier: string | null, invoiceNumber: string | null, kindLabel: string | null, maker: string, value: string, made: string }

/** What a recall goes by, in words; names and invoices are null for those who may not read them. */
export function basisInWords({ basis, lotTitle, supplier, invoiceNumber, kindLabel, maker, value, made }: NamedBasis): string {
  if (basis === 'lot') return lotTitle ?? 'One lot'
  if (basis === 'invoice') return supplier === null || invoiceNumber === null ? 'A supplier’s invoice' : `Invoice ${invoiceNumber} of ${supplier}`
  if (basis === 'maker_and_value') return `${maker}, ${value}`
  return [[kindLabel, maker && `marked ${maker}`].filter(Boolean).join(' ') || 'Any part', `made ${made}`].join(', ')
}
