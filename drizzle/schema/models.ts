import { sql } from 'drizzle-orm'
import { bigint, check, index, integer, numeric, pgEnum, pgTable, smallint, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { EQUIPMENT_KINDS, TECHNOLOGIES } from '../../shared/domain/equipment-kinds'
import { FUNCTIONS } from '../../shared/domain/functions'
import { KEPT_WITH_KINDS } from '../../shared/domain/kept-with'
import { HAZARDS } from '../../shared/domain/triage'
import { timestamps, version } from './columns'

export const equipmentKind = pgEnum('equipment_kind', EQUIPMENT_KINDS)
export const technology = pgEnum('technology', TECHNOLOGIES)
export const coverageFunction = pgEnum('coverage_function', FUNCTIONS)
export const keptWithKind = pgEnum('kept_with_kind', KEPT_WITH_KINDS)
export const hazard = pgEnum('hazard', HAZARDS)

/** Maker and type designation with the published specification. */
export const models = pgTable('models', {
  id: uuid().primaryKey().defaultRandom(),
  maker: text().notNull(),
  designation: text().notNull(),
  kind: equipmentKind().notNull(),
  technology: technology(),
  yearsFrom: smallint(),
  yearsTo: smallint(),
  /** As published: "110/200–250 V 50 Hz". */
  supply: text().notNull().default(''),
  summary: text().notNull().default(''),
  /** Hazards to look for in every one of them. */
  typicalHazards: hazard().array().notNull().default(sql`'{}'`),
  /** Published dial tolerance, ± per cent of the setting; null where the dial is not specified. */
  dialTolerancePercent: numeric({ precision: 7, scale: 4, mode: 'number' }),
  /** Internal modulation tone, hertz, where there is one. */
  modulationHz: integer(),
  version: version(),
  ...timestamps,
}, t => [
  uniqueIndex('models_name_key').on(sql`lower(${t.maker})`, sql`lower(${t.designation})`),
  check('models_years_in_order', sql`${t.yearsFrom} is null or ${t.yearsTo} is null or ${t.yearsFrom} <= ${t.yearsTo}`),
  check('models_tolerance_positive', sql`${t.dialTolerancePercent} is null or ${t.dialTolerancePercent} > 0`),
])

/** One switch position: lower and upper edge in whole hertz, both within the band. Equal edges are a spot frequency; zero is DC. */
export const bands = pgTable('bands', {
  id: uuid().primaryKey().defaultRandom(),
  modelId: uuid().notNull().references(() => models.id, { onDelete: 'restrict' }),
  position: smallint().notNull(),
  label: text().notNull(),
  function: coverageFunction().notNull(),
  lowerHz: bigint({ mode: 'number' }).notNull(),
  upperHz: bigint({ mode: 'number' }).notNull(),
  /** Where this band differs from the model's tolerance. */
  dialTolerancePercent: numeric({ precision: 7, scale: 4, mode: 'number' }),
}, t => [
  uniqueIndex('bands_position_key').on(t.modelId, t.position),
  check('bands_edges_in_order', sql`${t.lowerHz} >= 0 and ${t.lowerHz} <= ${t.upperHz} and ${t.upperHz} > 0`),
  check('bands_upper_sane', sql`${t.upperHz} <= 3000000000000`),
  check('bands_tolerance_positive', sql`${t.dialTolerancePercent} is null or ${t.dialTolerancePercent} > 0`),
])

/** What a complete one came with, so that what arrives can be counted against it. */
export const modelKitItems = pgTable('model_kit_items', {
  id: uuid().primaryKey().defaultRandom(),
  modelId: uuid().notNull().references(() => models.id, { onDelete: 'restrict' }),
  position: smallint().notNull(),
  kind: keptWithKind().notNull(),
  description: text().notNull(),
  quantity: smallint().notNull().default(1),
}, t => [
  index('model_kit_items_model_idx').on(t.modelId),
  check('model_kit_items_quantity', sql`${t.quantity} > 0`),
])
