import { asc, eq, sql } from 'drizzle-orm'
import type { partRecalls } from '../../drizzle/schema'
import { parties, partLots } from '../../drizzle/schema'
import type { PartRecallBasis } from '../../shared/domain/part-lots'
import type { RecallBasis } from '../../shared/domain/part-recall'
import { formatTag } from '../../shared/domain/tag'
import type { PartRecallBasisInput } from '../../shared/schemas/part-recall'
import type { Database } from '../utils/db'
import { invalid } from '../utils/errors'
import type { GatheredReach } from './part-recall-reach'

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

/** A basis as typed, with the rows it names; 422 at the field for a lot or a supplier that there is not. */
export async function readBasis(db: Database, { basis, lotTag, supplierName, invoiceNumber, madeFrom, madeTo, kind, maker, value }: PartRecallBasisInput): Promise<BasisColumns> {
  return {
    basis, invoiceNumber, madeFrom, madeTo, kind, maker, value,
    lotId: lotTag === null ? null : await lotForField(db, lotTag),
    supplierId: supplierName === '' ? null : await supplierForField(db, supplierName),
  }
}

async function lotForField(db: Database, tag: string): Promise<string> {
  const [lot] = await db.select({ id: partLots.id }).from(partLots).where(eq(partLots.tag, tag))
  if (!lot) throw invalid([{ path: 'lotTag', message: `No part lot has the tag ${formatTag(tag)}` }])
  return lot.id
}

async function supplierForField(db: Database, name: string): Promise<string> {
  const [supplier] = await db.selectDistinct({ id: parties.id, createdAt: parties.createdAt }).from(parties).innerJoin(partLots, eq(partLots.supplierId, parties.id))
    .where(sql`lower(${parties.name}) = lower(${name})`).orderBy(asc(parties.createdAt)).limit(1)
  if (!supplier) throw invalid([{ path: 'supplierName', message: 'No lot came from a supplier of this name: choose one from the list' }])
  return supplier.id
}

const NOTHING: Record<PartRecallBasis, { path: string, message: string }> = {
  lot: { path: 'lotTag', message: 'This lot was put back where it came from, so there is nothing of it to recall' },
  invoice: { path: 'invoiceNumber', message: 'No lot of this supplier came with that invoice: compare the number with one of their lots' },
  made_between: { path: 'madeFrom', message: 'No lot is known to have been made between these days' },
  maker_and_value: { path: 'value', message: 'No lot is marked with this maker and has this value' },
}

/** 422 where a basis takes no lot: a recall that reaches nothing would look like one that was worked off. */
export function requireLots({ reach }: GatheredReach, basis: PartRecallBasis): void {
  if (reach.lots.length > 0) return
  const { path, message } = NOTHING[basis]
  const doubtful = reach.lookAt.length
  const look = doubtful === 0 ? '' : `. Of ${doubtful === 1 ? 'one lot' : `${doubtful} lots`} too little is known to say: look at ${doubtful === 1 ? 'it' : 'them'} first`
  throw invalid([{ path, message: `${message}${look}` }])
}
