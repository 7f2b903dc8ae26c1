import { and, eq, isNull } from 'drizzle-orm'
import { bands, models, publications, sales, shop, units } from '../../drizzle/schema'
import { hintsFromRecord } from '../../shared/domain/disclosure-hints'
import { currentForm } from '../../shared/domain/frozen-provenance'
import { makeProvenanceSheet } from '../../shared/domain/provenance'
import type { PhotoFormat, PhotoWidth } from '../../shared/domain/photo-sizes'
import type { DisclosureView } from '../../shared/types/disclosure'
import type { ProvenanceSheet } from '../../shared/types/provenance'
import type { Database } from '../utils/db'
import { notFound } from '../utils/errors'
import type { FileStore } from '../utils/file-store'
import { listDisclosures } from './disclosures'
import { listKeptWith } from './kept-with'
import { listModifications } from './modifications'
import { gradeOriginality } from './originality'
import { listPhotos, readFrozenPhoto } from './photos'
import { findSafetyCheck } from './safety-checks'
import { getTestSheet, listTestSheets } from './test-sheets'
import { findTriage } from './triage'

interface ShopWords { name: string, address: string, defaultTerms: string }

async function shopWords(db: Database): Promise<ShopWords> {
  const [row] = await db.select({ name: shop.name, address: shop.address, defaultTerms: shop.defaultTerms }).from(shop)
  return row ?? { name: '', address: '', defaultTerms: '' }
}

/** The sheet a buyer would be given now, from the unit's records. `asOf` is an ISO 8601 instant. */
export async function buildProvenanceSheet(db: Database, unitId: string, asOf = new Date().toISOString()): Promise<ProvenanceSheet> {
  const [row] = await db.select({ unit: units, model: models }).from(units)
    .innerJoin(models, eq(models.id, units.modelId)).where(eq(units.id, unitId))
  if (!row) throw notFound('There is no such unit.')
  const { unit, model } = row
  const bandRows = await db.select().from(bands).where(eq(bands.modelId, model.id)).orderBy(bands.position)
  const summaries = (await listTestSheets(db, unit.id)).filter(sheet => sheet.signedAt !== null)
  const sheets = []
  for (const summary of summaries) sheets.push(await getTestSheet(db, { tag: unit.tag, number: summary.number }))
  const triage = await findTriage(db, unit.id)
  const { name, address } = await shopWords(db)
  return makeProvenanceSheet({
    tag: unit.tag,
    state: unit.state,
    shop: { name, address },
    asOf,
    model,
    serial: { answer: unit.serialAnswer, text: unit.serial },
    supply: model.supply,
    supplyAsSet: unit.supplyAsSet,
    bands: bandRows.map(({ label, function: does, lowerHz, upperHz, dialTolerancePercent }) => ({ label, function: does, lowerHz, upperHz, dialTolerancePercent })),
    hazards: triage?.hazards ?? [],
    hazardHold: unit.hazardHold,
    notEnergised: unit.notEnergisedDisclosure,
    originality: await gradeOriginality(db, unit),
    modifications: await listModifications(db, unit.id),
    sheets,
    safety: await findSafetyCheck(db, unit.id),
    keptWith: await listKeptWith(db, unit.id),
    disclosures: await listDisclosures(db, unit.id),
    photos: await listPhotos(db, unit.id),
  })
}

/** The topics a buyer must be told, each with what the record itself says. */
export async function describeForBuyer(db: Database, unitId: string): Promise<DisclosureView[]> {
  const sheet = await buildProvenanceSheet(db, unitId)
  const { defaultTerms } = await shopWords(db)
  const hints = hintsFromRecord(sheet, defaultTerms)
  const answered = await listDisclosures(db, unitId)
  return answered.map(entry => ({ ...entry, fromRecord: hints[entry.key] ?? '' }))
}

/** The unit's sheet as a buyer sees it: as it stood on the day of the sale once it is sold, else as it stands. */
export async function currentProvenanceSheet(db: Database, unitId: string): Promise<ProvenanceSheet> {
  const [sold] = await db.select({ sheet: sales.frozenSheet }).from(sales).where(and(eq(sales.unitId, unitId), isNull(sales.undoneAt)))
  return sold ? currentForm(sold.sheet) : buildProvenanceSheet(db, unitId)
}

/** The sheet behind a public link. Throws 404 for a link that was taken back or never given. */
export async function getPublicSheet(db: Database, token: string): Promise<ProvenanceSheet> {
  return currentProvenanceSheet(db, await publishedUnitId(db, token))
}

interface PublicPhoto { token: string, photoId: string, width: PhotoWidth, format: PhotoFormat }

/** A photo of the sheet behind a public link; only those on the sheet, and only while the link stands (else 404). */
export async function readPublicPhoto(db: Database, store: FileStore, { token, photoId, width, format }: PublicPhoto): Promise<Buffer> {
  const sheet = await getPublicSheet(db, token)
  if (!sheet.photos.some(photo => photo.id === photoId)) throw notFound('This photo is not on the sheet.')
  return readFrozenPhoto(db, store, photoId, width, format)
}

async function publishedUnitId(db: Database, token: string): Promise<string> {
  const [row] = await db.select({ unitId: publications.unitId }).from(publications)
    .where(and(eq(publications.token, token), isNull(publications.revokedAt)))
  if (!row) throw notFound('This link has been taken back, or was never given.', 'no-such-sheet')
  return row.unitId
}
