import sharp from 'sharp'
import type { ProvenanceSheet } from '../../shared/types/provenance'
import type { Database } from '../utils/db'
import type { FileStore } from '../utils/file-store'
import type { PrintedPhoto } from '../utils/pdf/provenance-sheet'
import { printProvenanceSheet } from '../utils/pdf/provenance-sheet'
import { readFrozenPhoto } from './photos'

/** How many of the sheet's photos are printed; all of them are on its page. */
const PRINTED_PHOTOS = 5

/** The sheet as an A4 PDF, with its first photos. `link` is where its page stands, or null if it has none. */
export async function makeProvenancePdf(db: Database, store: FileStore, sheet: ProvenanceSheet, link: string | null): Promise<Buffer> {
  const photos: PrintedPhoto[] = []
  for (const { id, caption } of sheet.photos.slice(0, PRINTED_PHOTOS)) {
    // PDF holds neither WebP nor AVIF.
    const { data, info } = await sharp(await readFrozenPhoto(db, store, id, 800, 'webp')).jpeg({ quality: 85 }).toBuffer({ resolveWithObject: true })
    photos.push({ bytes: data, caption, width: info.width, height: info.height })
  }
  return printProvenanceSheet(sheet, photos, link)
}
