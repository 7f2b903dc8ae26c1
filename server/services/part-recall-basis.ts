import { asc, eq, sql } from 'drizzle-orm'
import type { partRecalls } from '../../drizzle/schema'
import { parties, partLots } from '../../drizzle/schema'
import type { PartRecallBasis } from '../../shared/domain/part-lots'
import type { PartRecallReach, RecallBasis } from '../../shared/domain/part-recall'
import { formatTag } from '../../shared/domain/tag'
import type { PartRecallBasisInput } from '../../shared/schemas/part-recall'
import type { FieldError } from '../../shared/types/problem'
import type { Database } from '../utils/db'

export type PartRecallRow = typeof partRecalls.$inferSelect

/** The columns that say what a recall goes by. */
export type BasisColumns = Pick<PartRecallRow, 'basis' | 'lotId' | 'supplierId' | 'invoiceNumber' | 'madeFrom' | 'madeTo' | 'kind' | 'maker' | 'value'>

/** What a recall goes by, as the reach is worked out from it. The database keeps every basis whole. */
export function basisOf(row: BasisColumns): RecallBasis {
  const { basis, lotId, supplierId, invoiceNumber, madeFrom, madeTo, kind, maker, value } = row
  if (basis === 'lot' && lotId !== null) return { basis, lotId }
  if (basis === 'invoice' && supplierId !== null) return { basis, supplierId, invoiceNumber }
  if (basis === 'made_between' && madeFrom !== null && madeTo !== null) return { basis, madeFrom, madeTo, kind, maker }
  if (basis === 'maker_and_value') return { basis, maker, value }
  throw new Error('A recall of parts lacks its basis, which its constraint forbids')
}

export type BasisRead = { ok: true, columns: BasisColumns } | { ok: false, error: FieldError }

/** A basis as typed, with the rows it names; refused at the field for a lot or a supplier that there is not. */
export async function readBasis(db: Database, { lotTag, supplierName, ...said }: PartRecallBasisInput): Promise<BasisRead> {
  const lotId = lotTag === null ? null : await findLotId(db, lotTag)
  if (lotId === undefined) return { ok: false, error: { path: 'lotTag', message: `No part lot has the tag ${formatTag(lotTag ?? '')}` } }
  const supplierId = supplierName === '' ? null : await findSupplierId(db, supplierName)
  if (supplierId === undefined) return { ok: false, error: { path: 'supplierName', message: 'No lot came from a supplier of this name: choose one from the list' } }
  const { basis, invoiceNumber, madeFrom, madeTo, kind, maker, value } = said
  return { ok: true, columns: { basis, lotId, supplierId, invoiceNumber, madeFrom, madeTo, kind, maker, value } }
}

async function findLotId(db: Database, tag: string): Promise<string | undefined> {
  const [lot] = await db.select({ id: partLots.id }).from(partLots).where(eq(partLots.tag, tag))
  return lot?.id
}

async function findSupplierId(db: Database, name: string): Promise<string | undefined> {
  const [supplier] = await db.selectDistinct({ id: parties.id, createdAt: parties.createdAt }).from(parties).innerJoin(partLots, eq(partLots.supplierId, parties.id))
    .where(sql`lower(${parties.name}) = lower(${name})`).orderBy(asc(parties.createdAt)).limit(1)
  return supplier?.id
}

const NOTHING: Record<PartRecallBasis, FieldError> = {
  lot: { path: 'lotTag', message: 'This lot was put back where it came from, so there is nothing of it to recall' },
  invoice: { path: 'invoiceNumber', message: 'No lot of this supplier came with that invoice: compare the number with one of their lots' },
  made_between: { path: 'madeFrom', message: 'No lot is known to have been made between these days' },
  maker_and_value: { path: 'value', message: 'No lot is marked with this maker and has this value' },
}

/** Why a basis that takes no lot is refused, for a recall that reaches nothing would look like one that was worked off; null where it takes one. */
export function whyNothing({ lots, lookAt }: PartRecallReach, basis: PartRecallBasis): FieldError | null {
  if (lots.length > 0) return null
  const { path, message } = NOTHING[basis]
  if (lookAt.length === 0) return { path, message }
  const [many, them] = lookAt.length === 1 ? ['one lot', 'it'] : [`${lookAt.length} lots`, 'them']
  return { path, message: `${message}. Of ${many} too little is known to say: look at ${them} first` }
}
