import { and, asc, count, eq, isNull } from 'drizzle-orm'
import { keptWithItems, models, photos, shop } from '../../drizzle/schema'
import { SOURCE_KIND_LABELS } from '../../shared/domain/acquisition'
import { EQUIPMENT_KIND_LABELS } from '../../shared/domain/equipment-kinds'
import { factInWords } from '../../shared/domain/knowledge'
import { may } from '../../shared/domain/roles'
import type { Person } from '../../shared/types/person'
import type { Database } from '../utils/db'
import type { EntryReceipt } from '../utils/pdf/entry-receipt'
import { printEntryReceipt } from '../utils/pdf/entry-receipt'
import { listNotLooked } from './intake'
import { findPartyName } from './parties'
import type { UnitRow } from './unit-lock'
import { getUnitRow } from './unit-lock'

/** The entry receipt of a unit as a PDF. 404 if there is no such unit. */
export async function makeReceiptPdf(db: Database, reader: Person, tag: string): Promise<Buffer> {
  return printEntryReceipt(await gatherReceipt(db, reader, tag))
}

/**
 * What the receipt says, without money. Who brought the piece is named to those who may read names, and to whoever
 * booked it in, for they wrote the name down.
 */
export async function gatherReceipt(db: Database, reader: Person, tag: string): Promise<EntryReceipt> {
  const unit = await getUnitRow(db, tag)
  const [model] = await db.select({ maker: models.maker, designation: models.designation, kind: models.kind }).from(models).where(eq(models.id, unit.modelId))
  const [house] = await db.select({ name: shop.name, address: shop.address, timeZone: shop.timeZone }).from(shop)
  const [photographed] = await db.select({ photos: count() }).from(photos).where(and(eq(photos.unitId, unit.id), isNull(photos.removedAt)))
  const seesName = may(reader.role, 'parties.read') || unit.bookedInBy === reader.id
  return {
    shop: { name: house?.name ?? 'The shop', address: house?.address ?? '' },
    tag: unit.tag,
    what: model ? `${model.maker} ${model.designation}` : '',
    kind: model ? EQUIPMENT_KIND_LABELS[model.kind] : '',
    serial: factInWords(unit.serialAnswer, unit.serial),
    receivedOn: new Intl.DateTimeFormat('en-GB', { dateStyle: 'long', timeZone: 'UTC' }).format(new Date(`${unit.acquiredOn}T00:00:00Z`)),
    printedAt: new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short', timeZone: house?.timeZone ?? 'UTC' }).format(new Date()),
    condition: unit.conditionNotes,
    supplyAsSet: unit.supplyAsSet,
    source: SOURCE_KIND_LABELS[unit.sourceKind],
    sourceName: seesName ? await findPartyName(db, unit.sourcePartyId) : null,
    ownership: unit.ownership,
    photoCount: photographed?.photos ?? 0,
    kit: await listKit(db, unit),
  }
}

const FOUND = { with_unit: 'Here', elsewhere: 'Elsewhere', missing: 'Missing' } as const

async function listKit(db: Database, unit: UnitRow): Promise<EntryReceipt['kit']> {
  const items = await db.select().from(keptWithItems)
    .where(and(eq(keptWithItems.unitId, unit.id), isNull(keptWithItems.removedAt))).orderBy(asc(keptWithItems.createdAt), asc(keptWithItems.tag))
  const answered = new Set(items.flatMap(item => item.kitItemId ? [item.kitItemId] : []))
  const notLooked = await listNotLooked(db, unit.id, answered)
  return [
    ...items.map(item => ({ description: item.description, tag: item.tag, found: FOUND[item.whereabouts], condition: item.condition })),
    ...notLooked.map(description => ({ description, tag: null, found: 'Not looked for' as const, condition: '' })),
  ]
}
