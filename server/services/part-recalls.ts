import { and, eq, max, sql } from 'drizzle-orm'
import { partLots, partRecallDecisions, partRecalls } from '../../drizzle/schema'
import { PART_RECALL_OUTCOME_LABELS } from '../../shared/domain/part-lots'
import type { PartRecallReach } from '../../shared/domain/part-recall'
import { lotTitle } from '../../shared/domain/part-words'
import { formatTag } from '../../shared/domain/tag'
import type { DecidedPartRecallUnit, NewPartRecall } from '../../shared/schemas/part-recall'
import type { PartRecallView } from '../../shared/types/part-recall'
import type { Person } from '../../shared/types/person'
import type { Database } from '../utils/db'
import { conflict, invalid, notFound } from '../utils/errors'
import { appendLedger, appendUnitLedger } from './ledger'
import { lockLots } from './lot-stock'
import type { PartRecallRow } from './part-recall-basis'
import { basisOf, readBasis, whyNothing } from './part-recall-basis'
import type { GatheredReach } from './part-recall-reach'
import { gatherReach, mapUnits } from './part-recall-reach'
import { getPartRecall, getRecallRow } from './part-recall-view'
import { lockUnit } from './unit-lock'

/**
 * Raises a recall: every unit that has such a part, or had one, is put on the list to be decided, and where it is wanted the lots
 * go in quarantine with it, all or nothing. Two raised at once get different numbers. 422 at the field for a basis that names no
 * lot or supplier, or takes no lot.
 */
export async function raisePartRecall(db: Database, actor: Person, { why, quarantine, ...said }: NewPartRecall): Promise<PartRecallView> {
  return db.transaction(async (tx) => {
    await tx.execute(sql`lock table ${partRecalls} in share row exclusive mode`)
    const read = await readBasis(tx, said)
    if (!read.ok) throw invalid([read.error])
    const gathered = await gatherReach(tx, basisOf(read.columns), { wantsDoubtful: true })
    const nothing = whyNothing(gathered.reach, said.basis)
    if (nothing) throw invalid([nothing])
    const [last] = await tx.select({ number: max(partRecalls.number) }).from(partRecalls)
    const number = (last?.number ?? 0) + 1
    const [recall] = await tx.insert(partRecalls).values({ ...read.columns, number, why, raisedBy: actor.id }).returning({ id: partRecalls.id })
    if (!recall) throw new Error('A recall of parts was not written')
    await appendLedger(tx, actor, { kind: 'part_recall', id: recall.id }, 'part_recall_raised', { number, basis: said.basis, why, units: gathered.reach.units.length })
    await tellUnits(tx, actor, gathered.reach, { number, why })
    // Units before lots, as everywhere, so that nobody waits for somebody who waits for them.
    if (quarantine) await putInQuarantine(tx, actor, gathered, `Recall of parts ${number}: ${why}`)
    return getPartRecall(tx, actor, number)
  })
}

async function tellUnits(tx: Database, actor: Person, { units }: PartRecallReach, { number, why }: { number: number, why: string }): Promise<void> {
  const inOrder = await mapUnits(tx, actor, units.map(({ unitId }) => unitId))
  for (const id of inOrder.keys()) {
    const parts = units.find(({ unitId }) => unitId === id)?.reasons.join('; ') ?? ''
    await appendUnitLedger(tx, actor, id, 'part_recalled', { recall: number, parts, why })
  }
}

/** The lots that are recalled for certain; of one that may be, a person decides when it has been looked at. */
async function putInQuarantine(tx: Database, actor: Person, { reach, lots }: GatheredReach, why: string): Promise<void> {
  const tags = reach.lots.filter(({ how }) => how !== 'may_be').flatMap(({ id }) => lots.get(id)?.tag ?? [])
  for (const { lot, type } of (await lockLots(tx, tags)).values()) {
    if (lot.standing !== 'good') continue
    await tx.update(partLots).set({ standing: 'quarantined', standingBecause: why, version: sql`${partLots.version} + 1` }).where(eq(partLots.id, lot.id))
    await appendLedger(tx, actor, { kind: 'part_lot', id: lot.id }, 'lot_standing_changed', { name: lotTitle(type, lot.tag), from: 'good', to: 'quarantined', why })
  }
}

/**
 * Says what was decided of one unit, in stock or sold; it can be changed while the recall is open. 409 if somebody else decided it
 * meanwhile or the recall is closed, 404 for a unit that is not on its list.
 */
export async function decidePartRecallUnit(db: Database, actor: Person, { number, tag, outcome, note, seen }: DecidedPartRecallUnit & { number: number, tag: string }): Promise<PartRecallView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    const recall = await lockRecall(tx, number)
    if (recall.closedAt) throw conflict('recall-closed', 'This recall is closed, so what was decided stands.')
    const [before] = await tx.select().from(partRecallDecisions).where(and(eq(partRecallDecisions.recallId, recall.id), eq(partRecallDecisions.unitId, unit.id)))
    const { reach } = await gatherReach(tx, basisOf(recall), { wantsDoubtful: false })
    if (!before && !reach.units.some(({ unitId }) => unitId === unit.id)) throw notFound(`${formatTag(tag)} is not on the list of recall ${number}.`, 'not-recalled')
    if ((before?.outcome ?? null) !== seen) {
      throw conflict('decided-meanwhile', `Somebody else decided this unit meanwhile: ${before ? PART_RECALL_OUTCOME_LABELS[before.outcome] : 'undecided again'}.`)
    }
    const decision = { outcome, note, decidedBy: actor.id, decidedAt: sql`now()` }
    await tx.insert(partRecallDecisions).values({ recallId: recall.id, unitId: unit.id, ...decision })
      .onConflictDoUpdate({ target: [partRecallDecisions.recallId, partRecallDecisions.unitId], set: decision })
    await appendUnitLedger(tx, actor, unit.id, 'part_recall_decided', { recall: number, outcome, ...note && { note } })
    return getPartRecall(tx, actor, number)
  })
}

async function lockRecall(tx: Database, number: number): Promise<PartRecallRow> {
  const { recall } = await getRecallRow(tx, number)
  const [locked] = await tx.select().from(partRecalls).where(eq(partRecalls.id, recall.id)).for('update')
  if (!locked) throw new Error('A recall of parts is gone, though none is ever deleted')
  return locked
}

/** Ends a recall. 409 while a unit of it is undecided, or when it is closed already. */
export async function closePartRecall(db: Database, actor: Person, { number }: { number: number }): Promise<PartRecallView> {
  return db.transaction(async (tx) => {
    const recall = await lockRecall(tx, number)
    if (recall.closedAt) throw conflict('recall-closed', 'This recall is closed already.')
    const { units, decided } = await getPartRecall(tx, actor, number)
    const open = units - decided
    if (open > 0) throw conflict('undecided', `${open === 1 ? 'One unit is' : `${open} units are`} still undecided. Say of each what was done before the recall is closed.`)
    await tx.update(partRecalls).set({ closedAt: new Date(), closedBy: actor.id }).where(eq(partRecalls.id, recall.id))
    await appendLedger(tx, actor, { kind: 'part_recall', id: recall.id }, 'part_recall_closed', { number })
    return getPartRecall(tx, actor, number)
  })
}
