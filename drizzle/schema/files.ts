import { sql } from 'drizzle-orm'
import { boolean, check, index, integer, pgEnum, pgTable, smallint, text, uuid } from 'drizzle-orm/pg-core'
import { PHOTO_SUBJECTS } from '../../shared/domain/photos'
import { instant, timestamps, version } from './columns'
import { readings } from './bench'
import { models } from './models'
import { people } from './people'
import { units } from './units'
import { modifications } from './modifications'

export const fileKind = pgEnum('file_kind', ['photo', 'document'])
export const photoSubject = pgEnum('photo_subject', PHOTO_SUBJECTS)

/** Bytes in the file store. What they are was judged by content; the name is only what the person called them. */
export const files = pgTable('files', {
  id: uuid().primaryKey().defaultRandom(),
  kind: fileKind().notNull(),
  name: text().notNull(),
  mediaType: text().notNull(),
  byteSize: integer().notNull(),
  sha256: text().notNull(),
  /** Pixels, after orientation; null for documents. */
  width: integer(),
  height: integer(),
  /** Set when the smaller AVIF sizes have been made in the background. */
  avifReadyAt: instant(),
  addedBy: uuid().notNull().references(() => people.id, { onDelete: 'restrict' }),
  createdAt: instant().notNull().defaultNow(),
}, t => [
  index('files_sha256_idx').on(t.sha256),
  check('files_size_positive', sql`${t.byteSize} > 0`),
])

export const photos = pgTable('photos', {
  id: uuid().primaryKey().defaultRandom(),
  unitId: uuid().notNull().references(() => units.id, { onDelete: 'restrict' }),
  fileId: uuid().notNull().references(() => files.id, { onDelete: 'restrict' }),
  modificationId: uuid().references(() => modifications.id, { onDelete: 'restrict' }),
  /** The reading whose waveform it shows. */
  readingId: uuid().references(() => readings.id, { onDelete: 'restrict' }),
  subject: photoSubject().notNull(),
  caption: text().notNull().default(''),
  position: smallint().notNull().default(0),
  /** Whether the buyer's sheet may show it. */
  isPublic: boolean().notNull().default(true),
  removedAt: instant(),
  version: version(),
  ...timestamps,
}, t => [index('photos_unit_idx').on(t.unitId), index('photos_modification_idx').on(t.modificationId), index('photos_reading_idx').on(t.readingId)])

/** Manuals and papers, of one unit or of every unit of a model. */
export const documents = pgTable('documents', {
  id: uuid().primaryKey().defaultRandom(),
  unitId: uuid().references(() => units.id, { onDelete: 'restrict' }),
  modelId: uuid().references(() => models.id, { onDelete: 'restrict' }),
  fileId: uuid().notNull().references(() => files.id, { onDelete: 'restrict' }),
  title: text().notNull(),
  isPublic: boolean().notNull().default(false),
  removedAt: instant(),
  ...timestamps,
}, t => [
  index('documents_unit_idx').on(t.unitId),
  index('documents_model_idx').on(t.modelId),
  check('documents_belong_once', sql`num_nonnulls(${t.unitId}, ${t.modelId}) = 1`),
])
