import { sql } from 'drizzle-orm'
import { type AnyPgColumn, bigint, check, date, index, integer, pgEnum, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { COUNT_SETTLEMENTS, LOT_CONDITIONS, LOT_SOURCES, LOT_STANDINGS, MOVEMENT_KINDS, PART_KINDS, PART_RECALL_BASES, PART_RECALL_OUTCOMES } from '../../shared/domain/part-lots'
import { COUNTED_IN } from '../../shared/domain/part-quantity'
import { instant, timestamps, version } from './columns'
import { files } from './files'
import { locations } from './locations'
import { disposition, modifications } from './modifications'
import { people } from './people'
import { parties } from './shop'
import { units } from './units'

export const partKind = pgEnum('part_kind', PART_KINDS)
export const countedIn = pgEnum('counted_in', COUNTED_IN)
export const lotCondition = pgEnum('lot_condition', LOT_CONDITIONS)
export const lotSource = pgEnum('lot_source', LOT_SOURCES)
export const lotStanding = pgEnum('lot_standing', LOT_STANDINGS)
export const movementKind = pgEnum('movement_kind', MOVEMENT_KINDS)
export const countSettlement = pgEnum('count_settlement', COUNT_SETTLEMENTS)
export const partRecallBasis = pgEnum('part_recall_basis', PART_RECALL_BASES)
export const partRecallOutcome = pgEnum('part_recall_outcome', PART_RECALL_OUTCOMES)

/** What a part is, whoever made it and wherever it came from: the lots of one type are interchangeable on paper only. */
export const partTypes = pgTable('part_types', {
  id: uuid().primaryKey().defaultRandom(),
  kind: partKind().notNull(),
  description: text().notNull(),
  value: text().notNull().default(''),
  tolerance: text().notNull().default(''),
  rating: text().notNull().default(''),
  /** Package, base or mounting. */
  package: text().notNull().default(''),
  countedIn: countedIn().notNull().default('piece'),
  /** Fewer good ones than this in the drawers and it is to be reordered; smallest unit. Null: not watched. */
  minimum: integer(),
  version: version(),
  ...timestamps,
}, t => [
  uniqueIndex('part_types_key').on(t.kind, sql`lower(${t.description})`, sql`lower(${t.value})`, sql`lower(${t.tolerance})`, sql`lower(${t.rating})`, sql`lower(${t.package})`, t.countedIn),
  check('part_types_minimum', sql`${t.minimum} is null or ${t.minimum} > 0`),
])

/** Identical parts acquired together. Two lots are never merged, whatever their type. */
export const partLots = pgTable('part_lots', {
  id: uuid().primaryKey().defaultRandom(),
  tag: text().notNull(),
  typeId: uuid().notNull().references(() => partTypes.id, { onDelete: 'restrict' }),
  /** Maker and date code as marked on the part: a fake carries another's. */
  maker: text().notNull().default(''),
  dateCode: text().notNull().default(''),
  /** When it was made, as the date code was read; null where it is not known. */
  madeFrom: date({ mode: 'string' }),
  madeTo: date({ mode: 'string' }),
  condition: lotCondition().notNull(),
  /** How it was tested, with what: "94 to 101 % on the valve tester". */
  tested: text().notNull().default(''),
  note: text().notNull().default(''),
  sourceKind: lotSource().notNull(),
  supplierId: uuid().references(() => parties.id, { onDelete: 'restrict' }),
  invoiceNumber: text().notNull().default(''),
  donorUnitId: uuid().references(() => units.id, { onDelete: 'restrict' }),
  /** Which of our fittings came out of the donor again; null: a part it came with, or not known. */
  fromFittingId: uuid().references((): AnyPgColumn => fittings.id, { onDelete: 'restrict' }),
  parentLotId: uuid().references((): AnyPgColumn => partLots.id, { onDelete: 'restrict' }),
  acquiredOn: date({ mode: 'string' }).notNull(),
  /** In the drawer now, in the type's smallest unit, and what they cost together in minor units; null where it is not known. */
  quantity: integer().notNull(),
  costMinor: bigint({ mode: 'number' }),
  currency: text(),
  standing: lotStanding().notNull().default('good'),
  standingBecause: text().notNull().default(''),
  locationId: uuid().references(() => locations.id, { onDelete: 'restrict' }),
  photoFileId: uuid().references(() => files.id, { onDelete: 'restrict' }),
  enteredBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  version: version(),
  ...timestamps,
}, t => [
  uniqueIndex('part_lots_tag_key').on(t.tag),
  index('part_lots_type_idx').on(t.typeId),
  index('part_lots_donor_idx').on(t.donorUnitId),
  index('part_lots_from_fitting_idx').on(t.fromFittingId),
  index('part_lots_parent_idx').on(t.parentLotId),
  index('part_lots_supplier_idx').on(t.supplierId, t.invoiceNumber),
  index('part_lots_location_idx').on(t.locationId),
  check('part_lots_tag_form', sql`${t.tag} ~ '^P[0-9]{5,}[0-9A-Z]$'`),
  check('part_lots_never_below_zero', sql`${t.quantity} >= 0`),
  check('part_lots_cost', sql`${t.costMinor} is null or (${t.costMinor} >= 0 and (${t.quantity} > 0 or ${t.costMinor} = 0))`),
  check('part_lots_cost_has_currency', sql`(${t.costMinor} is null) = (${t.currency} is null)`),
  check('part_lots_donor_is_named', sql`(${t.sourceKind} = 'donor') = (${t.donorUnitId} is not null)`),
  check('part_lots_split_names_its_parent', sql`(${t.sourceKind} = 'split') = (${t.parentLotId} is not null)`),
  check('part_lots_pulled_from_a_donor', sql`${t.donorUnitId} is not null or ${t.fromFittingId} is null`),
  check('part_lots_not_its_own_source', sql`${t.parentLotId} <> ${t.id}`),
  check('part_lots_made_between', sql`(${t.madeFrom} is null) = (${t.madeTo} is null) and ${t.madeFrom} <= ${t.madeTo}`),
  check('part_lots_standing_says_why', sql`${t.standing} = 'good' or ${t.standingBecause} <> ''`),
])

/** A quantity of one lot placed in one unit. Without a lot: the honest “lot unknown”. */
export const fittings = pgTable('fittings', {
  id: uuid().primaryKey().defaultRandom(),
  modificationId: uuid().notNull().references(() => modifications.id, { onDelete: 'restrict' }),
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  lotId: uuid().references(() => partLots.id, { onDelete: 'restrict' }),
  /** What was fitted, where the lot is unknown. */
  description: text().notNull().default(''),
  quantity: integer().notNull(),
  circuitReference: text().notNull().default(''),
  replaced: text().notNull().default(''),
  /** Which earlier fitting of ours it took the place of. */
  replacesFittingId: uuid().references((): AnyPgColumn => fittings.id, { onDelete: 'restrict' }),
  disposition: disposition().notNull(),
  /** What the old part became, when it was returned to stock. */
  oldLotId: uuid().references((): AnyPgColumn => partLots.id, { onDelete: 'restrict' }),
  /** What it took out of its lot, in minor units of the lot's currency; null where not known. */
  costMinor: bigint({ mode: 'number' }),
  currency: text(),
  /** Taken out again later: replaced, or pulled from the piece as a donor. */
  removedAt: instant(),
  /** The fitting never stood: its entry was withdrawn, or this line was undone. */
  undoneAt: instant(),
  undoneBecause: text(),
  fittedBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  createdAt: instant().notNull().defaultNow(),
}, t => [
  index('fittings_unit_idx').on(t.unitId, t.createdAt),
  index('fittings_lot_idx').on(t.lotId, t.createdAt),
  index('fittings_modification_idx').on(t.modificationId),
  index('fittings_replaces_idx').on(t.replacesFittingId),
  index('fittings_old_lot_idx').on(t.oldLotId),
  check('fittings_quantity', sql`${t.quantity} > 0`),
  check('fittings_lot_or_words', sql`${t.lotId} is not null or ${t.description} <> ''`),
  check('fittings_cost_has_currency', sql`(${t.costMinor} is null) = (${t.currency} is null)`),
  check('fittings_undone_says_why', sql`(${t.undoneAt} is null) = (${t.undoneBecause} is null)`),
  check('fittings_old_lot_was_returned', sql`${t.oldLotId} is null or ${t.disposition} = 'returned_to_stock'`),
  check('fittings_not_their_own_place', sql`${t.replacesFittingId} <> ${t.id}`),
])

/** Every change of what is in a drawer. Append-only; the lot's quantity and cost are always the sums of these. */
export const lotMovements = pgTable('lot_movements', {
  id: bigint({ mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
  lotId: uuid().notNull().references(() => partLots.id, { onDelete: 'restrict' }),
  kind: movementKind().notNull(),
  /** Into the drawer above nought, out of it below. */
  quantity: integer().notNull(),
  costMinor: bigint({ mode: 'number' }),
  fittingId: uuid().references(() => fittings.id, { onDelete: 'restrict' }),
  /** The movement that this one takes back. */
  reversesId: bigint({ mode: 'number' }).references((): AnyPgColumn => lotMovements.id, { onDelete: 'restrict' }),
  note: text().notNull().default(''),
  personId: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  at: instant().notNull().defaultNow(),
}, t => [
  index('lot_movements_lot_idx').on(t.lotId, t.id),
  index('lot_movements_fitting_idx').on(t.fittingId),
  uniqueIndex('lot_movements_reversed_once').on(t.reversesId),
  check('lot_movements_move_something', sql`${t.quantity} <> 0`),
  check('lot_movements_direction', sql`(${t.reversesId} is not null) <> ((${t.kind} in ('received', 'found')) = (${t.quantity} > 0))`),
])

/** What somebody counted, beside what the book said at that moment. A difference stands open until it is settled. */
export const lotCounts = pgTable('lot_counts', {
  id: uuid().primaryKey().defaultRandom(),
  lotId: uuid().notNull().references(() => partLots.id, { onDelete: 'restrict' }),
  counted: integer().notNull(),
  book: integer().notNull(),
  note: text().notNull().default(''),
  countedBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  at: instant().notNull().defaultNow(),
  settledAs: countSettlement(),
  settledNote: text().notNull().default(''),
  settledBy: uuid().references(() => people.id, { onDelete: 'restrict' }),
  settledAt: instant(),
}, t => [
  index('lot_counts_lot_idx').on(t.lotId, t.at),
  index('lot_counts_open_idx').on(t.at).where(sql`${t.settledAt} is null and ${t.counted} <> ${t.book}`),
  check('lot_counts_not_negative', sql`${t.counted} >= 0 and ${t.book} >= 0`),
  check('lot_counts_settled_whole', sql`(${t.settledAs} is null) = (${t.settledAt} is null) and (${t.settledAt} is null) = (${t.settledBy} is null)`),
])

/** Parts that may be bad: every unit that has one is looked at, in stock and sold. Which lots it reaches follows from its basis. */
export const partRecalls = pgTable('part_recalls', {
  id: uuid().primaryKey().defaultRandom(),
  number: integer().notNull(),
  basis: partRecallBasis().notNull(),
  lotId: uuid().references(() => partLots.id, { onDelete: 'restrict' }),
  supplierId: uuid().references(() => parties.id, { onDelete: 'restrict' }),
  invoiceNumber: text().notNull().default(''),
  madeFrom: date({ mode: 'string' }),
  madeTo: date({ mode: 'string' }),
  /** Narrow a range of date codes too, where given. */
  kind: partKind(),
  maker: text().notNull().default(''),
  value: text().notNull().default(''),
  why: text().notNull(),
  raisedBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  closedAt: instant(),
  closedBy: uuid().references(() => people.id, { onDelete: 'restrict' }),
  version: version(),
  ...timestamps,
}, t => [
  uniqueIndex('part_recalls_number_key').on(t.number),
  check('part_recalls_basis_is_given', sql`case ${t.basis}
    when 'lot' then ${t.lotId} is not null
    when 'invoice' then ${t.supplierId} is not null and ${t.invoiceNumber} <> ''
    when 'made_between' then ${t.madeFrom} is not null and ${t.madeTo} is not null and ${t.madeFrom} <= ${t.madeTo}
    else ${t.maker} <> '' and ${t.value} <> '' end`),
  check('part_recalls_closed_by', sql`(${t.closedAt} is null) = (${t.closedBy} is null)`),
])

/** What was decided of one unit under a recall; a unit without a row is still to be looked at. */
export const partRecallDecisions = pgTable('part_recall_decisions', {
  recallId: uuid().notNull().references(() => partRecalls.id, { onDelete: 'restrict' }),
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  outcome: partRecallOutcome().notNull(),
  note: text().notNull().default(''),
  decidedBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  decidedAt: instant().notNull().defaultNow(),
}, t => [
  primaryKey({ name: 'part_recall_decisions_pkey', columns: [t.recallId, t.unitId] }),
  index('part_recall_decisions_unit_idx').on(t.unitId),
])
